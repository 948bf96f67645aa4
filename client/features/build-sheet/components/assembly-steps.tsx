import { z } from 'zod';
import { clsx } from 'clsx';
import type { BuildSheet } from '../../../../server/contracts/orders.ts';
import { bindUnits } from '../../../lib/spaces.ts';
import { useStored } from '../../../lib/use-stored.ts';

const doneSchema = z.array(z.int().min(0)).max(100);

/** The order of assembly; what is ticked stays ticked in this browser. */
export function AssemblySteps(props: {
  sheet: BuildSheet;
  onLight: (roles: readonly string[]) => void;
}) {
  const { sheet, onLight } = props;
  const [done, setDone] = useStored(`tockwell-built-${sheet.ref}-${sheet.lineId}`, doneSchema, []);
  const toggle = (index: number) =>
    setDone(done.includes(index) ? done.filter((each) => each !== index) : [...done, index]);
  return (
    <>
      <p className="no-print text-soft" aria-live="polite">
        {done.length === 0
          ? 'Nothing ticked yet.'
          : `${done.length} of ${sheet.steps.length} done.`}
      </p>
      <ol className="mt-2 border-t-2 border-ink">
        {sheet.steps.map((step, index) => {
          const ticked = done.includes(index);
          return (
            <li
              key={step.title}
              className="ledger-line"
              onPointerEnter={() => onLight(step.roles)}
              onPointerLeave={() => onLight([])}
            >
              <label className="flex items-start gap-4 py-3">
                <input
                  type="checkbox"
                  className="mt-0.5 size-6 shrink-0"
                  checked={ticked}
                  onChange={() => toggle(index)}
                  onFocus={() => onLight(step.roles)}
                  onBlur={() => onLight([])}
                />
                <span className={clsx(ticked && 'text-soft')}>
                  <span className={clsx('block font-heavy', ticked && 'line-through decoration-2')}>
                    {index + 1}. {step.title}
                  </span>
                  {bindUnits(step.text)}
                </span>
              </label>
            </li>
          );
        })}
      </ol>
    </>
  );
}
