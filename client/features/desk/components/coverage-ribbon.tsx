import { useState } from 'react';
import type { PointerEvent } from 'react';
import type { Coverage } from '../../../../server/contracts/desk.ts';
import { useElementWidth } from '../../../lib/use-element-width.ts';
import { rateWords } from '../coverage.ts';
import {
  AskedLine,
  Axis,
  Bars,
  Hatch,
  Holes,
  Marks,
  bandWords,
  below,
  height,
  margin,
} from './coverage-drawing.tsx';
import { CoverageTable } from './coverage-table.tsx';

/**
 * One ribbon over seven decades of rate: the tighter the guaranteed band, the higher it stands. What
 * reaches the asked line is solid, what falls short is hatched, and what cannot be made is a gap.
 */
export function CoverageRibbon({ coverage }: { coverage: Coverage }) {
  const [frame, frameWidth] = useElementWidth<HTMLDivElement>(1000);
  const width = frameWidth - margin;
  const [pointed, setPointed] = useState<number | null>(null);
  const onMove = (event: PointerEvent<SVGSVGElement>) => {
    const box = event.currentTarget.getBoundingClientRect();
    const share = (event.clientX - box.left) / (box.width - margin);
    const index = Math.floor(share * coverage.points.length);
    setPointed(Math.min(coverage.points.length - 1, Math.max(0, index)));
  };
  return (
    <figure>
      <div ref={frame}>
        <svg
          aria-hidden="true"
          width={frameWidth}
          height={height + below}
          className="block overflow-visible"
          onPointerMove={onMove}
          onPointerLeave={() => setPointed(null)}
        >
          <Hatch />
          <Marks width={width} />
          <Bars coverage={coverage} width={width} pointed={pointed} />
          <AskedLine band={coverage.band} width={width} />
          <Axis coverage={coverage} width={width} />
          <Holes coverage={coverage} width={width} />
        </svg>
      </div>
      <figcaption className="mt-1 flex flex-wrap items-baseline justify-between gap-x-8 gap-y-2">
        <span className="text-soft">{pointedWords(coverage, pointed)}</span>
        <CoverageTable coverage={coverage} />
      </figcaption>
    </figure>
  );
}

function pointedWords(coverage: Coverage, pointed: number | null): string {
  const point = pointed === null ? undefined : coverage.points[pointed];
  if (point === undefined) {
    return 'Best guaranteed band at each rate, for a logic clock at 5\u202fV; higher is tighter.';
  }
  const rate = rateWords(point.frequencyHz);
  return point.halfBand === null
    ? `${rate}: no pack comes within 1\u202f% of it`
    : `${rate}: every kit within ${bandWords(point.halfBand)}`;
}
