import { Lightbulb } from 'lucide-react';
import type { Pack } from '../../../../server/contracts/packs.ts';
import { bindUnits } from '../../../lib/spaces.ts';
import { careWords } from '../model.ts';

/** Why the pack is built the way it is, how the shop treats it, and what to know of it. */
export function Making({ pack }: { pack: Pack }) {
  const care = careWords(pack);
  return (
    <section aria-labelledby="making">
      <h2 id="making" className="text-title font-strong">
        Why it is built this way
      </h2>
      <p className="mt-1">{bindUnits(pack.why)}</p>
      <p className="mt-3">
        <strong className="font-heavy">{care.name}</strong>: {care.meaning}.
      </p>
      {pack.notes.length > 0 && (
        <ul aria-label="Good to know" className="mt-4 space-y-2">
          {pack.notes.map((note) => (
            <li
              key={note.code}
              className="flex gap-3 border-l-[6px] border-spruce bg-wash px-4 py-2.5"
            >
              <Lightbulb aria-hidden="true" className="mt-0.5 size-5 shrink-0 text-spruce" />
              <span>{bindUnits(note.text)}</span>
            </li>
          ))}
        </ul>
      )}
    </section>
  );
}
