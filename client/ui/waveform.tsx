import { formatQuantity, formatVolts } from '../lib/format-number.ts';
import { useElementWidth } from '../lib/use-element-width.ts';
import { niceTicks } from './axis.ts';

type Series = readonly (readonly [number, number])[];

export interface WaveformProps {
  output: Series;
  capacitor: Series;
  thresholdLowVolts: number;
  thresholdHighVolts: number;
  supplyVolts: number;
  firstHighSeconds: number;
  periodSeconds: number;
}

const height = 260;
const frame = { left: 66, right: 12, top: 16, bottom: 34 };

function scales(props: WaveformProps, width: number) {
  const end = Math.max(...props.output.map(([t]) => t), props.periodSeconds);
  const x = (t: number) => frame.left + (t / end) * (width - frame.left - frame.right);
  const y = (v: number) =>
    height - frame.bottom - (v / props.supplyVolts) * (height - frame.top - frame.bottom);
  const path = (series: Series) =>
    series
      .map(([t, v], index) => `${index === 0 ? 'M' : 'L'}${x(t).toFixed(1)} ${y(v).toFixed(1)}`)
      .join('');
  return { end, x, y, path };
}

function Axes({ props, width }: { props: WaveformProps; width: number }) {
  const { end, x, y } = scales(props, width);
  const floor = height - frame.bottom;
  return (
    <g className="fill-soft text-small" strokeWidth="1">
      {niceTicks(0, end, width < 480 ? 4 : 8).map((t) => (
        <g key={t}>
          <path d={`M${x(t)} ${floor}v6`} className="stroke-soft" />
          <text x={x(t)} y={floor + 22} textAnchor={t === 0 ? 'start' : 'middle'}>
            {formatQuantity(t, 's')}
          </text>
        </g>
      ))}
      {[0, props.supplyVolts].map((v) => (
        <text key={v} x={frame.left - 8} y={y(v) + 5} textAnchor="end">
          {formatVolts(v)}
        </text>
      ))}
      <path d={`M${frame.left} ${floor}H${width - frame.right}`} className="stroke-soft" />
    </g>
  );
}

/** Output and capacitor from the moment the supply comes on, with both thresholds. */
export function Waveform(props: WaveformProps) {
  const [box, width] = useElementWidth<HTMLDivElement>(720);
  const { x, y, path } = scales(props, width);
  const thresholds = [props.thresholdLowVolts, props.thresholdHighVolts];
  return (
    <div ref={box} className="w-full overflow-hidden">
      <svg aria-hidden="true" width={width} height={height} className="block">
        <path d={`${path(props.output)}V${y(0)}H${x(0)}Z`} className="fill-spruce/10" />
        <Axes props={props} width={width} />
        {thresholds.map((volts) => (
          <g key={volts}>
            <path
              d={`M${frame.left} ${y(volts)}H${width - frame.right}`}
              className="stroke-soft"
              strokeDasharray="2 4"
            />
            <text
              x={frame.left - 8}
              y={y(volts) + 5}
              textAnchor="end"
              className="fill-ink text-small font-strong"
            >
              {formatVolts(volts)}
            </text>
          </g>
        ))}
        <path
          d={`M${x(props.firstHighSeconds)} ${frame.top - 10}V${height - frame.bottom}`}
          className="stroke-ink/60"
          strokeDasharray="5 4"
        />
        <path d={path(props.output)} fill="none" className="stroke-spruce" strokeWidth="2.25" />
        <path d={path(props.capacitor)} fill="none" className="stroke-slate" strokeWidth="2" />
      </svg>
      <p aria-hidden="true" className="flex flex-wrap gap-x-6 pt-1 text-small text-soft">
        <Key className="stroke-spruce" words="output" />
        <Key className="stroke-slate" words="capacitor" />
        <Key className="stroke-soft" words="thresholds" dash="2 4" />
        <Key className="stroke-ink/60" words="end of the first, longer beat" dash="5 4" />
      </p>
    </div>
  );
}

function Key({ className, words, dash }: { className: string; words: string; dash?: string }) {
  return (
    <span className="inline-flex items-center gap-2">
      <svg viewBox="0 0 24 4" className="w-6">
        <path d="M0 2H24" className={className} strokeWidth="2.5" strokeDasharray={dash} />
      </svg>
      {words}
    </span>
  );
}
