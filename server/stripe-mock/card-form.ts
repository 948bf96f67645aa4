import { html, type Html } from '../stand-in-look/html.ts';
import { acceptedNumber, declinedNumber, type CardFaults, type CardField } from './card.ts';

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

/** The form that takes a card, with what was wrong above it and the test numbers below. */
export function cardForm(total: string, trouble: PageTrouble | null): Html {
  return html`${trouble && troubleSummary(trouble)}
    <form method="post" novalidate>
      ${field(numberSign, '', trouble)}
      <div class="two">
        ${field(expirySign, trouble?.typed.expiry ?? '', trouble)} ${field(codeSign, '', trouble)}
      </div>
      ${field(nameSign, trouble?.typed.name ?? '', trouble)}
      <button class="pay" type="submit">Pay ${total}</button>
    </form>
    ${testNumbers}`;
}

const testNumbers = html`<ul class="numbers" aria-label="Test numbers">
  <li><span class="number">${acceptedNumber}</span> is accepted.</li>
  <li><span class="number">${declinedNumber}</span> is declined.</li>
  <li class="soft">Any expiry to come and any code will do.</li>
</ul>`;

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
