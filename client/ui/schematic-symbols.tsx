import type { PartSymbol as SymbolName } from '../../server/contracts/drawing.ts';

type Point = readonly [number, number];

interface SymbolProps {
  symbol: SymbolName;
  from: Point;
  to: Point;
}

function zigzag(start: number, length: number, half: number): string {
  const step = length / 6;
  const teeth = Array.from(
    { length: 6 },
    (_, index) => `L${start + (index + 0.5) * step} ${index % 2 === 0 ? -half : half}`,
  );
  return `${teeth.join('')}L${start + length} 0`;
}

function resistorPath(length: number): string {
  const body = Math.min(length * 0.62, 46);
  const start = (length - body) / 2;
  return `M0 0H${start}${zigzag(start, body, 7.5)}H${length}`;
}

function capacitorPath(length: number): string {
  const gap = 4;
  const plate = 14;
  const left = length / 2 - gap;
  const right = length / 2 + gap;
  return `M0 0H${left}M${left} ${-plate}V${plate}M${right} ${-plate}V${plate}M${right} 0H${length}`;
}

function Diode({ length, lit }: { length: number; lit: boolean }) {
  const half = 10;
  const left = length / 2 - half;
  const right = length / 2 + half;
  return (
    <>
      <path d={`M0 0H${left}M${right} 0H${length}M${right} ${-half}V${half}`} />
      <path d={`M${left} ${-half}V${half}L${right} 0Z`} className="fill-card" />
      {lit && (
        <path
          d={`M${length / 2 - 2} ${-half - 3}l9 -9m-5 0h5v5M${length / 2 + 9} ${-half - 1}l9 -9m-5 0h5v5`}
          strokeWidth={1.5}
        />
      )}
    </>
  );
}

/** The slant with its bar across that says: set once with a screwdriver. */
function Adjustment({ middle }: { middle: number }) {
  return <path d={`M${middle - 13} 15L${middle + 13} -15m-5 -4.4l10 8.8`} strokeWidth={1.75} />;
}

/** A two-ended symbol laid along the line from one end to the other. */
export function PartSymbol({ symbol, from, to }: SymbolProps) {
  const length = Math.hypot(to[0] - from[0], to[1] - from[1]);
  const turn = (Math.atan2(to[1] - from[1], to[0] - from[0]) * 180) / Math.PI;
  return (
    <g transform={`translate(${from[0]} ${from[1]}) rotate(${turn})`}>
      {(symbol === 'resistor' || symbol === 'trimmer') && <path d={resistorPath(length)} />}
      {symbol === 'trimmer' && <Adjustment middle={length / 2} />}
      {(symbol === 'capacitor' || symbol === 'polarised-capacitor') && (
        <path d={capacitorPath(length)} />
      )}
      {symbol === 'polarised-capacitor' && (
        <path d={`M${length / 2 - 13} 9h6m-3 -3v6`} strokeWidth={1.5} />
      )}
      {(symbol === 'diode' || symbol === 'led') && <Diode length={length} lit={symbol === 'led'} />}
    </g>
  );
}

export function ComparatorSymbol(props: {
  at: Point;
  width: number;
  height: number;
  invertingAbove: boolean;
}) {
  const { width, height } = props;
  const sign = 5;
  const upper = -height / 4;
  const lower = height / 4;
  const plusAt = props.invertingAbove ? lower : upper;
  const minusAt = props.invertingAbove ? upper : lower;
  const x = 14;
  return (
    <g transform={`translate(${props.at[0]} ${props.at[1]})`}>
      <path d={`M0 ${-height / 2}V${height / 2}L${width} 0Z`} className="fill-card" />
      <path
        strokeWidth={1.75}
        d={`M${x - sign} ${plusAt}h${2 * sign}m${-sign} ${-sign}v${2 * sign}M${x - sign} ${minusAt}h${2 * sign}`}
      />
    </g>
  );
}
