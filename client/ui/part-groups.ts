import type { PackPart } from '../../server/contracts/packs.ts';

/** Codes of the parts that come as one line: R1, R2 and R3 of one stock number stand together. */
export interface PartGroup {
  key: string;
  roles: string[];
  part: PackPart;
  quantity: number;
}

export function groupParts(parts: readonly PackPart[]): PartGroup[] {
  const groups: PartGroup[] = [];
  for (const part of parts) {
    const same = groups.find((group) => group.part.sku === part.sku);
    if (same === undefined) {
      groups.push({ key: part.sku, roles: [part.role], part, quantity: part.quantity });
    } else {
      same.roles.push(part.role);
      same.quantity += part.quantity;
    }
  }
  return groups;
}

/** "R1–R3", "R1, R4": the codes of a group in one short text. */
export function rolesText(roles: readonly string[]): string {
  const [first] = roles;
  const last = roles.at(-1);
  const numbers = roles.map((role) => Number(/^[A-Z]+(\d+)$/.exec(role)?.[1] ?? NaN));
  const run = numbers.every(
    (value, index) => index === 0 || value === (numbers[index - 1] ?? NaN) + 1,
  );
  if (first === undefined || last === undefined || roles.length === 1) return first ?? '';
  return run && roles.length > 2 ? `${first}–${last}` : roles.join(', ');
}
