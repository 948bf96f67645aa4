import type { Role } from '../contracts/auth.ts';

/** Everything that a role may or may not do, by name. */
export const permissionTable = {
  'bench.see': ['packer', 'owner'],
  'bench.claim': ['packer', 'owner'],
  'bench.pick': ['packer', 'owner'],
  'bench.tune': ['packer', 'owner'],
  'bench.ship': ['packer', 'owner'],
  'desk.see': ['owner'],
  'desk.change-price': ['owner'],
  'desk.change-stock': ['owner'],
  'desk.refund': ['owner'],
  'desk.audit': ['owner'],
  'orders.own': ['customer', 'packer', 'owner'],
} as const satisfies Record<string, readonly Role[]>;

export type Permission = keyof typeof permissionTable;

/** Whether a role holds a permission; nobody (a guest) holds none. */
export function may(role: Role | null, permission: Permission): boolean {
  return role !== null && (permissionTable[permission] as readonly Role[]).includes(role);
}
