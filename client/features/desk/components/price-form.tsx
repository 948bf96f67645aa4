import { zodResolver } from '@hookform/resolvers/zod';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import type { z } from 'zod';
import type { DeskPart } from '../../../../server/contracts/desk.ts';
import { formatMoney } from '../../../lib/format-money.ts';
import { formatPercent } from '../../../lib/format-number.ts';
import { sentenceOf } from '../../../lib/problem-error.ts';
import { Button } from '../../../ui/button.tsx';
import { Field } from '../../../ui/field.tsx';
import { Money } from '../../../ui/money.tsx';
import { Notice } from '../../../ui/notice.tsx';
import { useChangePrice } from '../api/parts.ts';
import { eurosText, priceFormSchema } from '../euros.ts';

type Typed = z.input<typeof priceFormSchema>;
type Read = z.output<typeof priceFormSchema>;

/** What one piece costs and sells for, and the way to change that. */
export function PriceForm({ part }: { part: DeskPart }) {
  const { unitPrice } = part.part;
  return (
    <section aria-labelledby="price">
      <h2 id="price" className="mb-2 text-title font-strong">
        What it costs
      </h2>
      <div className="border-t-2 border-ink pt-3">
        <p className="flex flex-wrap items-baseline gap-x-3">
          <Money value={unitPrice} className="text-display leading-tight font-heavy" />
          <span className="text-soft">
            net, a piece; bought at <Money value={part.cost} />
            {unitPrice.amount > 0 &&
              `, margin ${formatPercent(1 - part.cost.amount / unitPrice.amount)}`}
          </span>
        </p>
        <ChangePrice part={part} />
      </div>
    </section>
  );
}

function ChangePrice({ part }: { part: DeskPart }) {
  const change = useChangePrice(part.id);
  const [changed, setChanged] = useState<string | null>(null);
  const form = useForm<Typed, unknown, Read>({
    resolver: zodResolver(priceFormSchema),
    values: { euros: eurosText(part.part.unitPrice.amount), reason: '' },
  });
  const { errors } = form.formState;
  const save = (values: Read) => {
    setChanged(null);
    change.mutate(values, {
      onSuccess: (after) => setChanged(`The price is ${formatMoney(after.part.unitPrice)} now.`),
    });
  };
  return (
    <form
      noValidate
      className="mt-4 grid gap-x-5 gap-y-4 sm:grid-cols-[8rem_1fr]"
      onSubmit={(event) => void form.handleSubmit(save)(event)}
    >
      <Field
        label="New price"
        unit="€"
        inputMode="decimal"
        autoComplete="off"
        error={errors.euros?.message}
        {...form.register('euros')}
      />
      <Field label="Reason" error={errors.reason?.message} {...form.register('reason')} />
      <div className="space-y-3 sm:col-span-2">
        {change.isError && (
          <Notice tone="danger" urgent title="Not changed">
            {sentenceOf(change.error)}
          </Notice>
        )}
        <div className="flex flex-wrap items-center gap-4">
          <Button type="submit" look="outline" busy={change.isPending} busyWords="Changing">
            Change the price
          </Button>
          <span role="status" className="font-strong">
            {changed}
          </span>
        </div>
      </div>
    </form>
  );
}
