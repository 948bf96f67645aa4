import { zodResolver } from '@hookform/resolvers/zod';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import type { z } from 'zod';
import { refundRequestSchema } from '../../../../server/contracts/desk.ts';
import type { DeskOrder } from '../../../../server/contracts/desk.ts';
import { formatMoney } from '../../../lib/format-money.ts';
import { sentenceOf } from '../../../lib/problem-error.ts';
import { Button } from '../../../ui/button.tsx';
import { Dialog } from '../../../ui/dialog.tsx';
import { Field } from '../../../ui/field.tsx';
import { LiveRegion } from '../../../ui/live-region.tsx';
import { Notice } from '../../../ui/notice.tsx';
import { useRefund } from '../api/orders.ts';

/** Gives the money back in full, after naming the amount and asking why. */
export function Refund({ order }: { order: DeskOrder }) {
  const [asking, setAsking] = useState(false);
  const [said, setSaid] = useState('');
  const amount = formatMoney(order.refundable);
  if (order.refundable.amount <= 0) return <LiveRegion words={said} />;
  return (
    <section aria-labelledby="refund" className="no-print">
      <h2 id="refund" className="mb-2 text-title font-strong">
        Refund
      </h2>
      <div className="border-t-2 border-ink pt-3">
        <p className="mb-3 text-soft">{order.stockNote}</p>
        <Button look="danger" onClick={() => setAsking(true)}>
          Refund {amount}
        </Button>
      </div>
      <Dialog
        open={asking}
        onOpenChange={setAsking}
        title={`Refund ${amount} for ${order.ref}?`}
        description={`The whole amount goes back to the card, and ${order.email} is told by mail. This cannot be taken back.`}
      >
        <RefundForm
          order={order}
          onDone={() => {
            setAsking(false);
            setSaid(`${amount} refunded.`);
          }}
          onCancel={() => setAsking(false)}
        />
      </Dialog>
    </section>
  );
}

type Values = z.infer<typeof refundRequestSchema>;

function RefundForm(props: { order: DeskOrder; onDone: () => void; onCancel: () => void }) {
  const refund = useRefund(props.order.ref);
  const form = useForm<Values>({
    resolver: zodResolver(refundRequestSchema),
    defaultValues: { reason: '' },
  });
  const save = (values: Values) => refund.mutate(values, { onSuccess: props.onDone });
  return (
    <form
      noValidate
      className="space-y-4"
      onSubmit={(event) => void form.handleSubmit(save)(event)}
    >
      <Field
        label="Reason"
        hint="Kept in the ledger and the audit."
        error={form.formState.errors.reason?.message}
        {...form.register('reason')}
      />
      {refund.isError && (
        <Notice tone="danger" urgent title="Not refunded">
          {sentenceOf(refund.error)}
        </Notice>
      )}
      <div className="flex flex-wrap gap-4">
        <Button type="submit" look="danger" busy={refund.isPending} busyWords="Refunding">
          Refund {formatMoney(props.order.refundable)}
        </Button>
        <Button look="outline" onClick={props.onCancel}>
          Keep the payment
        </Button>
      </div>
    </form>
  );
}
