import type { Marking } from '../../server/contracts/packs.ts';
import { bandColours } from './band-colours.ts';

/** How the part is marked: each band as a swatch with its name beside it, or the printed code. */
export function BandNames({ marking }: { marking: Marking }) {
  if (marking.bands === null) {
    return <span>{marking.code === null ? marking.text : `printed ${marking.code}`}</span>;
  }
  return (
    <span className="inline-flex flex-wrap gap-x-2.5">
      {marking.bands.map((band, index) => (
        <span key={index} className="inline-flex items-center gap-1 whitespace-nowrap">
          <svg aria-hidden="true" viewBox="0 0 6 14" className="h-3.5 w-1.5">
            <rect
              x=".5"
              y=".5"
              width="5"
              height="13"
              fill={bandColours[band] ?? '#999'}
              className="stroke-soft"
            />
          </svg>
          {band}
        </span>
      ))}
    </span>
  );
}
