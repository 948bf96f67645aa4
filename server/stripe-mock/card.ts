export interface Card {
  number: string;
  expiryMonth: number;
  expiryYear: number;
  name: string;
}

export interface Decline {
  code: string;
  message: string;
}

export type CardField = 'number' | 'expiry' | 'code' | 'name';
export type CardFaults = Partial<Record<CardField, string>>;

export const acceptedNumber = '4242 4242 4242 4242';
export const declinedNumber = '4000 0000 0000 0002';
export const cardBrand = 'visa';

/** Reads the form of the payment page: a card, or for each field what to change. */
export function readCard(
  form: Record<CardField, string>,
  today: Date,
): { card: Card } | { faults: CardFaults } {
  const number = form.number.replace(/[\s-]/g, '');
  const expiry = readExpiry(form.expiry);
  const faults: CardFaults = {
    number: numberFault(number),
    expiry: expiryFault(expiry, today),
    code: /^\d{3,4}$/.test(form.code.trim()) ? undefined : 'Enter the 3 digits of the code.',
    name: form.name.trim() === '' ? 'Enter the name as it stands on the card.' : undefined,
  };
  if (expiry === null || Object.values(faults).some(Boolean)) return { faults };
  const name = form.name.trim().slice(0, 100);
  return { card: { number, expiryMonth: expiry.month, expiryYear: expiry.year, name } };
}

function numberFault(number: string): string | undefined {
  if (number === '') return 'Enter the card number.';
  if (!/^\d{12,19}$/.test(number)) return 'A card number has 12 to 19 digits and nothing else.';
  if (!passesLuhn(number)) return 'This number has a mistyped digit; check it against the card.';
  return undefined;
}

/** The check of ISO/IEC 7812: every second digit from the right counts double, digits summed. */
export function passesLuhn(number: string): boolean {
  const sum = [...number].reverse().reduce((total, digit, place) => {
    const value = Number(digit) * (place % 2 === 1 ? 2 : 1);
    return total + (value > 9 ? value - 9 : value);
  }, 0);
  return sum % 10 === 0;
}

function readExpiry(text: string): { month: number; year: number } | null {
  const match = /^\s*(\d{1,2})\s*[/\-. ]?\s*(\d{2}|\d{4})\s*$/.exec(text);
  if (!match) return null;
  const year = Number(match[2]);
  return { month: Number(match[1]), year: year < 100 ? 2000 + year : year };
}

function expiryFault(expiry: { month: number; year: number } | null, today: Date) {
  if (!expiry || expiry.month < 1 || expiry.month > 12) {
    return 'Enter month and year, such as 09/31.';
  }
  // A card is good to the end of its month.
  const end = Date.UTC(expiry.year, expiry.month, 1);
  if (end <= today.getTime()) return 'This card has expired; use another.';
  if (expiry.year > today.getUTCFullYear() + 20) return 'This year is too far off; check it.';
  return undefined;
}

/** What the bank of a test number says: null for yes. */
export function declineOf(card: Card): Decline | null {
  if (card.number === acceptedNumber.replaceAll(' ', '')) return null;
  if (card.number === declinedNumber.replaceAll(' ', '')) {
    return { code: 'generic_decline', message: 'The card was declined. Try another card.' };
  }
  return {
    code: 'test_mode_live_card',
    message: `This stand-in knows test numbers only. Use ${acceptedNumber}.`,
  };
}
