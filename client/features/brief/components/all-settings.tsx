import { useShop } from '../../../lib/shop.ts';
import { Field, Select } from '../../../ui/field.tsx';
import { defaultBattery, isClock } from '../model.ts';
import type { BriefDraft, BriefErrors, BriefField } from '../model.ts';
import { CareChoice } from './care-choice.tsx';

interface SettingsProps {
  draft: BriefDraft;
  errors: BriefErrors;
  change: (patch: Partial<BriefDraft>) => void;
}

const unitOptions = [
  { value: 'per_minute', label: 'times a minute' },
  { value: 'Hz', label: 'Hz' },
  { value: 'kHz', label: 'kHz' },
  { value: 's', label: 's for each beat' },
  { value: 'ms', label: 'ms for each beat' },
] as const;

const rankOptions = [
  { value: 'best-value', label: 'best value: the cheapest that holds the band' },
  { value: 'closest', label: 'closest: nominal nearest to the rate' },
  { value: 'steadiest', label: 'steadiest: the narrowest guaranteed band' },
];

function typed(props: SettingsProps, field: BriefField) {
  return {
    value: props.draft[field],
    error: props.errors[field],
    onChange: (event: { target: { value: string } }) =>
      props.change({ [field]: event.target.value }),
  };
}

/** Every field of the brief, for those who want them all. */
export function AllSettings(props: SettingsProps & { id: string }) {
  return (
    <section
      id={props.id}
      aria-label="All settings"
      className="mt-6 grid animate-rise gap-x-8 gap-y-5 border-t-2 border-b border-t-ink border-b-line py-6 sm:grid-cols-2 lg:grid-cols-3"
    >
      <TargetSettings {...props} />
      <SupplySettings {...props} />
      <HowSettings {...props} />
      <CareChoice
        className="sm:col-span-2 lg:col-span-3"
        draft={props.draft}
        error={props.errors.care}
        change={props.change}
      />
    </section>
  );
}

function TargetSettings(props: SettingsProps) {
  const clock = isClock(props.draft);
  return (
    <>
      <div className="grid grid-cols-[1fr_1.4fr] gap-3">
        <Field label="Rate" inputMode="decimal" required {...typed(props, 'rate')} />
        <Select
          label="Unit"
          options={unitOptions}
          value={props.draft.unit}
          onChange={(event) => {
            const unit = unitOptions.find((each) => each.value === event.target.value);
            if (unit !== undefined) props.change({ unit: unit.value });
          }}
        />
      </div>
      <Field
        label={clock ? 'High share of each cycle' : 'Lit share of each beat'}
        unit="%"
        inputMode="decimal"
        {...typed(props, 'lit')}
      />
      <Field label="Band, either side" unit="± %" inputMode="decimal" {...typed(props, 'band')} />
    </>
  );
}

function SupplySettings(props: SettingsProps) {
  const shop = useShop();
  const clock = isClock(props.draft);
  const first = shop === undefined ? undefined : defaultBattery(shop);
  const supplies = [
    ...(shop?.batteries ?? []).map((each) => ({ value: each.sku, label: each.words })),
    { value: 'volts', label: 'another supply, by its voltage' },
  ];
  return (
    <>
      <Select
        label="Supply"
        options={supplies}
        {...typed(props, 'supply')}
        value={props.draft.supply === '' ? (first?.sku ?? 'volts') : props.draft.supply}
      />
      {props.draft.supply === 'volts' && (
        <Field label="Supply voltage" unit="V" inputMode="decimal" {...typed(props, 'volts')} />
      )}
      <Select
        label="Load"
        options={[
          ...(shop?.ledColours ?? []).map((colour) => ({ value: colour, label: `${colour} LED` })),
          { value: 'clock', label: 'logic clock' },
        ]}
        {...typed(props, 'load')}
      />
      {!clock && (
        <Field label="LED current" unit="mA" inputMode="decimal" {...typed(props, 'milliamps')} />
      )}
      <div className="grid grid-cols-2 gap-3">
        <Field label="Lowest air" unit="°C" inputMode="text" {...typed(props, 'from')} />
        <Field label="Highest air" unit="°C" inputMode="text" {...typed(props, 'to')} />
      </div>
    </>
  );
}

function HowSettings(props: SettingsProps) {
  return (
    <>
      <Select
        label="Mounting"
        options={[
          { value: 'through-hole', label: 'through-hole' },
          { value: 'surface-mount', label: 'surface-mount' },
        ]}
        {...typed(props, 'mounting')}
      />
      <Field label="Kits" inputMode="numeric" {...typed(props, 'kits')} />
      <Select label="Hang first" options={rankOptions} {...typed(props, 'rank')} />
    </>
  );
}
