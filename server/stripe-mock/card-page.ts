import { html, page, type Html } from '../stand-in-look/html.ts';
import { cardForm, type PageTrouble } from './card-form.ts';
import { priceText } from './price-text.ts';
import type { KeptSession } from './state.ts';

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
          ${cardForm(total, trouble)}
        </section>
      </div>`,
  );
}

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
