/** How many can be sold; none is told by a word and a crossed ring, not by colour alone. */
export function StockSign({ available }: { available: number }) {
  if (available > 0) return <span className="font-strong">{available}</span>;
  return (
    <span className="inline-flex items-center gap-1.5 font-strong whitespace-nowrap text-brick">
      <svg aria-hidden="true" viewBox="0 0 14 14" className="size-3.5">
        <circle cx="7" cy="7" r="5.5" fill="none" className="stroke-brick" strokeWidth="2" />
        <path d="M3 11L11 3" className="stroke-brick" strokeWidth="2" />
      </svg>
      none
    </span>
  );
}
