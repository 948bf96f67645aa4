import { useEffect, useState } from 'react';
import { formatQuantity } from '../../../lib/format-number.ts';
import { useReducedMotion } from '../../../lib/use-media.ts';
import { Button } from '../../../ui/button.tsx';
import { lampLimitHertz } from '../model.ts';

function useBlink(periodSeconds: number, duty: number, running: boolean): boolean {
  const [lit, setLit] = useState(false);
  useEffect(() => {
    if (!running) return undefined;
    const start = performance.now();
    const tick = setInterval(() => {
      const along = ((performance.now() - start) / 1000 / periodSeconds) % 1;
      setLit(along < duty);
    }, 40);
    return () => clearInterval(tick);
  }, [periodSeconds, duty, running]);
  return running && lit;
}

function Lamp({ lit }: { lit: boolean }) {
  return (
    <svg viewBox="0 0 64 64" aria-hidden="true" className="size-16 shrink-0">
      <path d="M24 46V62M40 46V58" className="stroke-soft" strokeWidth="3" />
      <path
        d="M17 44V26C17 16 24 9 32 9C40 9 47 16 47 26V44Z"
        className={lit ? 'fill-marigold stroke-ink' : 'fill-card stroke-ink'}
        strokeWidth="2"
      />
      <rect
        x="13"
        y="41"
        width="38"
        height="7"
        rx="2"
        className={lit ? 'fill-marigold stroke-ink' : 'fill-card stroke-ink'}
        strokeWidth="2"
      />
    </svg>
  );
}

/** A lamp at the kit's own pace, never faster than three flashes a second, and off until asked for. */
export function LampPreview({ frequencyHz, duty }: { frequencyHz: number; duty: number }) {
  const reduced = useReducedMotion();
  const [asked, setAsked] = useState(false);
  const allowed = frequencyHz <= lampLimitHertz;
  const lit = useBlink(1 / frequencyHz, duty, asked && allowed);
  if (!allowed) {
    return (
      <p className="text-soft">
        No lamp is shown here: at {formatQuantity(frequencyHz, 'Hz')} it would flash more than three
        times a second, and no screen of ours does that.
      </p>
    );
  }
  return (
    <div className="flex items-center gap-4">
      <Lamp lit={lit} />
      <div>
        <Button look="outline" size="small" onClick={() => setAsked(!asked)}>
          {asked ? 'Stop the lamp' : 'Show the pace on a lamp'}
        </Button>
        {reduced && !asked && (
          <p className="mt-1 text-small text-soft">
            Your system asks for less motion; it stays off until you start it.
          </p>
        )}
      </div>
    </div>
  );
}
