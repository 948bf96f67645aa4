import type { Caution } from '../../../../server/contracts/packs.ts';
import { Notice } from '../../../ui/notice.tsx';

/** Cautions: those that must be acknowledged stand out, the others read as plain lines. */
export function Cautions({ cautions }: { cautions: readonly Caution[] }) {
  const grave = cautions.filter((caution) => caution.mustAcknowledge);
  const others = cautions.filter((caution) => !caution.mustAcknowledge);
  return (
    <section aria-label="Cautions" className="space-y-3">
      {grave.map((caution) => (
        <Notice key={caution.code} tone="caution">
          <p className="text-lead font-strong">{caution.text}</p>
        </Notice>
      ))}
      {others.length > 0 && (
        <ul className="grid gap-x-10 gap-y-2 border-l-[6px] border-line py-1 pl-4 sm:grid-cols-2">
          {others.map((caution) => (
            <li key={caution.code}>{caution.text}</li>
          ))}
        </ul>
      )}
    </section>
  );
}
