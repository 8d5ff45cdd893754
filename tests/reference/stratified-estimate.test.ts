import { describe, expect, it } from 'vitest';
import {
  addToConfusionMatrix,
  confusionMatrixFromRows,
  createConfusionMatrix,
  summariseConfusionMatrix,
} from '../../server/analysis/accuracy/confusion-matrix.ts';
import { computeDisagreement, toPopulationMatrix } from '../../server/analysis/accuracy/disagreement.ts';
import {
  allocateSample,
  expectPrecision,
  type AllocationRule,
} from '../../server/analysis/accuracy/allocate-sample.ts';
import { planSampleSize } from '../../server/analysis/accuracy/plan-sample-size.ts';
import { createRng } from '../../server/analysis/sampling/rng.ts';
import { estimateStratified, type StratumSample } from '../../server/analysis/accuracy/stratified-estimate.ts';
import { checkValues } from '../fixtures/check-values.ts';

/** Strata equal to the map classes: stratum h holds row h of the matrix. */
function strataOfMapClasses(rows: number[][], sizes: number[]): StratumSample[] {
  return rows.map((row, h) => ({
    size: sizes[h],
    counts: confusionMatrixFromRows(rows.map((_, i) => (i === h ? row : row.map(() => 0)))),
  }));
}

describe('Olofsson et al. 2014, Remote Sensing of Environment 148:42–57, Tables 8 and 9', () => {
  const { counts, mappedPixels, totalHa, expected, printed } = checkValues.olofsson2014;
  const result = estimateStratified(strataOfMapClasses(counts, mappedPixels))!;

  it('has the estimated proportions, accuracies, area shares and standard errors', () => {
    expected.p.flat().forEach((p, i) => expect(result.proportions.counts[i]).toBeCloseTo(p, 12));
    expect(result.overall.value).toBeCloseTo(expected.overall, 12);
    expect(result.overall.standardError).toBeCloseTo(expected.seOverall, 12);
    result.perClass.forEach(({ users, producers, areaShare }, k) => {
      expect(users!.value).toBeCloseTo(expected.user[k], 12);
      expect(users!.standardError).toBeCloseTo(expected.seUser[k], 12);
      expect(producers!.value).toBeCloseTo(expected.producer[k], 12);
      expect(producers!.standardError).toBeCloseTo(expected.seProducer[k], 12);
      expect(areaShare.value).toBeCloseTo(expected.areaProp[k], 12);
      expect(areaShare.standardError).toBeCloseTo(expected.seAreaProp[k], 12);
    });
  });

  it('has the printed areas and half-widths in hectares (the paper uses 1.96)', () => {
    result.perClass.forEach(({ areaShare }, k) => {
      expect(Math.abs(areaShare.value * totalHa - printed.areaHa[k])).toBeLessThan(1);
      expect(Math.abs(1.96 * areaShare.standardError! * totalHa - printed.areaHalfWidthHa[k])).toBeLessThan(1.5);
    });
  });

  it("has the printed half-widths of producer's accuracy but for the two that are misprints", () => {
    result.perClass.forEach(({ producers }, k) => {
      const gap = Math.abs(1.96 * producers!.standardError! - printed.producerHW[k]);
      if (printed.producerHW_misprinted[k]) expect(gap).toBeGreaterThan(0.005);
      else expect(gap).toBeLessThan(0.005);
    });
  });

  it('is not what the counts say without their weights: 587/640, and the shares of the columns (control)', () => {
    expect(Math.abs(result.overall.value - 587 / 640)).toBeGreaterThan(0.02);
    const unweighted = summariseConfusionMatrix(confusionMatrixFromRows(counts)).perClass;
    [0.956522, 0.982143, 0.874286, 0.920588].forEach((dropped, k) => {
      expect(unweighted[k].producers).toBeCloseTo(dropped, 6);
      expect(Math.abs(result.perClass[k].producers!.value - dropped)).toBeGreaterThan(0.02);
    });
  });

  it('has a standard error of the deforested area of 34,907 pixels, where the paper prints 34,097', () => {
    const nPixels = mappedPixels.reduce((sum, size) => sum + size);
    expect(result.perClass[0].areaShare.standardError! * nPixels).toBeCloseTo(34_907.22, 1);
  });

  it('has the same proportions as the matrix that quantity and allocation disagreement are taken from', () => {
    const population = toPopulationMatrix(confusionMatrixFromRows(counts), mappedPixels)!;
    population.counts.forEach((p, i) => expect(result.proportions.counts[i]).toBeCloseTo(p, 14));
    expect(computeDisagreement(population)!.agreement).toBeCloseTo(result.overall.value, 12);
  });
});

describe('Stehman 2014, International Journal of Remote Sensing 35:4923–4939: strata that are not the map classes', () => {
  const { stratum, map, reference, Nh, expected } = checkValues.stehman2014;
  const names = Object.keys(Nh);
  const strata = names.map((name): StratumSample => {
    const counts = createConfusionMatrix(4);
    [...stratum].forEach((s, i) => {
      if (s === name) addToConfusionMatrix(counts, names.indexOf(map[i]), names.indexOf(reference[i]));
    });
    return { size: Nh[name], counts };
  });
  const result = estimateStratified(strata, true)!;

  it('has the area shares, accuracies and matrix, with finite population correction', () => {
    expect(result.overall.value).toBeCloseTo(expected.overall, 12);
    expect(result.overall.standardError).toBeCloseTo(expected.seOverall, 9);
    expected.matrix.flat().forEach((p, i) => expect(result.proportions.counts[i]).toBeCloseTo(p, 12));
    names.forEach((name, k) => {
      expect(result.perClass[k].areaShare.value).toBeCloseTo(expected.areaProp[name], 12);
      expect(result.perClass[k].areaShare.standardError).toBeCloseTo(expected.seAreaProp[name], 9);
    });
  });

  it.each([
    ['A', 0.741935, 0.164542, 0.657143, 0.14771],
    ['B', 0.574468, 0.124782, 0.794118, 0.116548],
    ['C', 0.5, 0.215112, 0.3, 0.150411],
    ['D', 0.7, 0.152676, 0.636364, 0.16228],
  ])("has user's and producer's accuracy of class %s", (name, users, seUsers, producers, seProducers) => {
    const one = result.perClass[names.indexOf(name)];
    expect(one.users!.value).toBeCloseTo(users, 6);
    expect(one.users!.standardError).toBeCloseTo(seUsers, 6);
    expect(one.producers!.value).toBeCloseTo(producers, 6);
    expect(one.producers!.standardError).toBeCloseTo(seProducers, 6);
  });
});

describe('standard errors of quantity and allocation disagreement, in one stratum worked by hand', () => {
  const n = 200;
  const [only12, only21] = [24 / n, 10 / n];
  const result = estimateStratified([{ size: 50_000, counts: confusionMatrixFromRows([[90, 24], [10, 76]]) }])!; // prettier-ignore

  it('are those of the difference of two paired shares and of twice the smaller one', () => {
    const difference = only12 - only21;
    expect(result.quantity.value).toBeCloseTo(difference, 12);
    expect(result.quantity.standardError).toBeCloseTo(Math.sqrt((only12 + only21 - difference ** 2) / (n - 1)), 12);
    expect(result.allocation.value).toBeCloseTo(2 * only21, 12);
    expect(result.allocation.standardError).toBeCloseTo(2 * Math.sqrt((only21 * (1 - only21)) / (n - 1)), 12);
  });

  it('agree with the spread over 3000 samples drawn again from the estimated proportions', () => {
    const rng = createRng(5);
    const cells = [90, 24, 10, 76];
    const drawn = Array.from({ length: 3000 }, () => {
      const counts = [0, 0, 0, 0];
      for (let i = 0; i < n; i++) {
        let left = rng.nextFloat() * n;
        let cell = 0;
        while (left >= cells[cell]) left -= cells[cell++];
        counts[cell]++;
      }
      return computeDisagreement(confusionMatrixFromRows([counts.slice(0, 2), counts.slice(2)]))!;
    });
    for (const figure of ['quantity', 'allocation'] as const) {
      const mean = drawn.reduce((sum, one) => sum + one[figure], 0) / drawn.length;
      const spread = Math.sqrt(drawn.reduce((sum, one) => sum + (one[figure] - mean) ** 2, 0) / drawn.length);
      // Quantity is folded at 0, which takes a little off its spread.
      expect(Math.abs(spread / result[figure].standardError! - 1)).toBeLessThan(0.06);
    }
  });

  it('are undefined, not 0, where amounts come out alike though places do not', () => {
    const alike = estimateStratified([{ size: 50_000, counts: confusionMatrixFromRows([[30, 20], [20, 30]]) }])!; // prettier-ignore
    expect(alike.quantity).toMatchObject({ value: 0, standardError: null });
    expect(alike.allocation.standardError).toBeNull();
  });

  it('are exactly 0 for perfect agreement, with that of kappa and of every class', () => {
    const perfect = estimateStratified(strataOfMapClasses([[37, 0, 0], [0, 11, 0], [0, 0, 3]], [123_457, 7_919, 311]))!; // prettier-ignore
    expect(perfect.kappa).toMatchObject({ value: 1, standardError: 0 });
    expect(perfect.overall).toMatchObject({ value: 1, standardError: 0 });
    expect(perfect.quantity).toMatchObject({ value: 0, standardError: 0 });
    expect(perfect.allocation.standardError).toBe(0);
    for (const { users, producers, f1, areaShare } of perfect.perClass) {
      for (const figure of [users, producers, f1, areaShare]) expect(figure!.standardError).toBe(0);
    }
  });
});

describe('what cannot be estimated', () => {
  const rows = [[9, 1], [0, 0]]; // prettier-ignore

  it('is null: a stratum without units, a class never mapped, a variance from one unit', () => {
    expect(estimateStratified(strataOfMapClasses(rows, [100, 50]))).toBeNull();
    const result = estimateStratified(strataOfMapClasses(rows, [100, 0]))!;
    expect(result.perClass[1].users).toBeNull();
    expect(result.perClass[1].producers).toMatchObject({ value: 0, standardError: 0 });
    const single = estimateStratified(strataOfMapClasses([[9, 1], [0, 1]], [100, 50]))!; // prettier-ignore
    expect(single.overall.standardError).toBeNull();
    expect(single.perClass[0].producers!.standardError).toBeNull();
    expect(single.perClass[0].users!.standardError).toBeCloseTo(0.1, 12);
  });

  it('refuses more units than a stratum holds and strata without size', () => {
    expect(() => estimateStratified(strataOfMapClasses(rows, [5, 0]))).toThrow(/size 5 has 10 units/);
    expect(() => estimateStratified([])).toThrow(RangeError);
  });
});

describe('sample size and allocation (Olofsson et al. 2014, section 5.1, eq. 13)', () => {
  const { W, U, seTarget, n, equal, proportional } = checkValues.sampleSize;
  const strata = W.map((areaShare, i) => ({ areaShare, expectedUsers: U[i] }));

  it('needs 641 units for a standard error of .01, and fewer for larger ones', () => {
    expect(planSampleSize(strata, seTarget)).toBe(n);
    expect([0.005, 0.015, 0.02].map((se) => planSampleSize(strata, se))).toEqual([2563, 285, 161]);
  });

  it('keeps the finite population of Cochran (1977): 640.493 for 10,000,000 units, far fewer for a small area', () => {
    expect(planSampleSize(strata, seTarget, 10_000_000)).toBe(641);
    // (ΣWS)²/(S² + ΣWS²/N) with ΣWS = .253088 and ΣWS² = .067238 by hand, N = 2000: 479.4.
    const [spread, variance] = [0.253088, 0.0672375];
    expect(planSampleSize(strata, seTarget, 2000)).toBe(Math.ceil(spread ** 2 / (1e-4 + variance / 2000)));
  });

  it('shares them out as printed: equal 160 each, in proportion 13/10/205/413', () => {
    expect(allocateSample(strata, 640, { kind: 'equal' })).toEqual(equal);
    expect(allocateSample(strata, n, { kind: 'proportional' })).toEqual(proportional);
  });

  it('gives a least number to each class and the rest in proportion, and Neyman 23.2/18.6/243.1/356.0', () => {
    // The rest, 491, in proportion .320 to .645 by hand: 162.8 and 328.2.
    expect(allocateSample(strata, n, { kind: 'minimum', atLeast: 75 })).toEqual([75, 75, 163, 328]);
    const neyman = allocateSample(strata, n, { kind: 'neyman' });
    [23.2, 18.6, 243.1, 356.0].forEach((exact, i) => expect(Math.abs(neyman[i] - exact)).toBeLessThan(1));
    expect(neyman.reduce((sum, value) => sum + value)).toBe(n);
  });

  it('expects the wanted standard error from Neyman allocation, and a larger one from all others', () => {
    const errorOf = (rule: AllocationRule) => expectPrecision(strata, allocateSample(strata, n, rule)).standardError!;
    const neyman = errorOf({ kind: 'neyman' });
    // n − 1 in the variance moves it by a per cent or so.
    expect(Math.abs(neyman - seTarget)).toBeLessThan(2e-4);
    for (const rule of [{ kind: 'equal' }, { kind: 'proportional' }, { kind: 'minimum', atLeast: 75 }] as const) {
      expect(errorOf(rule)).toBeGreaterThan(neyman);
    }
  });

  it("expects for each class the interval of user's accuracy its units can give", () => {
    const { users } = expectPrecision(strata, [75, 75, 165, 325]);
    // 74 effective units at .7: Wilson 1927 by hand, centre .690130, half-width .101966.
    expect(users[0]!.low).toBeCloseTo(0.588, 2);
    expect(users[0]!.high).toBeCloseTo(0.792, 2);
    expect(expectPrecision(strata, [1, 75, 165, 325])).toMatchObject({ standardError: null, halfWidth: null });
  });

  it('refuses shares that do not sum to 1', () => {
    expect(() => planSampleSize(strata.slice(1), 0.01)).toThrow(/sum to 1/);
  });
});
