import { zodResolver } from '@hookform/resolvers/zod';
import { useState } from 'react';
import { useForm, useWatch } from 'react-hook-form';
import type { UseFormReturn } from 'react-hook-form';
import type { Quote } from '../../../../server/contracts/orders.ts';
import { sentenceOf } from '../../../lib/problem-error.ts';
import { formatMoney } from '../../../lib/format-money.ts';
import { bindUnits } from '../../../lib/spaces.ts';
import { Button } from '../../../ui/button.tsx';
import { Check, Field, Select } from '../../../ui/field.tsx';
import { Notice } from '../../../ui/notice.tsx';
import { usePlaceOrder, useQuote } from '../api/checkout.ts';
import { checkoutFormSchema, emptyForm, toCheckout } from '../model.ts';
import { keepTyped, readTyped } from '../typed-before.ts';
import type { Acknowledgement, CheckedForm, CheckoutForm as Values, KnownBuyer } from '../model.ts';
import { Summary } from './summary.tsx';
import { Totals } from './totals.tsx';

type Form = UseFormReturn<Values, unknown, CheckedForm>;

/** One page: who, where, how, what it comes to, what must be known – and the one last button. */
export function CheckoutForm(props: {
  known: KnownBuyer | undefined;
  acknowledgements: readonly Acknowledgement[];
  basketPath: string;
}) {
  const [typedBefore] = useState(readTyped);
  const codes = props.acknowledgements.map((each) => each.code);
  const form = useForm<Values, unknown, CheckedForm>({
    resolver: zodResolver(checkoutFormSchema),
    values: { ...emptyForm(props.known, codes), ...typedBefore },
    resetOptions: { keepDirtyValues: true },
  });
  const place = usePlaceOrder();
  const country = useWatch({ control: form.control, name: 'address.country' });
  const method = useWatch({ control: form.control, name: 'shippingMethod' });
  const quote = useQuote(country, method);
  return (
    <form
      noValidate
      onChange={() => keepTyped(form.getValues())}
      onSubmit={(event) =>
        void form.handleSubmit((values) => place.mutate(toCheckout(values)))(event)
      }
      className="grid items-start gap-x-14 gap-y-10 lg:grid-cols-[1.25fr_1fr]"
    >
      <div className="space-y-10">
        <Contact form={form} />
        <Where form={form} quote={quote.data} />
        <How form={form} quote={quote.data} />
      </div>
      <div className="space-y-6 lg:sticky lg:top-6">
        <Summary quote={quote.data} updating={quote.isFetching} basketPath={props.basketPath} />
        <Totals quote={quote.data} updating={quote.isFetching} error={quote.error} />
        <MustKnow form={form} acknowledgements={props.acknowledgements} />
        {place.isError && (
          <Notice tone="danger" urgent title="The order was not placed">
            {sentenceOf(place.error)}
          </Notice>
        )}
        <Button
          type="submit"
          className="w-full text-lead"
          busy={place.isPending || place.isSuccess}
          busyWords="Reserving your parts"
        >
          Order and pay
        </Button>
        <p className="text-small text-soft">
          You pay on the card page that opens next. Your parts are set aside for you until then.
        </p>
      </div>
    </form>
  );
}

function Group({ title, children }: { title: string; children: React.ReactNode }) {
  return (
    <fieldset>
      <legend className="mb-4 w-full border-b-2 border-ink pb-1 text-title font-strong">
        {title}
      </legend>
      <div className="grid gap-x-6 gap-y-4 sm:grid-cols-2">{children}</div>
    </fieldset>
  );
}

function Contact({ form }: { form: Form }) {
  return (
    <Group title="Who is it for?">
      <Field
        label="E-mail"
        type="email"
        autoComplete="email"
        className="sm:col-span-2"
        hint="For the confirmation and the build sheet; for nothing else."
        error={form.formState.errors.email?.message}
        {...form.register('email')}
      />
    </Group>
  );
}

function Where({ form, quote }: { form: Form; quote: Quote | undefined }) {
  const errors = form.formState.errors.address;
  const countries = quote?.countries ?? [{ code: 'IE', name: 'Ireland' }];
  return (
    <Group title="Where does it go?">
      <Field
        label="Name"
        autoComplete="name"
        className="sm:col-span-2"
        error={errors?.name?.message}
        {...form.register('address.name')}
      />
      <Field
        label="Street and number"
        autoComplete="address-line1"
        className="sm:col-span-2"
        error={errors?.line1?.message}
        {...form.register('address.line1')}
      />
      <Field
        label="Second line (if needed)"
        autoComplete="address-line2"
        className="sm:col-span-2"
        error={errors?.line2?.message}
        {...form.register('address.line2')}
      />
      <Field
        label="Town"
        autoComplete="address-level2"
        error={errors?.city?.message}
        {...form.register('address.city')}
      />
      <Field
        label="Post code"
        autoComplete="postal-code"
        error={errors?.postalCode?.message}
        {...form.register('address.postalCode')}
      />
      <Field
        label="Region (if needed)"
        autoComplete="address-level1"
        error={errors?.region?.message}
        {...form.register('address.region')}
      />
      <Select
        label="Country"
        autoComplete="country"
        options={countries.map((each) => ({ value: each.code, label: each.name }))}
        error={errors?.country?.message}
        {...form.register('address.country')}
      />
    </Group>
  );
}

function How({ form, quote }: { form: Form; quote: Quote | undefined }) {
  return (
    <fieldset>
      <legend className="mb-2 w-full border-b-2 border-ink pb-1 text-title font-strong">
        How is it sent?
      </legend>
      {(quote?.methods ?? []).map((method) => (
        <label key={method.code} className="ledger-line flex min-h-12 items-center gap-3 py-2">
          <input
            type="radio"
            value={method.code}
            className="size-6 shrink-0"
            {...form.register('shippingMethod')}
          />
          <span className="flex-1">
            <span className="font-strong">{method.name}</span>
            <span className="text-soft"> · {bindUnits(method.days)}</span>
          </span>
          <span className="font-strong">{formatMoney(method.price)}</span>
        </label>
      ))}
      {form.formState.errors.shippingMethod !== undefined && (
        <p className="mt-1 text-small font-strong text-brick">
          {form.formState.errors.shippingMethod.message}
        </p>
      )}
    </fieldset>
  );
}

function MustKnow(props: { form: Form; acknowledgements: readonly Acknowledgement[] }) {
  if (props.acknowledgements.length === 0) return null;
  const errors = props.form.formState.errors.ticks;
  return (
    <fieldset className="border-l-[6px] border-marigold bg-marigold-wash px-4 py-3">
      <legend className="sr-only">Cautions to acknowledge</legend>
      <p className="font-heavy">Before you order</p>
      {props.acknowledgements.map((each) => (
        <Check
          key={each.code}
          label={
            <>
              {bindUnits(each.text)} <strong className="font-heavy">I have read this.</strong>
            </>
          }
          error={errors?.[each.code]?.message}
          {...props.form.register(`ticks.${each.code}`)}
        />
      ))}
    </fieldset>
  );
}
