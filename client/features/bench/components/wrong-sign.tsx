/** The cross beside what was not taken; the words beside it say why. */
export function WrongSign() {
  return (
    <svg aria-hidden="true" viewBox="0 0 20 20" className="mt-1 size-5 shrink-0">
      <path
        d="M3 3L17 17M17 3L3 17"
        className="stroke-brick"
        strokeWidth="4"
        strokeLinecap="round"
      />
    </svg>
  );
}
