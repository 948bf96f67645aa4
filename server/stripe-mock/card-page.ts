import { html, page, type Html } from '../stand-in-look/html.ts';
import { acceptedNumber, declinedNumber, type CardFaults, type CardField } from './card.ts';
import { priceText } from './price-text.ts';
import type { KeptSession } from './state.ts';

export interface PageTrouble {
  faults: CardFaults;
  /** What the bank said, when it said no. */
  decline: string | null;
  /** What may be shown again: never the number or the code. */
  typed: { expiry: string; name: string };
}

interface FieldSign {
  field: CardField;
  label: string;
  hint: string;
  attributes: Html;
}

const numberSign: FieldSign = {
  field: 'number',
  label: 'Card number',
  hint: 'One of the test numbers below',
  attributes: html`inputmode="numeric" autocomplete="cc-number" maxlength="30"`,
};
const expirySign: FieldSign = {
  field: 'expiry',
  label: 'Expiry',
  hint: 'Such as 09/31',
  attributes: html`inputmode="numeric" autocomplete="cc-exp" maxlength="9"`,
};
const codeSign: FieldSign = {
  field: 'code',
  label: 'Security code',
  hint: 'Any 3 digits',
  attributes: html`inputmode="numeric" autocomplete="cc-csc" maxlength="4"`,
};
const nameSign: FieldSign = {
  field: 'name',
  label: 'Name on card',
  hint: '',
  attributes: html`autocomplete="cc-name" maxlength="100"`,
};
const signs = [numberSign, expirySign, codeSign, nameSign];

const standInNote = html`<p class="stand-in">
  <strong>This is a stand-in for the card page.</strong> No money moves, and no card is kept.
</p>`;

/** The page that takes a card for an open session. */
export function payPage(shopName: string, kept: KeptSession, trouble: PageTrouble | null): string {
  const { session } = kept;
  const total = priceText(session.amount_total ?? 0, session.currency ?? '');
  const title = `Pay ${shopName}`;
  return page(
    trouble ? `Not paid yet – ${title}` : title,
    html`${standInNote}
      <h1>${title}</h1>
      <p class="soft">
        ${session.client_reference_id ? `Order ${session.client_reference_id}. ` : ''}The page stays
        open until ${timeText(session.expires_at)}.
      </p>
      <div class="pair">
        <section aria-labelledby="bill-title">
          <h2 id="bill-title">What you pay for</h2>
          ${bill(kept, total)} ${backLink(session.cancel_url)}
        </section>
        <section class="tag" aria-labelledby="card-title">
          <h2 id="card-title">Card</h2>
          ${trouble && troubleSummary(trouble)}
          <form method="post" novalidate>
            ${field(numberSign, '', trouble)}
            <div class="two">
              ${field(expirySign, trouble?.typed.expiry ?? '', trouble)}
              ${field(codeSign, '', trouble)}
            </div>
            ${field(nameSign, trouble?.typed.name ?? '', trouble)}
            <button class="pay" type="submit">Pay ${total}</button>
          </form>
          ${testNumbers}
        </section>
      </div>`,
  );
}

const testNumbers = html`<ul class="numbers" aria-label="Test numbers">
  <li><span class="number">${acceptedNumber}</span> is accepted.</li>
  <li><span class="number">${declinedNumber}</span> is declined.</li>
  <li class="soft">Any expiry to come and any code will do.</li>
</ul>`;

function bill({ session, lineItems }: KeptSession, total: string): Html {
  const currency = session.currency ?? '';
  const rows = lineItems.map(
    (item) =>
      html`<tr>
        <td>${item.quantity} × ${item.description}</td>
        <td>${priceText(item.amount_total, currency)}</td>
      </tr>`,
  );
  return html`<table class="bill">
    <thead>
      <tr>
        <th scope="col">Item</th>
        <th scope="col">Price</th>
      </tr>
    </thead>
    <tbody>
      ${rows}
    </tbody>
    <tfoot>
      <tr>
        <th scope="row">Total</th>
        <td>${total}</td>
      </tr>
    </tfoot>
  </table>`;
}

function field(sign: FieldSign, value: string, trouble: PageTrouble | null): Html {
  const { field: name, label, hint, attributes } = sign;
  const fault = trouble?.faults[name];
  const firstFault = signs.find((each) => trouble?.faults[each.field])?.field;
  const describedBy = [hint && `${name}-hint`, fault && `${name}-fault`].filter(Boolean).join(' ');
  const invalid = fault ? html`aria-invalid="true"` : null;
  const focus = firstFault === name ? html`autofocus` : null;
  return html`<div class="field">
    <label for="${name}">${label}</label>
    <input
      id="${name}"
      name="${name}"
      value="${value}"
      required
      ${attributes}
      aria-describedby="${describedBy}"
      ${invalid}
      ${focus}
    />
    ${hint && html`<p class="hint" id="${name}-hint">${hint}</p>`}
    ${fault && html`<p class="fault" id="${name}-fault">${fault}</p>`}
  </div>`;
}

function troubleSummary({ faults, decline }: PageTrouble): Html {
  const items = signs
    .filter((sign) => faults[sign.field])
    .map(
      (sign) => html`<li><a href="#${sign.field}">${sign.label}: ${faults[sign.field]}</a></li>`,
    );
  return html`<div class="trouble" role="alert">
    <h2>Nothing was paid</h2>
    ${decline && html`<p>${decline}</p>`}
    ${
      items.length > 0 &&
      html`<ul>
        ${items}
      </ul>`
    }
  </div>`;
}

function backLink(cancelUrl: string | null): Html | null {
  return cancelUrl ? html`<p><a href="${cancelUrl}">Back to the shop</a></p>` : null;
}

function timeText(seconds: number): string {
  return `${new Date(seconds * 1000).toISOString().slice(0, 16).replace('T', ' ')} UTC`;
}

/** The page of a session that takes no payment any more, or never existed. */
export function endedPage(shopName: string, kept: KeptSession | null): string {
  const [title, text] = endWords(kept);
  return page(
    `${title} – ${shopName}`,
    html`${standInNote}
      <h1>${title}</h1>
      <p>${text}</p>
      ${backLink(backAddress(kept))}`,
  );
}

function endWords(kept: KeptSession | null): [string, string] {
  if (kept?.session.status === 'complete') {
    return ['Already paid', 'This payment went through. There is nothing more to pay.'];
  }
  if (kept) {
    return ['Too late to pay here', 'This page has expired. Order again in the shop to pay.'];
  }
  return ['No such page', 'This address is not that of a payment. Check the link.'];
}

function backAddress(kept: KeptSession | null): string | null {
  if (!kept) return null;
  const paid = kept.session.status === 'complete';
  return paid ? successAddress(kept) : kept.session.cancel_url;
}

/** Where a payer goes once it is paid, with the session's id put in where the shop asked for it. */
export function successAddress({ session }: KeptSession): string {
  return (session.success_url ?? '').replaceAll('{CHECKOUT_SESSION_ID}', session.id);
}
