// ISO 4217 exponents other than 2, for the currencies the service takes without decimals.
const withoutDecimals = new Set(
  'bif clp djf gnf jpy kmf krw mga pyg rwf ugx vnd vuv xaf xof xpf'.split(' '),
);
const signs: Record<string, string> = { eur: '€', gbp: '£', usd: '$' };

/** 1295 of eur → "€ 12.95", sign and number held together. */
export function priceText(minor: number, currency: string): string {
  const sign = signs[currency] ?? currency.toUpperCase();
  const figure = withoutDecimals.has(currency) ? String(minor) : (minor / 100).toFixed(2);
  return `${sign}\u00a0${figure}`;
}
