import type { Money } from '../contracts/common.ts';
import type { Address } from '../contracts/orders.ts';
import type { Caution, PackPromise } from '../contracts/packs.ts';
import { nbsp } from './wording.ts';

export interface Mail {
  subject: string;
  text: string;
  html: string;
}

interface Shop {
  name: string;
  address: string[];
  email: string;
}

interface MailOrder {
  ref: string;
  shipTo: Address;
  shippingName: string;
  goodsMinor: number;
  shippingMinor: number;
  taxMinor: number;
  taxBasisPoints: number;
  totalMinor: number;
  shipBy: Date | null;
}

interface MailLine {
  identifier: string;
  sentence: string;
  quantity: number;
  lineGrossMinor: number;
  promise: PackPromise;
  cautions: readonly Caution[];
}

const amount = (minor: number) => `€${nbsp}${(minor / 100).toFixed(2)}`;
const day = (date: Date) =>
  date.toLocaleDateString('en-GB', {
    weekday: 'long',
    day: 'numeric',
    month: 'long',
    timeZone: 'UTC',
  });

/** Postal address line by line; the country's name last, in capitals as carriers want it. */
export function addressLines(address: Address, countryName: string): string[] {
  return [
    address.name,
    address.line1,
    address.line2 ?? '',
    `${address.postalCode} ${address.city}`.trim(),
    address.region ?? '',
    countryName.toUpperCase(),
  ].filter((line) => line !== '');
}

const promiseLine = ({ text }: PackPromise) =>
  `${text.rate} ${text.unit}; every kit between ${text.from} and ${text.to}`;

/** The order confirmation: goods, totals with tax, delivery, withdrawal, cautions. */
export function confirmationMail(facts: {
  shop: Shop;
  order: MailOrder;
  lines: readonly MailLine[];
  link: string;
  countryName: string;
}): Mail {
  const { shop, order, lines, link, countryName } = facts;
  const rate = order.taxBasisPoints / 100;
  const blocks: Block[] = [
    { kind: 'text', text: `Thank you. Order ${order.ref} is paid and waits for the bench.` },
    {
      kind: 'table',
      rows: [
        ...lines.map((line): Row => [
          `${line.quantity} × ${line.sentence}. ${promiseLine(line.promise)}. Identifier ${line.identifier}.`,
          amount(line.lineGrossMinor),
        ]),
        ['Goods', amount(order.goodsMinor)],
        [`Shipping, ${order.shippingName}`, amount(order.shippingMinor)],
        ['Total', amount(order.totalMinor)],
        [`of which tax (${rate}${nbsp}%)`, amount(order.taxMinor)],
      ],
    },
    { kind: 'text', text: `It goes to: ${addressLines(order.shipTo, countryName).join(', ')}.` },
    ...(order.shipBy === null
      ? []
      : [{ kind: 'text' as const, text: `It leaves us by ${day(order.shipBy)}.` }]),
    { kind: 'link', text: 'Follow the order and open its build sheets', href: link },
    ...cautionBlocks(lines),
    {
      kind: 'text',
      text: 'You may withdraw within 14 days of delivery without giving a reason; answer this mail to do so.',
    },
  ];
  return compose(`Your Tockwell order ${order.ref}`, blocks, shop);
}

/** The mail that goes out with the parcel. */
export function shippedMail(facts: {
  shop: Shop;
  order: MailOrder;
  lines: readonly MailLine[];
  carrier: string;
  tracking: string;
  link: string;
}): Mail {
  const { shop, order, lines, carrier, tracking, link } = facts;
  const blocks: Block[] = [
    { kind: 'text', text: `Order ${order.ref} left Merrow Quay with ${carrier}.` },
    { kind: 'text', text: `Tracking number: ${tracking}` },
    { kind: 'list', items: lines.map((line) => `${line.quantity} × ${line.sentence}`) },
    { kind: 'link', text: 'Open the build sheets', href: link },
    ...cautionBlocks(lines),
  ];
  return compose(`Your Tockwell order ${order.ref} is on its way`, blocks, shop);
}

/** The mail that says that money goes back. */
export function refundMail(facts: { shop: Shop; order: MailOrder; amount: Money }): Mail {
  const { shop, order } = facts;
  return compose(
    `Refund for your Tockwell order ${order.ref}`,
    [
      {
        kind: 'text',
        text: `We have refunded ${amount(facts.amount.amount)} for order ${order.ref} to the card it was paid with. Your bank may take some days to show it.`,
      },
    ],
    shop,
  );
}

/** What, and what it costs. */
type Row = [string, string];

type Block =
  | { kind: 'table'; rows: Row[] }
  | { kind: 'text'; text: string }
  | { kind: 'list'; items: string[] }
  | { kind: 'link'; text: string; href: string };

function cautionBlocks(lines: readonly MailLine[]): Block[] {
  const texts = [...new Set(lines.flatMap((line) => line.cautions.map((caution) => caution.text)))];
  return [
    { kind: 'text', text: 'Before you build:' },
    { kind: 'list', items: texts },
  ];
}

const escape = (text: string) => text.replace(/[&<>"']/g, (sign) => `&#${sign.charCodeAt(0)};`);

function htmlTable(rows: readonly Row[]): string {
  const rule = 'border-bottom:1px solid #CFC4AE;padding:8px 0;vertical-align:top';
  const cells = rows.map(
    ([what, cost]) =>
      `<tr><td style="${rule}">${escape(what)}</td>` +
      `<td style="${rule};padding-left:16px;text-align:right;white-space:nowrap;font-weight:bold">${escape(cost)}</td></tr>`,
  );
  return `<table style="border-collapse:collapse;width:100%">${cells.join('')}</table>`;
}

function compose(subject: string, blocks: readonly Block[], shop: Shop): Mail {
  const sender = [...shop.address, shop.email].join('\n');
  const text = blocks
    .map((block) => {
      if (block.kind === 'text') return block.text;
      if (block.kind === 'table') return block.rows.map((row) => row.join(': ')).join('\n');
      if (block.kind === 'link') return `${block.text}:\n${block.href}`;
      return block.items.map((item) => `- ${item}`).join('\n');
    })
    .concat(sender)
    .join('\n\n');
  const body = blocks
    .map((block) => {
      if (block.kind === 'text') return `<p>${escape(block.text)}</p>`;
      if (block.kind === 'table') return htmlTable(block.rows);
      if (block.kind === 'link') {
        return (
          `<p style="margin:24px 0"><a href="${escape(block.href)}" style="background:#0E5C50;color:#FFFFFF;` +
          `display:inline-block;padding:12px 20px;font-weight:bold;text-decoration:none">${escape(block.text)}</a></p>`
        );
      }
      return `<ul>${block.items.map((item) => `<li>${escape(item)}</li>`).join('')}</ul>`;
    })
    .join('\n');
  const html =
    `<!doctype html><html lang="en"><head><meta charset="utf-8"><title>${escape(subject)}</title></head>` +
    '<body style="margin:0;background:#F6F1E7;color:#1E2A2E;font-family:Nunito,Verdana,sans-serif;line-height:1.5">' +
    '<div style="max-width:36rem;margin:0 auto;padding:24px">' +
    '<p style="font-size:22px;font-weight:800;margin:0 0 16px">Tockwell</p>' +
    `<div style="background:#FFFDF8;border:1px solid #CFC4AE;padding:20px">${body}</div>` +
    `<p style="color:#54605F;font-size:14px">${shop.address.map(escape).join('<br>')}<br>${escape(shop.email)}</p>` +
    '</div></body></html>';
  return { subject, text, html };
}
