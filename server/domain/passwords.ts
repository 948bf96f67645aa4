/**
 * Words and runs that guessers try first, whole or repeated. A short list of the shop's own; a real
 * deployment may lengthen it. NIST SP 800-63B-4 asks for a comparison of the whole password.
 */
const guessable = [
  'password',
  'passwort',
  'qwerty',
  'qwertyuiop',
  'asdfghjkl',
  'letmein',
  'iloveyou',
  'welcome',
  'tockwell',
  'merrowquay',
  'oscillator',
  'comparator',
  'administrator',
  'correcthorsebatterystaple',
];

/**
 * Whether a password is one of the easily guessed: one character or a short run repeated, digits in
 * order, a listed word with digits around it, or the person's own e-mail address or name.
 */
export function commonPassword(password: string, own: readonly string[]): boolean {
  const plain = password.normalize('NFKC').toLowerCase();
  const letters = plain.replace(/[\s\d\W_]+/gu, '');
  if (new Set(plain).size <= 2 || /^(.{1,6})\1+$/u.test(plain)) return true;
  if ('0123456789012345678901234567890'.includes(plain)) return true;
  if (guessable.some((word) => letters === word || letters === word + word)) return true;
  return own.some((text) => {
    const mine = text.toLowerCase().trim();
    return mine.length >= 4 && (plain === mine || plain === mine.split('@')[0]);
  });
}
