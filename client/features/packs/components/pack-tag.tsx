import { clsx } from 'clsx';
import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';
import type { ResolvedBrief } from '../../../../server/contracts/brief.ts';
import type { Pack } from '../../../../server/contracts/packs.ts';
import { keepTogether } from '../../../lib/spaces.ts';
import { Money } from '../../../ui/money.tsx';
import { PartDrawing } from '../../../ui/part-drawing.tsx';
import { PulseStrip } from '../../../ui/pulse-strip.tsx';
import { Scale } from '../../../ui/scale.tsx';
import { Tag, TagHead } from '../../../ui/tag.tsx';
import {
  bandOff,
  careWords,
  hasFlashCaution,
  makeableWords,
  reasonFor,
  tagParts,
  yieldClause,
} from '../model.ts';

export interface PackTagProps {
  pack: Pack;
  brief: ResolvedBrief;
  packPath: string;
  /** The button that puts this pack in the basket. */
  action: ReactNode;
}

/** A pack as it hangs on the rail. */
export function PackTag({ pack, brief, packPath, action }: PackTagProps) {
  const reason = reasonFor(pack, brief.band);
  const { rate, unit } = pack.promise.text;
  return (
    <Tag as="article" className="w-full" label={`${reason.title}: ${rate} ${unit}`}>
      <TagHead>
        {reason.title}
        <span className="block text-small font-normal text-soft">{reason.meaning}</span>
      </TagHead>
      <div className="bg-wash/70">
        <PulseStrip strip={pack.strip} className="h-[4.5rem]" />
      </div>
      <div className="flex flex-1 flex-col px-5 pt-4 pb-2 sm:px-6">
        <Rate pack={pack} brief={brief} packPath={packPath} />
        <div className="mt-auto pt-4">
          <ScaleOf pack={pack} brief={brief} />
          <TagParts pack={pack} />
          <div className="mt-4 flex flex-wrap items-end justify-between gap-x-4 gap-y-3 border-t border-line pt-4">
            <div>
              <Money value={pack.price.unit} className="text-head leading-none font-heavy" />
              <span className="block text-small text-soft">
                {brief.quantity === 1 ? (
                  'a kit, with tax'
                ) : (
                  <>
                    a kit; {brief.quantity} come to <Money value={pack.price.total} />
                  </>
                )}
              </span>
            </div>
            {action}
          </div>
        </div>
      </div>
    </Tag>
  );
}

function Rate({ pack, brief, packPath }: Omit<PackTagProps, 'action'>) {
  const { text } = pack.promise;
  return (
    <>
      <h3 className="flex flex-wrap items-baseline gap-x-2">
        <Link
          to={packPath}
          className="text-display leading-none font-heavy decoration-spruce decoration-2 underline-offset-8 hover:underline"
        >
          {text.rate}
        </Link>
        <span className="text-lead text-soft">
          {keepTogether(text.unit)}, {keepTogether(text.band)}
        </span>
      </h3>
      <p className="mt-2 text-soft">
        <span className="font-strong text-ink">{careWords(pack).name}.</span>{' '}
        {yieldClause(pack, brief)}; {makeableWords(pack.makeable)}.
        {hasFlashCaution(pack) && (
          <strong className="block font-strong text-marigold-ink">
            Flashes in the range that can trigger seizures.
          </strong>
        )}
      </p>
      <p className="mt-1">
        <Link to={packPath} className="link inline-block py-1">
          See the promise and the drawing
        </Link>
      </p>
    </>
  );
}

function ScaleOf({ pack, brief }: { pack: Pack; brief: ResolvedBrief }) {
  const { low, high } = bandOff(pack, brief.targetHz);
  return <Scale asked={brief.band} error={pack.promise.error} low={low} high={high} />;
}

function TagParts({ pack }: { pack: Pack }) {
  const parts = tagParts(pack);
  return (
    <ul
      aria-label="Timing parts"
      className="mt-3 flex min-h-[5.75rem] flex-wrap items-end justify-between gap-x-2 gap-y-3 border-t border-line pt-4"
    >
      {parts.map((each) => (
        <li key={each.key} className="flex min-w-0 flex-1 flex-col items-center text-center">
          <PartDrawing part={each.part} />
          <span
            className={clsx('mt-1 font-strong whitespace-nowrap', parts.length > 3 && 'text-small')}
          >
            {each.value}
          </span>
          <span className="text-small text-soft">{each.roles}</span>
        </li>
      ))}
    </ul>
  );
}
