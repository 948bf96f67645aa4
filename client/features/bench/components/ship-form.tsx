import { zodResolver } from '@hookform/resolvers/zod';
import { useEffect, useRef } from 'react';
import { useForm } from 'react-hook-form';
import type { UseFormReturn } from 'react-hook-form';
import { shipRequestSchema } from '../../../../server/contracts/bench.ts';
import type { ShipRequest } from '../../../../server/contracts/bench.ts';
import { isProblem, sentenceOf } from '../../../lib/problem-error.ts';
import { Button } from '../../../ui/button.tsx';
import { Notice } from '../../../ui/notice.tsx';
import { useShip } from '../api/bench-order.ts';

type Form = UseFormReturn<ShipRequest>;

/** Who carries the parcel, and its number; both from the carrier's sticker. */
export function ShipForm({
  orderRef,
  carriers,
}: {
  orderRef: string;
  carriers: readonly string[];
}) {
  const ship = useShip(orderRef);
  const form = useForm<ShipRequest>({
    resolver: zodResolver(shipRequestSchema),
    defaultValues: { carrier: carriers.length === 1 ? carriers[0] : '', tracking: '' },
  });
  return (
    <form
      noValidate
      onSubmit={(event) => void form.handleSubmit((values) => ship.mutate(values))(event)}
      className="space-y-6"
    >
      <Carriers form={form} carriers={carriers} />
      <Tracking form={form} />
      {ship.isPending && ship.failureCount > 0 && (
        <Notice tone="caution" title="The connection is down">
          The parcel is written down here and sent again by itself; it is never sent twice.
        </Notice>
      )}
      {ship.isError && (
        <Notice tone="danger" urgent title="Not shipped yet">
          {sentenceOf(ship.error)}
          {!isProblem(ship.error) && ' Press Ship again; it counts only once.'}
        </Notice>
      )}
      <Button
        type="submit"
        size="bench"
        className="min-h-16 w-full"
        busy={ship.isPending}
        busyWords="Shipping"
      >
        Ship it
      </Button>
    </form>
  );
}

function Carriers({ form, carriers }: { form: Form; carriers: readonly string[] }) {
  const error = form.formState.errors.carrier?.message;
  return (
    <fieldset aria-describedby={error === undefined ? undefined : 'carrier-error'}>
      <legend className="mb-2 font-strong">Who takes it?</legend>
      <div className="grid gap-3">
        {carriers.map((carrier) => (
          <label
            key={carrier}
            className="flex min-h-16 items-center gap-3 rounded-control border-2 border-soft bg-card px-4 text-lead font-strong has-checked:border-spruce has-checked:bg-wash"
          >
            <input
              type="radio"
              value={carrier}
              className="size-7 shrink-0"
              {...form.register('carrier')}
            />
            {carrier}
          </label>
        ))}
      </div>
      {error !== undefined && (
        <p id="carrier-error" className="mt-1 font-strong text-brick">
          Choose who takes the parcel.
        </p>
      )}
    </fieldset>
  );
}

function Tracking({ form }: { form: Form }) {
  const error = form.formState.errors.tracking?.message;
  const field = useRef<HTMLInputElement | null>(null);
  const { ref, ...tracking } = form.register('tracking');
  useEffect(() => {
    // Ready for the scanner, with the label still in sight.
    const frame = requestAnimationFrame(() => field.current?.focus({ preventScroll: true }));
    return () => cancelAnimationFrame(frame);
  }, []);
  return (
    <div>
      <label htmlFor="tracking" className="font-strong">
        Tracking number
      </label>
      <input
        id="tracking"
        autoComplete="off"
        spellCheck={false}
        className="control mt-1 min-h-16 border-2 text-head font-heavy"
        aria-invalid={error !== undefined || undefined}
        aria-describedby={error === undefined ? 'tracking-hint' : 'tracking-error'}
        {...tracking}
        ref={(element) => {
          ref(element);
          field.current = element;
        }}
      />
      {error === undefined ? (
        <p id="tracking-hint" className="mt-1 text-soft">
          Scan it from the carrier&apos;s sticker. The maker gets it by mail.
        </p>
      ) : (
        <p id="tracking-error" className="mt-1 font-strong text-brick">
          {error}
        </p>
      )}
    </div>
  );
}
