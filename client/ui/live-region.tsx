/** Says a change to screen readers when it has settled, without moving the focus. */
export function LiveRegion({ words }: { words: string }) {
  return (
    <p role="status" aria-live="polite" className="sr-only">
      {words}
    </p>
  );
}
