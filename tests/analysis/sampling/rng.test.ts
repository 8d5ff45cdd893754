import { describe, expect, it } from 'vitest';
import { createRng, createRngFromState, hashText } from '../../../server/analysis/sampling/rng.ts';

describe('random numbers', () => {
  it('equal xoshiro128** as its authors publish it, written out here with 64-bit integers', () => {
    const s = [1n, 2n, 3n, 4n];
    const mask = 0xffffffffn;
    const rotl = (x: bigint, k: bigint) => ((x << k) | (x >> (32n - k))) & mask;
    const rng = createRngFromState(1, 2, 3, 4);
    for (let i = 0; i < 1000; i++) {
      const wanted = (rotl((s[1] * 5n) & mask, 7n) * 9n) & mask;
      const t = (s[1] << 9n) & mask;
      s[2] ^= s[0];
      s[3] ^= s[1];
      s[1] ^= s[2];
      s[0] ^= s[3];
      s[2] ^= t;
      s[3] = rotl(s[3], 11n);
      expect(BigInt(rng.nextUint32())).toBe(wanted);
    }
    const again = createRngFromState(1, 2, 3, 4);
    // From memory: the first values that published ports of the generator test against.
    expect([again.nextUint32(), again.nextUint32(), again.nextUint32()]).toEqual([11520, 0, 5927040]);
  });

  it('repeat for the same seed and stream and differ for others', () => {
    const draw = (seed: number, stream: number) => {
      const rng = createRng(seed, stream);
      return [rng.nextUint32(), rng.nextUint32(), rng.nextFloat(), rng.nextBelow(1000)].join();
    };
    expect(draw(7, 3)).toBe(draw(7, 3));
    const all = new Set<string>();
    for (let seed = 0; seed < 40; seed++) for (let stream = 0; stream < 40; stream++) all.add(draw(seed, stream));
    expect(all.size).toBe(1600);
  });

  it('are spread evenly below n, also where n does not divide 2^32 (chi-square, fixed seed)', () => {
    for (const n of [3, 7, 10, 100]) {
      const rng = createRng(11);
      const counts = new Float64Array(n);
      const nDraws = 20_000 * n;
      for (let i = 0; i < nDraws; i++) counts[rng.nextBelow(n)]++;
      const chiSquare = counts.reduce((sum, count) => sum + (count - 20_000) ** 2 / 20_000, 0);
      // 4.5 standard deviations of chi-square above its mean.
      expect(chiSquare).toBeLessThan(n - 1 + 4.5 * Math.sqrt(2 * (n - 1)));
    }
  });

  it('do not favour small results below a large n', () => {
    const n = 3 * 2 ** 30;
    const rng = createRng(5);
    let small = 0;
    for (let i = 0; i < 30_000; i++) if (rng.nextBelow(n) < 2 ** 30) small++;
    // A plain remainder would put half of the draws there instead of a third.
    expect(small / 30_000).toBeGreaterThan(0.32);
    expect(small / 30_000).toBeLessThan(0.347);
  });

  it('lie in 0..1 with the right mean and variance', () => {
    const rng = createRng(1);
    let sum = 0;
    let squares = 0;
    for (let i = 0; i < 100_000; i++) {
      const x = rng.nextFloat();
      expect(x >= 0 && x < 1).toBe(true);
      sum += x;
      squares += x * x;
    }
    expect(sum / 1e5).toBeCloseTo(0.5, 2);
    expect(squares / 1e5 - (sum / 1e5) ** 2).toBeCloseTo(1 / 12, 2);
  });

  it('shuffle every order of three items about equally often', () => {
    const rng = createRng(3);
    const counts = new Map<string, number>();
    for (let i = 0; i < 12_000; i++) {
      const key = rng.shuffle(['a', 'b', 'c']).join('');
      counts.set(key, (counts.get(key) ?? 0) + 1);
    }
    expect(counts.size).toBe(6);
    for (const count of counts.values()) expect(Math.abs(count - 2000)).toBeLessThan(180);
  });

  it('refuse seeds and bounds that are not whole numbers in range', () => {
    expect(() => createRng(-1)).toThrow(RangeError);
    expect(() => createRng(0.5)).toThrow(RangeError);
    expect(() => createRng(1).nextBelow(0)).toThrow(RangeError);
    expect(() => createRngFromState(0, 0, 0, 0)).toThrow(/zero/);
  });

  it('have a stable hash for names (FNV-1a published value of "a" on bytes is e40c292c; here a zero byte follows)', () => {
    expect(hashText('a')).toBe(Math.imul(0xe40c292c, 0x01000193) >>> 0);
    expect(hashText('meadow')).not.toBe(hashText('meadoW'));
  });
});
