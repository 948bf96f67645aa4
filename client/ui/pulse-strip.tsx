import { clsx } from 'clsx';
import type { PulseStripData } from '../../server/contracts/drawing.ts';
import { formatPercent, formatQuantity } from '../lib/format-number.ts';
import { pathIn } from './strip-geometry.ts';

const width = 1000;
const height = 100;
const inset = 12;

function stripSentence(strip: PulseStripData): string {
  const beat = formatQuantity(strip.periodSeconds, 's');
  return `Pulse strip: two beats of ${beat}, output high for ${formatPercent(strip.duty)} of each.`;
}

/** Two periods to scale: output as a square trace, capacitor as a saw between hairline thresholds. */
export function PulseStrip(props: {
  strip: PulseStripData;
  className?: string;
  /** Names one beat under the trace. */
  withAxis?: boolean;
  decorative?: boolean;
}) {
  const { strip } = props;
  const output = pathIn(strip.output, width, height, inset);
  const y = (level: number) => inset + (1 - level) * (height - 2 * inset);
  return (
    <div className={clsx('relative', props.className)}>
      <svg
        viewBox={`0 0 ${width} ${height}`}
        preserveAspectRatio="none"
        className="block h-full w-full"
        {...(props.decorative === true
          ? { 'aria-hidden': true }
          : { role: 'img', 'aria-label': stripSentence(strip) })}
      >
        <path d={`${output}V${y(0)}H0Z`} className="fill-spruce/13" />
        {strip.thresholds.map((level, index) => (
          <path
            key={index}
            d={`M0 ${y(level)}H${width}`}
            className="stroke-soft/70"
            strokeDasharray="2 4"
            vectorEffect="non-scaling-stroke"
          />
        ))}
        <path
          d={output}
          fill="none"
          className="stroke-spruce"
          strokeWidth="2"
          strokeLinejoin="round"
          vectorEffect="non-scaling-stroke"
        />
        <path
          d={pathIn(strip.capacitor, width, height, inset)}
          fill="none"
          className="stroke-slate"
          strokeWidth="1.75"
          strokeLinejoin="round"
          vectorEffect="non-scaling-stroke"
        />
      </svg>
      {props.withAxis === true && (
        <div aria-hidden="true" className="grid grid-cols-2 text-small text-soft">
          <span className="mt-1 border-x border-t border-soft/70 px-1.5 pt-0.5 leading-tight">
            one beat, {formatQuantity(strip.periodSeconds, 's')}
          </span>
          <span className="mt-1 border-t border-r border-soft/70" />
        </div>
      )}
    </div>
  );
}
