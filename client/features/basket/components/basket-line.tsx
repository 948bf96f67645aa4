import type { Basket } from '../../../../server/contracts/basket.ts';
import { Link } from 'react-router-dom';
import { sentenceOf } from '../../../lib/problem-error.ts';
import { bindUnits, keepTogether } from '../../../lib/spaces.ts';
import { Button } from '../../../ui/button.tsx';
import { Money } from '../../../ui/money.tsx';
import { Notice } from '../../../ui/notice.tsx';
import { PulseStrip } from '../../../ui/pulse-strip.tsx';
import { Stepper } from '../../../ui/stepper.tsx';
import { Tag } from '../../../ui/tag.tsx';
import { useChangeLine, useRemoveLine } from '../api/basket.ts';

type Line = Basket['lines'][number];

/** One pack in the basket: its tag, its promise in short, how many, and what they come to. */
export function BasketLine({ line, packPath }: { line: Line; packPath: string }) {
  const change = useChangeLine();
  const remove = useRemoveLine();
  const { text } = line.pack.promise;
  const error = change.error ?? remove.error;
  return (
    <li className="ledger-line grid gap-x-8 gap-y-4 py-6 sm:grid-cols-[11rem_1fr_auto]">
      <Tag className="hidden h-28 sm:flex">
        <div className="h-12" />
        <PulseStrip strip={line.pack.strip} className="h-14 bg-wash/70" />
      </Tag>
      <div>
        <h2 className="text-lead leading-snug font-strong">
          <Link
            to={packPath}
            className="decoration-spruce decoration-2 underline-offset-4 hover:underline"
          >
            {bindUnits(line.sentence)}
          </Link>
        </h2>
        <p className="mt-1 text-soft">
          {keepTogether(`${text.rate} ${text.unit}`)}, {keepTogether(text.band)}; every kit between{' '}
          {text.from} and {keepTogether(`${text.to} ${text.unit}`)}.
        </p>
        <div className="mt-3 flex flex-wrap items-center gap-x-4 gap-y-2">
          <Stepper
            label="Kits"
            value={line.quantity}
            min={1}
            max={500}
            disabled={change.isPending || remove.isPending}
            onCommit={(quantity) => change.mutate({ id: line.id, quantity })}
          />
          <span className="text-soft">
            at <Money value={line.unitPrice} />
          </span>
          <Button
            look="plain"
            size="small"
            busy={remove.isPending}
            onClick={() => remove.mutate(line.id)}
          >
            Take out<span className="sr-only">: {line.sentence}</span>
          </Button>
        </div>
        {line.problem !== null && (
          <Notice tone="danger" className="mt-3">
            {bindUnits(line.problem)}
          </Notice>
        )}
        {error !== null && (
          <Notice tone="danger" urgent className="mt-3">
            {sentenceOf(error)}
          </Notice>
        )}
      </div>
      <Money value={line.total} className="text-title font-heavy sm:text-right" />
    </li>
  );
}
