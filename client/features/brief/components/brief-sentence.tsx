import { useId } from 'react';
import { ledColours } from '../../../../server/contracts/brief.ts';
import { useShop } from '../../../lib/shop.ts';
import { isClock, rateInOtherWords } from '../model.ts';
import type { BriefDraft, BriefErrors } from '../model.ts';
import {
  AmbientFact,
  BandFact,
  LitFact,
  LoadFact,
  RateFact,
  SupplyFact,
} from './sentence-parts.tsx';

/** The brief as a sentence whose facts are its controls. */
export function BriefSentence(props: {
  draft: BriefDraft;
  errors: BriefErrors;
  change: (patch: Partial<BriefDraft>) => void;
  /** Stands at the end of the helper line. */
  children?: React.ReactNode;
}) {
  const { children, ...state } = props;
  const errorId = useId();
  const shop = useShop();
  const part = { ...state, errorId };
  const clock = isClock(props.draft);
  const inOtherWords = rateInOtherWords(props.draft);
  const wrong = [...new Set(Object.values(props.errors))];
  return (
    <form role="search" aria-label="Your brief" onSubmit={(event) => event.preventDefault()}>
      <div className="max-w-[21em] text-[clamp(1.75rem,0.9rem+3.5vw,3.5rem)] leading-[1.42] font-light">
        Make a <LoadFact {...part} colours={shop?.ledColours ?? ledColours} />{' '}
        {clock ? 'tick ' : 'blink '}
        <RateFact {...part} /> {clock ? 'high' : 'lit'} for <LitFact {...part} /> of each{' '}
        {clock ? 'cycle' : 'beat'}, from <SupplyFact {...part} shop={shop} /> within{' '}
        <BandFact {...part} /> between <AmbientFact {...part} />
      </div>
      <div id={errorId} role={wrong.length > 0 ? 'alert' : undefined}>
        {wrong.map((sentence) => (
          <p key={sentence} className="mt-3 font-strong text-brick">
            {sentence}
          </p>
        ))}
      </div>
      <div className="mt-5 flex flex-wrap items-center gap-x-6 gap-y-1 text-lead text-soft">
        {inOtherWords !== '' && <span>{inOtherWords}</span>}
        {children}
      </div>
    </form>
  );
}
