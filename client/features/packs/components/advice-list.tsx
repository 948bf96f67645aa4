import type { Advice } from '../../../../server/contracts/packs.ts';
import { bindUnits } from '../../../lib/spaces.ts';
import { Button } from '../../../ui/button.tsx';

/** What would help, each as a sentence with its one-tap change. */
export function AdviceList(props: {
  advice: readonly Advice[];
  onApply: (change: Record<string, unknown>) => void;
}) {
  if (props.advice.length === 0) return null;
  return (
    <ul aria-label="What would help" className="border-t border-line">
      {props.advice.map((each, index) => {
        const { change } = each;
        return (
          <li
            key={`${each.code}-${index}`}
            className="ledger-line flex flex-wrap items-center justify-between gap-x-8 gap-y-2 py-3"
          >
            <span className="max-w-prose">{bindUnits(each.text)}</span>
            {change !== null && (
              <Button look="outline" size="small" onClick={() => props.onApply(change)}>
                Change my brief
              </Button>
            )}
          </li>
        );
      })}
    </ul>
  );
}
