/** A seeded source of random numbers; the same seed and stream always give the same sequence. */
export interface Rng {
  /** Integer in 0..2³²−1. */
  nextUint32(): number;
  /** Number in [0, 1) with 53 random bits. */
  nextFloat(): number;
  /** Integer in 0..n−1, every value equally likely. @throws RangeError unless 1 ≤ n ≤ 2³². */
  nextBelow(n: number): number;
  /** Puts the items of an array or typed array into random order, in place (Fisher–Yates). */
  shuffle<T extends { length: number; [index: number]: unknown }>(items: T): T;
}

/**
 * xoshiro128** started from four 32-bit words, not all zero.
 *
 * Source: Blackman & Vigna 2021, Scrambled linear pseudorandom number generators, ACM Transactions on Mathematical
 * Software 47(4).
 * @throws RangeError when all four words are zero.
 */
export function createRngFromState(s0: number, s1: number, s2: number, s3: number): Rng {
  if ((s0 | s1 | s2 | s3) === 0) throw new RangeError('The state of the generator must not be all zero.');
  let [a, b, c, d] = [s0 | 0, s1 | 0, s2 | 0, s3 | 0];

  function nextUint32(): number {
    const result = Math.imul(rotateLeft(Math.imul(b, 5), 7), 9) >>> 0;
    const t = b << 9;
    c ^= a;
    d ^= b;
    b ^= c;
    a ^= d;
    c ^= t;
    d = rotateLeft(d, 11);
    return result;
  }

  function nextFloat(): number {
    const high = nextUint32() >>> 5;
    const low = nextUint32() >>> 6;
    return (high * 0x4000000 + low) / 0x20000000000000;
  }

  function nextBelow(n: number): number {
    if (!Number.isInteger(n) || n < 1 || n > 0x100000000) {
      throw new RangeError(`A whole number from 1 to 2^32 is needed, got ${n}.`);
    }
    const first = nextUint32();
    // Most draws lie before the last full multiple of n for sure; one whole-number division is all they take.
    if (first < 0x100000000 - n) return first % n;
    // Values past the last full multiple of n would favour the small results, so they are drawn again.
    const limit = 0x100000000 - (0x100000000 % n);
    let value = first;
    while (value >= limit) value = nextUint32();
    return value % n;
  }

  function shuffle<T extends { length: number; [index: number]: unknown }>(items: T): T {
    for (let i = items.length - 1; i > 0; i--) {
      const j = nextBelow(i + 1);
      const held = items[i];
      items[i] = items[j];
      items[j] = held;
    }
    return items;
  }

  return { nextUint32, nextFloat, nextBelow, shuffle };
}

/**
 * Makes a generator from a seed and a stream number; different streams of one seed are unrelated sequences.
 * @throws RangeError when seed or stream is not an integer in 0..2³²−1.
 */
export function createRng(seed: number, stream = 0): Rng {
  for (const value of [seed, stream]) {
    if (!Number.isInteger(value) || value < 0 || value > 0xffffffff) {
      throw new RangeError(`Seed and stream must be integers from 0 to 2^32 − 1, got ${value}.`);
    }
  }
  let counter = mix(seed) ^ mix(stream ^ 0x9e3779b9);
  const words = Array.from({ length: 4 }, () => {
    counter = (counter + 0x9e3779b9) | 0;
    return mix(mix(counter) ^ stream);
  });
  if (!words.some((word) => word !== 0)) words[0] = 1;
  return createRngFromState(words[0], words[1], words[2], words[3]);
}

/** A stable 32-bit number of a text (FNV-1a over UTF-16 code units), to give each name its own stream. */
export function hashText(text: string): number {
  let hash = 0x811c9dc5;
  for (let i = 0; i < text.length; i++) {
    hash = Math.imul(hash ^ (text.charCodeAt(i) & 255), 0x01000193);
    hash = Math.imul(hash ^ (text.charCodeAt(i) >> 8), 0x01000193);
  }
  return hash >>> 0;
}

function rotateLeft(value: number, bits: number): number {
  return (value << bits) | (value >>> (32 - bits));
}

/** Murmur3's 32-bit finaliser: every input bit reaches every output bit. */
function mix(value: number): number {
  let h = value | 0;
  h = Math.imul(h ^ (h >>> 16), 0x85ebca6b);
  h = Math.imul(h ^ (h >>> 13), 0xc2b2ae35);
  return h ^ (h >>> 16);
}
