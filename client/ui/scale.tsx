import { formatSignedPercent } from '../lib/format-number.ts';
import { minus, narrow } from '../lib/spaces.ts';

export interface ScaleProps {
  /** Band asked for, as a fraction: 0.05 is ± 5 %. */
  asked: number;
  /** Nominal, lowest and highest guaranteed rate, as fractions off the target. */
  error: number;
  low: number;
  high: number;
}

const width = 320;

/** The band on a scale: the target is the notch, the bar is what every kit keeps, the dot is nominal. */
export function Scale({ asked, error, low, high }: ScaleProps) {
  const reach = Math.max(asked, Math.abs(low), Math.abs(high)) * 1.08;
  const x = (fraction: number) => width / 2 + (fraction / reach) * (width / 2 - 6);
  const bound = (fraction: number) => Math.max(-asked, Math.min(asked, fraction));
  const over = low < -asked || high > asked;
  const percent = `${narrow}${Number((asked * 100).toPrecision(3))}${narrow}%`;
  const sentence = `Every kit stays between ${formatSignedPercent(low)} and ${formatSignedPercent(high)} of the rate asked for; nominal ${formatSignedPercent(error)}; asked for ±${percent}.`;
  return (
    <div role="img" aria-label={sentence}>
      <svg aria-hidden="true" viewBox={`0 0 ${width} 34`} className="block w-full">
        <path d={`M2 18H${width - 2}`} className="stroke-line" strokeWidth="1.5" />
        {over && (
          <rect
            x={x(low)}
            y="13"
            width={x(high) - x(low)}
            height="10"
            rx="5"
            className="fill-none stroke-brick"
            strokeWidth="1.5"
            strokeDasharray="3 3"
          />
        )}
        <rect
          x={x(bound(low))}
          y="13"
          width={Math.max(3, x(bound(high)) - x(bound(low)))}
          height="10"
          rx="5"
          className="fill-spruce/35"
        />
        {[-asked, asked].map((edge) => (
          <path key={edge} d={`M${x(edge)} 9V27`} className="stroke-soft" strokeWidth="1.5" />
        ))}
        <path d={`M${width / 2 - 6} 2H${width / 2 + 6}L${width / 2} 11Z`} className="fill-ink" />
        <path d={`M${width / 2} 11V29`} className="stroke-ink" strokeWidth="2" />
        <circle cx={x(error)} cy="18" r="5" className="fill-spruce stroke-card" strokeWidth="2" />
      </svg>
      <div aria-hidden="true" className="relative h-5 text-small text-soft">
        {asked / reach > 0.5 ? (
          <>
            <ScaleLabel at={x(-asked) / width} words={`${minus}${percent}`} edge="start" />
            <ScaleLabel at={0.5} words="asked" edge="middle" />
            <ScaleLabel at={x(asked) / width} words={`+${percent}`} edge="end" />
          </>
        ) : (
          <ScaleLabel at={0.5} words={`asked ±${percent}`} edge="middle" />
        )}
      </div>
    </div>
  );
}

const labelShifts = {
  start: '-translate-x-1/4',
  middle: '-translate-x-1/2',
  end: '-translate-x-3/4',
};

function ScaleLabel(props: { at: number; words: string; edge: keyof typeof labelShifts }) {
  const left = `${(props.at * 100).toFixed(2)}%`;
  return (
    <span className={`absolute whitespace-nowrap ${labelShifts[props.edge]}`} style={{ left }}>
      {props.words}
    </span>
  );
}
