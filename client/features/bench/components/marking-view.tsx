import type { Marking } from '../../../../server/contracts/packs.ts';
import { bandColours } from '../../../ui/band-colours.ts';

/** How the part in the hand is marked: every band large with its name under it, or the printed code. */
export function MarkingView({ marking }: { marking: Marking }) {
  if (marking.bands !== null) {
    return (
      <ol aria-label="Bands" className="mt-2 flex flex-wrap gap-x-3 gap-y-1.5">
        {marking.bands.map((band, index) => (
          <li key={index} className="flex flex-col items-center gap-1">
            <svg aria-hidden="true" viewBox="0 0 20 30" className="h-7 w-5">
              <rect
                x="1"
                y="1"
                width="18"
                height="28"
                rx="2"
                fill={bandColours[band] ?? '#999'}
                className="stroke-soft"
                strokeWidth="1.5"
              />
            </svg>
            <span className="text-small leading-tight font-strong sm:text-base">{band}</span>
          </li>
        ))}
      </ol>
    );
  }
  if (marking.code === null) {
    return marking.text === '' ? null : <p className="mt-2 text-lead">{marking.text}</p>;
  }
  return (
    <p className="mt-3 text-lead">
      printed{' '}
      <strong className="ml-1 inline-block rounded-edge border-2 border-soft px-2.5 py-0.5 text-title font-heavy">
        {marking.code}
      </strong>
    </p>
  );
}
