/** A flag on its pole: late is told by shape and word, not by colour alone. */
export function LateFlag() {
  return (
    <svg aria-hidden="true" viewBox="0 0 16 16" className="mr-1.5 inline-block size-4 align-[-2px]">
      <path d="M3 1V15.5" className="stroke-brick" strokeWidth="2" strokeLinecap="round" />
      <path d="M4 1.5H15L11.5 5.25L15 9H4Z" className="fill-brick" />
    </svg>
  );
}
