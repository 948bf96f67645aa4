import type { Role } from '../../server/contracts/auth.ts';

interface Holder {
  role: Role;
}

/** Hides what a role may not open; the server decides. */
export function mayUseBench(person: Holder | null | undefined): boolean {
  return person?.role === 'packer' || person?.role === 'owner';
}

export function mayUseDesk(person: Holder | null | undefined): boolean {
  return person?.role === 'owner';
}
