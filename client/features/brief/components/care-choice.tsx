import { clsx } from 'clsx';
import { useId } from 'react';
import { careLevels } from '../../../../server/contracts/brief.ts';
import type { CareLevel } from '../../../../server/contracts/brief.ts';
import { careOf } from '../model.ts';
import type { BriefDraft } from '../model.ts';

const careWords: Record<CareLevel, { name: string; meaning: string }> = {
  'as-stocked': {
    name: 'As stocked',
    meaning: 'Parts as printed, straight from the bins.',
  },
  'lot-checked': {
    name: 'Lot-checked',
    meaning: 'The capacitor counts by the measured mean of its lot on the shelf.',
  },
  'bench-tuned': {
    name: 'Bench-tuned',
    meaning: 'We measure the very capacitor in your bag and choose R4 for it.',
  },
  'trimmer-fitted': {
    name: 'Trimmer fitted',
    meaning: 'You set the rate yourself with a screwdriver.',
  },
};

/** How much the shop does to a kit before it goes: four levels, each with what it means. */
export function CareChoice(props: {
  draft: BriefDraft;
  error?: string;
  change: (patch: Partial<BriefDraft>) => void;
  className?: string;
}) {
  const id = useId();
  const chosen = careOf(props.draft);
  return (
    <fieldset
      className={props.className}
      aria-describedby={props.error === undefined ? undefined : `${id}-error`}
    >
      <legend className="mb-1 font-strong">Care level</legend>
      <div className="grid gap-2 sm:grid-cols-2 xl:grid-cols-4">
        {careLevels.map((level) => (
          <label
            key={level}
            className={clsx(
              'flex items-start gap-3 rounded-control border-[1.5px] px-3 py-2.5',
              level === chosen ? 'border-spruce bg-wash' : 'border-soft bg-card',
            )}
          >
            <input
              type="radio"
              name={id}
              value={level}
              checked={level === chosen}
              onChange={() => props.change({ care: level })}
              aria-labelledby={`${id}-${level}-name`}
              aria-describedby={`${id}-${level}-meaning`}
              className="mt-0.5 size-5 shrink-0"
            />
            <span>
              <span id={`${id}-${level}-name`} className="block font-strong">
                {careWords[level].name}
              </span>
              <span id={`${id}-${level}-meaning`} className="block text-small text-soft">
                {careWords[level].meaning}
              </span>
            </span>
          </label>
        ))}
      </div>
      {props.error !== undefined && (
        <p id={`${id}-error`} className="mt-1 text-small font-strong text-brick">
          {props.error}
        </p>
      )}
    </fieldset>
  );
}
