import type { Caution } from '../../../../server/contracts/packs.ts';
import { Notice } from '../../../ui/notice.tsx';

/** Cautions that an order must acknowledge: they stand before everything else. */
export function GraveCautions({ cautions }: { cautions: readonly Caution[] }) {
  return cautions
    .filter((caution) => caution.mustAcknowledge)
    .map((caution) => (
      <Notice key={caution.code} tone="caution">
        <p className="text-lead font-strong">{caution.text}</p>
      </Notice>
    ));
}

/** The cautions that come with every kit. */
export function PlainCautions({ cautions }: { cautions: readonly Caution[] }) {
  const plain = cautions.filter((caution) => !caution.mustAcknowledge);
  if (plain.length === 0) return null;
  return (
    <section aria-labelledby="mind">
      <h2 id="mind" className="text-title font-strong">
        Mind this
      </h2>
      <ul className="mt-2 space-y-2 border-l-[6px] border-line pl-4">
        {plain.map((caution) => (
          <li key={caution.code}>{caution.text}</li>
        ))}
      </ul>
    </section>
  );
}
