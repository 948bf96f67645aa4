/** An audited value as one short line: {"price":12} → "price 12"; null where there is none. */
export function auditText(value: unknown): string | null {
  if (value === null || value === undefined) return null;
  if (typeof value === 'string' || typeof value === 'number' || typeof value === 'boolean') {
    return String(value);
  }
  if (typeof value !== 'object') return null;
  if ('amount' in value && 'currency' in value && typeof value.amount === 'number') {
    return `€\u00a0${(value.amount / 100).toFixed(2)}`;
  }
  return Object.entries(value)
    .map(([name, inner]) => `${name} ${auditText(inner) ?? 'none'}`)
    .join(', ');
}
