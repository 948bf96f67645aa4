import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import type { z } from 'zod';
import { changeStockSchema, stockReasons } from '../../../../server/contracts/desk.ts';
import type { DeskPart } from '../../../../server/contracts/desk.ts';
import { sentenceOf } from '../../../lib/problem-error.ts';
import { Button } from '../../../ui/button.tsx';
import { Field, Select } from '../../../ui/field.tsx';
import { Notice } from '../../../ui/notice.tsx';
import { useChangeStock } from '../api/parts.ts';

type Values = z.infer<typeof changeStockSchema>;

const reasons: Record<(typeof stockReasons)[number], string> = {
  counted: 'Counted: the ledger was off',
  received: 'Received: more came in',
  damaged: 'Damaged: thrown away',
  lost: 'Lost',
  found: 'Found again',
  returned: 'Returned by a maker',
};

/** What is in the bin now, and why that differs from the ledger. */
export function StockForm(props: {
  part: DeskPart;
  lot: DeskPart['lots'][number];
  onDone: (onHand: number) => void;
}) {
  const { lot } = props;
  const change = useChangeStock(props.part.id);
  const form = useForm<Values>({
    resolver: zodResolver(changeStockSchema),
    defaultValues: { lotId: lot.id, onHand: lot.onHand, reason: 'counted', note: '' },
  });
  const { errors } = form.formState;
  const save = (values: Values) =>
    change.mutate(values, { onSuccess: () => props.onDone(values.onHand) });
  return (
    <form
      noValidate
      className="space-y-4"
      onSubmit={(event) => void form.handleSubmit(save)(event)}
    >
      <Field
        label="In the bin now"
        inputMode="numeric"
        autoComplete="off"
        hint={lot.reserved > 0 ? `${lot.reserved} of them are promised to orders.` : undefined}
        error={errors.onHand?.message}
        {...form.register('onHand', { setValueAs: wholeNumber })}
      />
      <Select
        label="Why"
        options={stockReasons.map((value) => ({ value, label: reasons[value] }))}
        error={errors.reason?.message}
        {...form.register('reason')}
      />
      <Field
        label="Note"
        hint="For whoever reads the ledger later."
        error={errors.note?.message}
        {...form.register('note')}
      />
      {change.isError && (
        <Notice tone="danger" urgent title="Not changed">
          {sentenceOf(change.error)}
        </Notice>
      )}
      <Button type="submit" busy={change.isPending} busyWords="Writing it down">
        Write it into the ledger
      </Button>
    </form>
  );
}

/** Digits as a number; anything else as NaN, so that "12a" is refused and not read as 12. */
function wholeNumber(typed: unknown): number {
  if (typeof typed === 'number') return typed;
  const text = typeof typed === 'string' ? typed.trim() : '';
  return /^-?\d+$/.test(text) ? Number(text) : NaN;
}
