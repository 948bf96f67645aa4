const step = 13;
const most = 16;

/** The walk ahead in small: a bead for every stop, and their number in words. */
export function Beads({ stops }: { stops: number }) {
  const shown = Math.min(stops, most);
  const width = Math.max(0, shown - 1) * step + 12;
  return (
    <span className="inline-flex items-center gap-2 whitespace-nowrap">
      <svg aria-hidden="true" width={width} height="12" className="shrink-0">
        <path d={`M4 6H${width - 4}`} className="stroke-soft" strokeWidth="1.5" />
        {Array.from({ length: shown }, (_, index) => (
          <circle
            key={index}
            cx={6 + index * step}
            cy="6"
            r="4"
            className="fill-paper stroke-soft"
            strokeWidth="1.75"
          />
        ))}
      </svg>
      {stops === 1 ? 'one stop' : `${stops} stops`}
    </span>
  );
}
