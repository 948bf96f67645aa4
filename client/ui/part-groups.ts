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

function numberIn(role: string): number {
  return Number(/^[A-Z]+(\d+)$/.exec(role)?.[1] ?? NaN);
}

/** "R1–R3", "R1–R3, R4B", "R1, R4": the codes of a group in one short text; runs of three are joined. */
export function rolesText(roles: readonly string[]): string {
  const runs: string[][] = [];
  for (const role of roles) {
    const run = runs.at(-1);
    const follows = run !== undefined && numberIn(role) === numberIn(run.at(-1) ?? '') + 1;
    if (follows) run.push(role);
    else runs.push([role]);
  }
  return runs
    .map((run) => (run.length > 2 ? `${run[0]}–${run.at(-1)}` : run.join(', ')))
    .join(', ');
}
