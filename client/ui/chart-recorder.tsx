import { Pause, Play } from 'lucide-react';
import { useEffect, useRef, useState } from 'react';
import type { PulseStripData } from '../../server/contracts/drawing.ts';
import { useElementWidth } from '../lib/use-element-width.ts';
import { useReducedMotion } from '../lib/use-media.ts';
import { heightAt, onePeriod, pathIn } from './strip-geometry.ts';

const height = 128;
const inset = 14;
/** One drawn beat passes the pen in this time whatever the rate: the lamp stays far under 3 a second. */
const beatSeconds = 6;
const penShare = 0.72;

interface Traces {
  beats: number;
  beatWidth: number;
  output: string;
  capacitor: string;
}

function repeat(points: readonly (readonly [number, number])[], beats: number) {
  return Array.from({ length: beats }, (_, beat) =>
    points.map(([x, y]): [number, number] => [(beat + x) / beats, y]),
  ).flat();
}

function tracesOf(strip: PulseStripData, width: number): Traces {
  const shown = Math.max(2, Math.min(6, Math.round(width / 300)));
  const beatWidth = width / shown;
  const beats = shown + 1;
  const total = beatWidth * beats;
  return {
    beats,
    beatWidth,
    output: pathIn(repeat(onePeriod(strip.output), beats), total, height, inset),
    capacitor: pathIn(repeat(onePeriod(strip.capacitor), beats), total, height, inset),
  };
}

/** Moves the paper under the pen; writes to the elements directly, sixty times a second. */
function usePaper(strip: PulseStripData, width: number, traces: Traces, moving: boolean) {
  const paper = useRef<SVGGElement>(null);
  const pen = useRef<SVGCircleElement>(null);
  const phase = useRef(0);
  useEffect(() => {
    const period = onePeriod(strip.capacitor);
    const place = () => {
      const shift = phase.current * traces.beatWidth;
      const along = ((penShare * width + shift) / traces.beatWidth) % 1;
      const y = inset + (1 - heightAt(period, along)) * (height - 2 * inset);
      paper.current?.setAttribute('transform', `translate(${(-shift).toFixed(2)} 0)`);
      pen.current?.setAttribute('cy', y.toFixed(2));
      pen.current?.setAttribute('data-lit', String(along < strip.duty));
    };
    place();
    if (!moving) return undefined;
    let last = performance.now();
    let frame = requestAnimationFrame(function step(now) {
      phase.current = (phase.current + Math.min(now - last, 100) / (beatSeconds * 1000)) % 1;
      last = now;
      place();
      frame = requestAnimationFrame(step);
    });
    return () => cancelAnimationFrame(frame);
  }, [strip, width, traces.beatWidth, moving]);
  return { paper, pen };
}

/**
 * The pulse strip as a slow paper chart across the whole page: the paper runs left under a standing
 * pen whose tip is lit while the output is high. It can be stopped, and stands under reduced motion.
 */
export function ChartRecorder({ strip }: { strip: PulseStripData }) {
  const [frame, width] = useElementWidth<HTMLDivElement>(1200);
  const reduced = useReducedMotion();
  const [stopped, setStopped] = useState(false);
  const traces = tracesOf(strip, width);
  const { paper, pen } = usePaper(strip, width, traces, !stopped && !reduced);
  const y = (level: number) => inset + (1 - level) * (height - 2 * inset);
  const total = traces.beatWidth * traces.beats;
  return (
    <div className="relative">
      <div ref={frame} className="overflow-hidden">
        <svg aria-hidden="true" width={width} height={height} className="block">
          {strip.thresholds.map((level, index) => (
            <path
              key={index}
              d={`M0 ${y(level)}H${width}`}
              className="stroke-soft/60"
              strokeDasharray="1.5 5"
            />
          ))}
          <g ref={paper}>
            <path d={`${traces.output}V${y(0)}H0Z`} className="fill-spruce/10" />
            <path d={traces.output} fill="none" className="stroke-spruce" strokeWidth="2.25" />
            <path d={traces.capacitor} fill="none" className="stroke-slate" strokeWidth="2" />
            {Array.from({ length: traces.beats }, (_, beat) => (
              <path
                key={beat}
                d={`M${beat * traces.beatWidth} ${height - 8}v8`}
                className="stroke-soft"
                strokeWidth="1.5"
              />
            ))}
            <path d={`M0 ${height - 0.75}H${total}`} className="stroke-line" strokeWidth="1.5" />
          </g>
          <path d={`M${penShare * width} 0V${height}`} className="stroke-ink/50" strokeWidth="1" />
          <circle
            ref={pen}
            cx={penShare * width}
            r="7"
            className="fill-card stroke-ink data-[lit=true]:fill-marigold"
            strokeWidth="2"
          />
        </svg>
      </div>
      {!reduced && (
        <button
          type="button"
          onClick={() => setStopped(!stopped)}
          aria-label={stopped ? 'Let the strip run' : 'Stop the strip'}
          className="absolute top-full right-3 grid size-11 place-items-center text-soft hover:text-ink sm:right-6"
        >
          {stopped ? (
            <Play aria-hidden className="size-4" />
          ) : (
            <Pause aria-hidden className="size-4" />
          )}
        </button>
      )}
    </div>
  );
}
