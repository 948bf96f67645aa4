import { createHash } from 'node:crypto';
import bcrypt from 'bcryptjs';

const rounds = 10;

/**
 * The text that bcrypt gets: normalised, then digested, since bcrypt looks at 72 bytes only and every
 * character of a long password shall count. Base64 keeps zero bytes out.
 */
function prepared(password: string): string {
  return createHash('sha256').update(password.normalize('NFKC')).digest('base64');
}

/** A salted hash of a password, to be stored. */
export function hashPassword(password: string): Promise<string> {
  return bcrypt.hash(prepared(password), rounds);
}

const nobody = bcrypt.hashSync('nobody has this password', rounds);

/** Whether a password belongs to a stored hash; with no hash it takes as long and says no. */
export async function passwordMatches(password: string, hash: string | null): Promise<boolean> {
  const matches = await bcrypt.compare(prepared(password), hash ?? nobody);
  return hash !== null && matches;
}
