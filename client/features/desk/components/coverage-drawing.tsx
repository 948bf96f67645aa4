import type { Coverage } from '../../../../server/contracts/desk.ts';
import { formatPercent } from '../../../lib/format-number.ts';
import { narrow } from '../../../lib/spaces.ts';
import { heightOf, holesOf, isHeld, placeOf, rateWords } from '../coverage.ts';

export const height = 190;
export const below = 62;
/** Room on the right for what the lines mean. */
export const margin = 60;
const decades = [0.01, 0.1, 1, 10, 100, 1000, 10_000, 100_000];
const marks = [0.1, 0.02];

export const bandWords = (band: number) => `±${narrow}${formatPercent(band)}`;

export function Hatch() {
  return (
    <defs>
      <pattern
        id="falls-short"
        width="5"
        height="5"
        patternUnits="userSpaceOnUse"
        patternTransform="rotate(45)"
      >
        <path d="M1 0V5" className="stroke-spruce" strokeWidth="1.5" />
      </pattern>
    </defs>
  );
}

const y = (halfBand: number) => height - heightOf(halfBand) * (height - 16);

export function Bars(props: { coverage: Coverage; width: number; pointed: number | null }) {
  const { points, band } = props.coverage;
  const step = props.width / points.length;
  const gap = step > 7 ? 2 : 1;
  return points.map((point, index) => {
    if (point.halfBand === null) return null;
    const held = isHeld(point, band);
    const top = y(point.halfBand);
    return (
      <rect
        key={point.frequencyHz}
        x={index * step + gap / 2}
        y={top}
        width={step - gap}
        height={height - top}
        fill={held ? undefined : 'url(#falls-short)'}
        strokeWidth="1.25"
        className={
          index === props.pointed
            ? 'fill-marigold stroke-ink'
            : held
              ? 'fill-spruce stroke-spruce'
              : 'stroke-spruce'
        }
      />
    );
  });
}

export function Marks({ width }: { width: number }) {
  return marks.map((band) => (
    <g key={band}>
      <path d={`M0 ${y(band)}H${width}`} className="stroke-line" strokeDasharray="2 5" />
      <text x={width + 10} y={y(band) + 5} className="fill-soft text-small">
        {bandWords(band)}
      </text>
    </g>
  ));
}

export function AskedLine({ band, width }: { band: number; width: number }) {
  return (
    <g>
      <path d={`M0 ${y(band)}H${width}`} className="stroke-paper" strokeWidth="4.5" />
      <path d={`M0 ${y(band)}H${width + 6}`} className="stroke-ink" strokeWidth="1.75" />
      <text y={y(band) + 5} className="fill-ink text-small">
        <tspan x={width + 10} className="font-heavy">
          {bandWords(band)}
        </tspan>
        <tspan x={width + 10} dy="1.2em">
          asked
        </tspan>
      </text>
    </g>
  );
}

export function Axis({ coverage, width }: { coverage: Coverage; width: number }) {
  const narrowFrame = width < 640;
  return (
    <g>
      <path d={`M0 ${height}H${width}`} className="stroke-ink" strokeWidth="2" />
      {decades.map((decade, index) => {
        const share = placeOf(decade, coverage);
        if (share < -0.001 || share > 1.001) return null;
        const anchor = share < 0.01 ? 'start' : share > 0.99 ? 'end' : 'middle';
        const isSpoken = !narrowFrame || index % 2 === 0 || share > 0.99;
        return (
          <g key={decade}>
            <path d={`M${share * width} ${height}v8`} className="stroke-ink" strokeWidth="1.5" />
            {isSpoken && !(narrowFrame && index === decades.length - 2) && (
              <text
                x={share * width}
                y={height + 24}
                textAnchor={anchor}
                className="fill-soft text-small font-strong"
              >
                {rateWords(decade)}
              </text>
            )}
          </g>
        );
      })}
    </g>
  );
}

/** Under the axis, a bracket for each stretch that is not held. */
export function Holes({ coverage, width }: { coverage: Coverage; width: number }) {
  const step = width / coverage.points.length;
  const first = coverage.points[0]?.frequencyHz;
  return holesOf(coverage).map((hole) => {
    const start = coverage.points.findIndex((point) => point.frequencyHz === hole.fromHz);
    const from = start * step;
    const to = from + hole.points * step;
    const isWide = to - from > 120;
    return (
      <g key={hole.fromHz}>
        <path
          d={`M${from + 1} ${height + 34}v6H${to - 1}v-6`}
          fill="none"
          className="stroke-brick"
          strokeWidth="2"
        />
        {isWide && (
          <text
            x={hole.fromHz === first ? from : (from + to) / 2}
            y={height + 56}
            textAnchor={hole.fromHz === first ? 'start' : 'middle'}
            className="fill-brick text-small font-strong"
          >
            {hole.worst === null ? 'no pack for some rates' : `only ${bandWords(hole.worst)}`}
          </text>
        )}
      </g>
    );
  });
}
