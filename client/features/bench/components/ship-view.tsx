import { zodResolver } from '@hookform/resolvers/zod';
import { useEffect } from 'react';
import { useForm } from 'react-hook-form';
import type { UseFormReturn } from 'react-hook-form';
import { shipRequestSchema } from '../../../../server/contracts/bench.ts';
import type { BenchOrder, ShipRequest } from '../../../../server/contracts/bench.ts';
import { isProblem, sentenceOf } from '../../../lib/problem-error.ts';
import { useShop } from '../../../lib/shop.ts';
import { Button } from '../../../ui/button.tsx';
import { Notice } from '../../../ui/notice.tsx';
import { Tag, TagHead } from '../../../ui/tag.tsx';
import { Waiting } from '../../../ui/waiting.tsx';
import { useShip } from '../api/bench-order.ts';
import { BenchFrame } from './bench-frame.tsx';
import { WalkLine } from './walk-line.tsx';

/** The bag is closed: the address as it stands on the label, who carries it, and its number. */
export function ShipView({ order }: { order: BenchOrder }) {
  const shop = useShop();
  return (
    <BenchFrame
      order={order}
      place="packed"
      line={<WalkLine picks={order.picks} current={null} end="ship" />}
    >
      <h1 className="py-6 text-[clamp(2rem,5vw,4rem)] leading-[1.1] font-light">
        Packed. Now <strong className="font-heavy">send it</strong>.
      </h1>
      <div className="grid items-start gap-x-12 gap-y-8 xl:grid-cols-[1fr_1.2fr]">
        <Label order={order} />
        {shop === undefined ? (
          <Waiting words="Asking which carriers come today" />
        ) : (
          <ShipForm orderRef={order.ref} carriers={shop.carriers} />
        )}
      </div>
    </BenchFrame>
  );
}

function Label({ order }: { order: BenchOrder }) {
  return (
    <Tag label={`Label of ${order.ref}`} as="section">
      <TagHead end={<span className="text-soft">{order.ref}</span>}>{order.shippingMethod}</TagHead>
      <address className="px-6 pb-4 text-title leading-snug not-italic">
        {order.address.map((line, index) => (
          <span key={index} className={index === 0 ? 'block font-heavy' : 'block'}>
            {line}
          </span>
        ))}
      </address>
    </Tag>
  );
}

type Form = UseFormReturn<ShipRequest>;

function ShipForm({ orderRef, carriers }: { orderRef: string; carriers: readonly string[] }) {
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
      <div className="grid gap-3 sm:grid-cols-2">
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
  const { setFocus } = form;
  useEffect(() => {
    const frame = requestAnimationFrame(() => setFocus('tracking'));
    return () => cancelAnimationFrame(frame);
  }, [setFocus]);
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
        {...form.register('tracking')}
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
