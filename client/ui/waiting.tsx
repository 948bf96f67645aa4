/** A calm line while the first answer is on its way; never a spinner. */
export function Waiting({ words }: { words: string }) {
  return (
    <div role="status" className="flex items-center gap-4 py-10 text-soft">
      <svg aria-hidden="true" viewBox="0 0 64 20" className="w-16">
        <path
          d="M0 16H8V4H24V16H40V4H56V16H64"
          fill="none"
          className="stroke-line"
          strokeWidth="2.5"
        />
      </svg>
      <span>{words}</span>
    </div>
  );
}
