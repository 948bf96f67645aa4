/** The paper, for the moment before the first page's module is here. */
export function FirstPaint() {
  return <div className="min-h-dvh bg-paper" />;
}
