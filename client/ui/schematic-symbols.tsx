type Point = readonly [number, number];

interface SymbolProps {
  symbol: 'resistor' | 'capacitor' | 'polarised-capacitor' | 'diode' | 'led';
  from: Point;
  to: Point;
  /** One drawing unit of line weight. */
  unit: number;
}

function zigzag(start: number, length: number, half: number): string {
  const step = length / 6;
  const teeth = Array.from(
    { length: 6 },
    (_, index) => `L${start + (index + 0.5) * step} ${index % 2 === 0 ? -half : half}`,
  );
  return `${teeth.join('')}L${start + length} 0`;
}

function resistorPath(length: number, unit: number): string {
  const body = Math.min(length * 0.62, 46 * unit);
  const start = (length - body) / 2;
  return `M0 0H${start}${zigzag(start, body, 7.5 * unit)}H${length}`;
}

function capacitorPath(length: number, unit: number): string {
  const gap = 4 * unit;
  const plate = 14 * unit;
  const left = length / 2 - gap;
  const right = length / 2 + gap;
  return `M0 0H${left}M${left} ${-plate}V${plate}M${right} ${-plate}V${plate}M${right} 0H${length}`;
}

function Diode({ length, unit, lit }: { length: number; unit: number; lit: boolean }) {
  const half = 10 * unit;
  const left = length / 2 - half;
  const right = length / 2 + half;
  return (
    <>
      <path d={`M0 0H${left}M${right} 0H${length}M${right} ${-half}V${half}`} />
      <path d={`M${left} ${-half}V${half}L${right} 0Z`} className="fill-card" />
      {lit && (
        <path
          d={`M${length / 2 - 2 * unit} ${-half - 3 * unit}l${9 * unit} ${-9 * unit}m${-5 * unit} 0h${5 * unit}v${5 * unit}M${length / 2 + 9 * unit} ${-half - 1 * unit}l${9 * unit} ${-9 * unit}m${-5 * unit} 0h${5 * unit}v${5 * unit}`}
          strokeWidth={1.5 * unit}
        />
      )}
    </>
  );
}

/** A two-ended symbol laid along the line from one end to the other. */
export function PartSymbol({ symbol, from, to, unit }: SymbolProps) {
  const length = Math.hypot(to[0] - from[0], to[1] - from[1]);
  const turn = (Math.atan2(to[1] - from[1], to[0] - from[0]) * 180) / Math.PI;
  return (
    <g transform={`translate(${from[0]} ${from[1]}) rotate(${turn})`}>
      {symbol === 'resistor' && <path d={resistorPath(length, unit)} />}
      {(symbol === 'capacitor' || symbol === 'polarised-capacitor') && (
        <path d={capacitorPath(length, unit)} />
      )}
      {symbol === 'polarised-capacitor' && (
        <path
          d={`M${length / 2 - 13 * unit} ${9 * unit}h${6 * unit}m${-3 * unit} ${-3 * unit}v${6 * unit}`}
          strokeWidth={1.5 * unit}
        />
      )}
      {(symbol === 'diode' || symbol === 'led') && (
        <Diode length={length} unit={unit} lit={symbol === 'led'} />
      )}
    </g>
  );
}

export function ComparatorSymbol(props: {
  at: Point;
  width: number;
  height: number;
  invertingAbove: boolean;
  unit: number;
}) {
  const { width, height, unit } = props;
  const sign = 5 * unit;
  const upper = -height / 4;
  const lower = height / 4;
  const plusAt = props.invertingAbove ? lower : upper;
  const minusAt = props.invertingAbove ? upper : lower;
  const x = 14 * unit;
  return (
    <g transform={`translate(${props.at[0]} ${props.at[1]})`}>
      <path d={`M0 ${-height / 2}V${height / 2}L${width} 0Z`} className="fill-card" />
      <path
        strokeWidth={1.75 * unit}
        d={`M${x - sign} ${plusAt}h${2 * sign}m${-sign} ${-sign}v${2 * sign}M${x - sign} ${minusAt}h${2 * sign}`}
      />
    </g>
  );
}
