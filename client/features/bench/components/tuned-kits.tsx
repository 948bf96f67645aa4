import type { BenchOrder, TunedUnit } from '../../../../server/contracts/bench.ts';
import { bindUnits } from '../../../lib/spaces.ts';
import { Button } from '../../../ui/button.tsx';

type Line = BenchOrder['lines'][number];

function tunedOf({ tuning }: Line): TunedUnit[] {
  return tuning?.units.flatMap((kit) => (kit.farads === null ? [] : [kit])) ?? [];
}

/** The kits that are tuned so far, each to be measured again where its capacitor was changed. */
export function TunedKits(props: {
  order: BenchOrder;
  onAgain: (lineId: string, unit: number) => void;
}) {
  const lines = props.order.lines.filter((line) => tunedOf(line).length > 0);
  if (lines.length === 0) return null;
  return (
    <section aria-label="Tuned so far" className="mt-10">
      <h2 className="border-b-2 border-ink pb-1 text-lead font-heavy">Tuned so far</h2>
      {lines.map((line) => (
        <ol key={line.id}>
          {tunedOf(line).map((kit) => (
            <li key={kit.unit} className="ledger-line">
              <div className="grid items-center gap-x-6 pt-2 sm:grid-cols-[1fr_auto] sm:pt-0">
                <KitLine kit={kit} />
                <Button
                  look="plain"
                  size="bench"
                  className="max-sm:-ml-6 max-sm:justify-self-start sm:-mr-6"
                  aria-label={`Measure kit ${kit.unit} again`}
                  onClick={() => props.onAgain(line.id, kit.unit)}
                >
                  Measure again
                </Button>
              </div>
            </li>
          ))}
        </ol>
      ))}
    </section>
  );
}

/** Which capacitor and which R4 go into which bag, as the bag slip has it. */
export function KitsOfLine({ line }: { line: Line }) {
  return (
    <ol aria-label="What belongs together" className="mt-3">
      {tunedOf(line).map((kit) => (
        <li key={kit.unit} className="ledger-line py-2">
          <KitLine kit={kit} />
        </li>
      ))}
    </ol>
  );
}

function KitLine({ kit }: { kit: TunedUnit }) {
  const { text } = kit.promise;
  const parts = kit.take.map((part) => `${part.role} ${part.label}`).join(` and `);
  return (
    <span className="min-w-0">
      <strong className="font-heavy">Kit {kit.unit}</strong>: C1 {kit.reading}, {bindUnits(parts)}
      {kit.join !== null && ` in ${kit.join}`} →{' '}
      <span className="whitespace-nowrap">
        {text.rate} {text.unit} {bindUnits(text.band)}
      </span>
    </span>
  );
}
