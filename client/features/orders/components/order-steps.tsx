import { clsx } from 'clsx';
import type { OrderStatus } from '../../../../server/contracts/orders.ts';
import { stepsOf } from '../model.ts';
import type { Step } from '../model.ts';

const says = { done: 'done', now: 'now', ahead: 'still to come' } as const;

/** The order's walk through the shop as stops on a line. */
export function OrderSteps({ status }: { status: OrderStatus }) {
  const steps = stepsOf(status);
  if (steps === null) return null;
  return (
    <ol aria-label="Progress" className="flex max-w-3xl">
      {steps.map((step, index) => (
        <Stop key={step.status} step={step} last={index === steps.length - 1} />
      ))}
    </ol>
  );
}

function Stop({ step, last }: { step: Step; last: boolean }) {
  return (
    <li
      className={clsx('relative min-w-0', last ? 'flex-none' : 'flex-1')}
      aria-current={step.state === 'now' ? 'step' : undefined}
    >
      {!last && (
        <span
          aria-hidden="true"
          className={clsx(
            'absolute top-[0.6875rem] right-0 left-6 border-t-[3px]',
            step.state === 'done' ? 'border-spruce' : 'border-dotted border-soft',
          )}
        />
      )}
      <svg aria-hidden="true" viewBox="0 0 24 24" className="relative size-6">
        <circle
          cx="12"
          cy="12"
          r="9.5"
          strokeWidth="2.5"
          className={clsx(
            step.state === 'done' && 'fill-spruce stroke-spruce',
            step.state === 'now' && 'fill-marigold stroke-ink',
            step.state === 'ahead' && 'fill-paper stroke-soft',
          )}
        />
        {step.state === 'done' && (
          <path
            d="M7.5 12.5L10.8 15.6L16.6 9"
            fill="none"
            className="stroke-on-spruce"
            strokeWidth="2.5"
            strokeLinecap="round"
            strokeLinejoin="round"
          />
        )}
      </svg>
      <span
        className={clsx(
          'mt-1 block pr-1 text-small sm:text-base',
          step.state === 'now' ? 'font-heavy' : 'text-soft',
        )}
      >
        {step.words}
        <span className="sr-only">, {says[step.state]}</span>
      </span>
    </li>
  );
}
