import { clsx } from 'clsx';
import { useNavigate } from 'react-router-dom';
import type { QueueItem } from '../../../../server/contracts/bench.ts';
import { sentenceOf } from '../../../lib/problem-error.ts';
import { bindUnits, keepTogether } from '../../../lib/spaces.ts';
import { Button, ButtonLink } from '../../../ui/button.tsx';
import { useMove } from '../api/bench-order.ts';
import { benchPaths } from '../bench-paths.ts';
import { shipByWords, timeLeftWords } from '../ship-by.ts';
import { Beads } from './beads.tsx';
import { LateFlag } from './late-flag.tsx';

export interface QueueLineProps {
  item: QueueItem;
  isLead: boolean;
  /** What the page says of a claim: the shop's refusal, or null while a new claim is under way. */
  onClaimSaid: (sentence: string | null) => void;
}

/** One order in the queue: when it must leave, what it is, who has it, and the one thing to do. */
export function QueueLine(props: QueueLineProps) {
  const { item } = props;
  const now = new Date();
  return (
    <li
      className={clsx(
        'ledger-line grid items-center gap-x-8 gap-y-3 py-5 md:grid-cols-[10.5rem_1fr_auto]',
        item.late && 'border-l-[6px] border-l-brick pl-4 md:-ml-[1.375rem]',
      )}
    >
      <div className="flex flex-wrap items-baseline gap-x-3 md:block">
        <time dateTime={item.shipBy} className="block text-title leading-tight font-heavy">
          {shipByWords(item.shipBy, now)}
        </time>
        <span className={clsx('block', item.late ? 'font-heavy text-brick' : 'text-soft')}>
          {item.late && <LateFlag />}
          {keepTogether(timeLeftWords(item.shipBy, now))}
        </span>
      </div>
      <div className="min-w-0">
        <h2 className="text-title leading-tight font-heavy">{item.ref}</h2>
        <p className="flex flex-wrap gap-x-4 text-soft">
          <span>
            {item.kits === 1 ? 'one kit' : `${item.kits} kits`} · {item.shippingMethod}
          </span>
          <Beads stops={item.stops} />
        </p>
        <p className="mt-1 max-w-prose">{bindUnits(item.sentence)}</p>
      </div>
      <Todo {...props} />
    </li>
  );
}

function Todo(props: QueueLineProps) {
  const { item, isLead } = props;
  if (item.claimedBy === null || item.status === 'paid') {
    return <Claim {...props} />;
  }
  const done = item.status === 'packed' ? 'packed' : 'picking';
  if (!item.mine) {
    return (
      <p className="md:min-w-44 md:text-right">
        <strong className="font-heavy">{item.claimedBy}</strong>
        <span className="block text-soft">
          {done === 'packed' ? 'has packed it' : 'is picking it'}
        </span>
      </p>
    );
  }
  return (
    <div className="md:min-w-44 md:text-right">
      <ButtonLink
        size="bench"
        look={isLead ? 'solid' : 'outline'}
        to={benchPaths.order.link(item.ref)}
        aria-label={`${done === 'packed' ? 'Ship' : 'Continue'} ${item.ref}`}
        className="max-md:w-full"
      >
        {done === 'packed' ? 'Ship' : 'Continue'}
      </ButtonLink>
      <span className="mt-1 block text-small text-soft">
        you {done === 'packed' ? 'packed it' : 'are picking it'}
      </span>
    </div>
  );
}

function Claim({ item, isLead, onClaimSaid }: QueueLineProps) {
  const claim = useMove(item.ref, (error) => onClaimSaid(sentenceOf(error)));
  const navigate = useNavigate();
  const take = () => {
    onClaimSaid(null);
    claim.mutate('claim', { onSuccess: () => void navigate(benchPaths.order.link(item.ref)) });
  };
  return (
    <div className="md:max-w-56 md:min-w-44 md:text-right">
      <Button
        size="bench"
        look={isLead ? 'solid' : 'outline'}
        busy={claim.isPending}
        busyWords="Claiming"
        aria-label={`Claim ${item.ref}`}
        className="max-md:w-full"
        onClick={take}
      >
        Claim
      </Button>
    </div>
  );
}
