const wordRange = 4294967296;
const highBits = 67108864;
const doubleRange = 9007199254740992;

/**
 * A repeatable source of uniform numbers in 0 ≤ x < 1 with 53 random bits: the same seed (an
 * integer 0…2³² − 1) gives the same sequence on every machine. xoshiro128** (Blackman and Vigna,
 * public domain), its state filled from the seed by splitmix32. Not for secrets.
 * Throws a `RangeError` for any other seed.
 */
export function createRandom(seed: number): () => number {
  if (!Number.isInteger(seed) || seed < 0 || seed >= wordRange) {
    throw new RangeError(`The seed must be a whole number from 0 to 4294967295, not ${seed}.`);
  }
  const fill = splitmix32(seed);
  let a = fill();
  let b = fill();
  let c = fill();
  let d = fill();
  const nextWord = () => {
    const times5 = Math.imul(b, 5);
    const result = Math.imul((times5 << 7) | (times5 >>> 25), 9) >>> 0;
    const shifted = b << 9;
    c ^= a;
    d ^= b;
    b ^= c;
    a ^= d;
    c ^= shifted;
    d = (d << 11) | (d >>> 21);
    return result;
  };
  return () => ((nextWord() >>> 5) * highBits + (nextWord() >>> 6)) / doubleRange;
}

function splitmix32(seed: number): () => number {
  let state = seed | 0;
  return () => {
    state = (state + 0x9e3779b9) | 0;
    let mixed = state ^ (state >>> 16);
    mixed = Math.imul(mixed, 0x21f0aaad);
    mixed ^= mixed >>> 15;
    mixed = Math.imul(mixed, 0x735a2d97);
    return mixed ^ (mixed >>> 15);
  };
}

/**
 * A source of standard normal numbers (mean 0, variance 1, not truncated) fed by a uniform source,
 * by Marsaglia's polar method. It uses the uniform source in pairs.
 */
export function createNormal(random: () => number): () => number {
  let spare = NaN;
  return () => {
    if (!Number.isNaN(spare)) {
      const value = spare;
      spare = NaN;
      return value;
    }
    for (;;) {
      const x = 2 * random() - 1;
      const y = 2 * random() - 1;
      const square = x * x + y * y;
      if (square > 0 && square < 1) {
        const factor = Math.sqrt((-2 * Math.log(square)) / square);
        spare = y * factor;
        return x * factor;
      }
    }
  };
}
