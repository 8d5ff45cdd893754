/** A stream of pseudo-random numbers that depends on its seed alone. */
export interface Rng {
  /** Uniform in [0, 1). */
  next(): number;
  /** Uniform in [low, high). */
  range(low: number, high: number): number;
  /** Whole number in [0, n). */
  int(n: number): number;
  /** Standard normal. */
  normal(): number;
}

function scramble(value: number): number {
  let x = value | 0;
  x = Math.imul(x ^ (x >>> 16), 0x21f0aaad);
  x = Math.imul(x ^ (x >>> 15), 0x735a2d97);
  return (x ^ (x >>> 15)) >>> 0;
}

/**
 * Makes an sfc32 generator (C. Doty-Humphrey, PractRand), its state filled from one 32-bit seed.
 */
export function seededRng(seed: number): Rng {
  let a = scramble(seed + 0x9e3779b9);
  let b = scramble(seed + 0x3c6ef372);
  let c = scramble(seed + 0xdaa66d2b);
  let counter = 1;
  let spare = Number.NaN;
  const next = (): number => {
    const t = (((a + b) | 0) + counter) | 0;
    counter = (counter + 1) | 0;
    a = b ^ (b >>> 9);
    b = (c + (c << 3)) | 0;
    c = (c << 21) | (c >>> 11);
    c = (c + t) | 0;
    return (t >>> 0) / 4294967296;
  };
  for (let i = 0; i < 12; i++) next();
  const normal = (): number => {
    if (!Number.isNaN(spare)) {
      const kept = spare;
      spare = Number.NaN;
      return kept;
    }
    // Marsaglia's polar method gives two at a time.
    for (;;) {
      const u = next() * 2 - 1;
      const v = next() * 2 - 1;
      const s = u * u + v * v;
      if (s > 0 && s < 1) {
        const k = Math.sqrt((-2 * Math.log(s)) / s);
        spare = v * k;
        return u * k;
      }
    }
  };
  return {
    next,
    normal,
    range: (low, high) => low + (high - low) * next(),
    int: (n) => Math.floor(next() * n),
  };
}

/** Uniform in [0, 1) fixed by a whole number and a salt: the same field always has the same crop. */
export function hashUnit(value: number, salt: number): number {
  return scramble(Math.imul(value + 1, 0x85ebca6b) ^ Math.imul(salt + 7, 0xc2b2ae35)) / 4294967296;
}
