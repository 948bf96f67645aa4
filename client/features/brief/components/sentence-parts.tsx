import { useState } from 'react';
import type { Shop } from '../../../../server/contracts/shop.ts';
import { readNumber } from '../../../lib/format-number.ts';
import { narrow, noBreak } from '../../../lib/spaces.ts';
import { defaultBattery, isClock, litWords } from '../model.ts';
import type { BriefDraft, BriefErrors, Unit } from '../model.ts';
import { FactChoice, FactNumber, Whole } from './fact.tsx';
import type { FactOption } from './fact.tsx';

export interface PartProps {
  draft: BriefDraft;
  errors: BriefErrors;
  change: (patch: Partial<BriefDraft>) => void;
  errorId: string;
}

export function LoadFact(props: PartProps & { colours: readonly string[] }) {
  const options: FactOption[] = [
    ...props.colours.map((colour) => ({ value: colour, label: `${colour}${noBreak}LED` })),
    { value: 'clock', label: `logic${noBreak}clock` },
  ];
  return (
    <FactChoice
      label="What it drives"
      value={props.draft.load}
      options={options}
      onChange={(load) => props.change({ load })}
      error={props.errors.load}
      errorId={props.errorId}
    />
  );
}

const unitOptions: readonly (FactOption & { value: Unit })[] = [
  { value: 'per_minute', label: 'times a minute' },
  { value: 'Hz', label: 'times a second (Hz)', shown: 'Hz' },
  { value: 'kHz', label: 'thousand times a second (kHz)', shown: 'kHz' },
  { value: 's', label: 'seconds for each beat', shown: 'seconds' },
  { value: 'ms', label: 'milliseconds for each beat', shown: 'milliseconds' },
];

export function RateFact(props: PartProps) {
  const { draft } = props;
  const isPeriod = draft.unit === 's' || draft.unit === 'ms';
  const lead = isPeriod ? 'every ' : draft.unit === 'per_minute' ? '' : 'at ';
  return (
    <>
      {lead}
      <Whole>
        <FactNumber
          label={isPeriod ? 'Time of one beat' : 'Rate'}
          value={draft.rate}
          onChange={(rate) => props.change({ rate })}
          error={props.errors.rate}
          errorId={props.errorId}
        />
        {noBreak}
        <FactChoice
          label="Unit of the rate"
          value={draft.unit}
          options={unitOptions.map((each) =>
            isPeriod && readNumber(draft.rate) === 1
              ? { ...each, shown: each.shown?.replace(/s$/, '') }
              : each,
          )}
          onChange={(unit) =>
            props.change({ unit: unitOptions.find((each) => each.value === unit)?.value ?? 'Hz' })
          }
          errorId={props.errorId}
        />
        ,
      </Whole>
    </>
  );
}

export function LitFact(props: PartProps) {
  const known = litWords.some((each) => each.value === props.draft.lit);
  const [typing, setTyping] = useState(!known);
  const typed = typing || !known;
  const options: FactOption[] = [
    ...litWords.map((each) => ({
      value: each.value,
      label: `${each.words} (${Math.round(Number(each.value))}${narrow}%)`,
      shown: each.words,
    })),
    { value: 'typed', label: 'another share …', shown: '%' },
  ];
  return (
    <Whole>
      {typed && (
        <>
          <FactNumber
            label={isClock(props.draft) ? 'High share of each cycle' : 'Lit share of each beat'}
            value={props.draft.lit}
            onChange={(lit) => props.change({ lit })}
            error={props.errors.lit}
            errorId={props.errorId}
          />
          {narrow}
        </>
      )}
      <FactChoice
        label={isClock(props.draft) ? 'High share in words' : 'Lit share in words'}
        value={typed ? 'typed' : props.draft.lit}
        options={options}
        onChange={(value) => {
          setTyping(value === 'typed');
          if (value !== 'typed') props.change({ lit: value });
        }}
        errorId={props.errorId}
      />
    </Whole>
  );
}

export function SupplyFact(props: PartProps & { shop: Shop | undefined }) {
  const { draft, shop } = props;
  const first = shop === undefined ? undefined : defaultBattery(shop);
  const options: FactOption[] = [
    ...(shop?.batteries ?? []).map((each) => ({ value: each.sku, label: each.words })),
    { value: 'volts', label: 'another supply, by its voltage …', shown: 'volts' },
  ];
  if (first === undefined) options.unshift({ value: '', label: `two${noBreak}AA${noBreak}cells` });
  return (
    <Whole>
      {draft.supply === 'volts' && (
        <>
          <FactNumber
            label="Supply voltage"
            value={draft.volts}
            onChange={(volts) => props.change({ volts })}
            error={props.errors.volts}
            errorId={props.errorId}
          />
          {noBreak}
        </>
      )}
      <FactChoice
        label="Supply"
        value={draft.supply === '' ? (first?.sku ?? '') : draft.supply}
        options={options}
        onChange={(supply) => props.change({ supply })}
        error={props.errors.supply}
        errorId={props.errorId}
      />
      ,
    </Whole>
  );
}

export function BandFact(props: PartProps) {
  return (
    <Whole>
      <strong className="font-heavy text-spruce">±{narrow}</strong>
      <FactNumber
        label="Band, per cent either side"
        value={props.draft.band}
        onChange={(band) => props.change({ band })}
        error={props.errors.band}
        errorId={props.errorId}
      />
      <strong className="font-heavy text-spruce">{narrow}%</strong>,
    </Whole>
  );
}

export function AmbientFact(props: PartProps) {
  return (
    <>
      <FactNumber
        label="Lowest temperature, degrees Celsius"
        value={props.draft.from}
        onChange={(from) => props.change({ from })}
        error={props.errors.from}
        errorId={props.errorId}
      />
      {' and '}
      <Whole>
        <FactNumber
          label="Highest temperature, degrees Celsius"
          value={props.draft.to}
          onChange={(to) => props.change({ to })}
          error={props.errors.to}
          errorId={props.errorId}
        />
        <strong className="font-heavy text-spruce">{narrow}°C</strong>.
      </Whole>
    </>
  );
}
