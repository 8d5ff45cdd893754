import { describe, expect, it } from 'vitest';
import { allocateSample, curvePrecision } from '../../../server/analysis/accuracy/allocate-sample.ts';
import { compareIndependentKappas, compareMaps, testKappa } from '../../../server/analysis/accuracy/compare-maps.ts';
import { confusionMatrixFromRows } from '../../../server/analysis/accuracy/confusion-matrix.ts';
import { intervalOfShare } from '../../../server/analysis/accuracy/design-interval.ts';
import { reportDesign } from '../../../server/analysis/accuracy/design-report.ts';
import { wilsonInterval } from '../../../server/analysis/accuracy/interval.ts';
import { computeKappa } from '../../../server/analysis/accuracy/kappa.ts';
import { compareByMcNemar } from '../../../server/analysis/accuracy/mcnemar.ts';
import { recoverIntervals } from '../../../server/analysis/accuracy/recovered-interval.ts';
import { countReferenceUnits, type ReferenceUnit } from '../../../server/analysis/accuracy/reference-units.ts';
import { estimateStratified, type StratumSample } from '../../../server/analysis/accuracy/stratified-estimate.ts';
import { createRng } from '../../../server/analysis/sampling/rng.ts';
import { checkValues } from '../../fixtures/check-values.ts';

const { counts: rows, mappedPixels, totalHa, printed } = checkValues.olofsson2014;
const olofsson: StratumSample[] = rows.map((row, h) => ({
  size: mappedPixels[h],
  counts: confusionMatrixFromRows(rows.map((_, i) => (i === h ? row : row.map(() => 0)))),
}));

describe('kappa and F1 of a design', () => {
  const matrix = confusionMatrixFromRows(checkValues.confusion.congalton1991.matrix);
  const single = estimateStratified([{ size: 1e9, counts: matrix }])!;

  it('has the large-sample variance of kappa in a single stratum, with n − 1 for n (Fleiss, Cohen & Everitt 1969)', () => {
    const plain = computeKappa(matrix)!;
    expect(single.kappa!.value).toBeCloseTo(plain.kappa, 12);
    expect(single.kappa!.standardError! ** 2 / ((plain.variance * 434) / 433)).toBeCloseTo(1, 9);
  });

  it('has F1 as the harmonic mean of user’s and producer’s accuracy, weighted ones included', () => {
    for (const { users, producers, f1 } of estimateStratified(olofsson)!.perClass) {
      const harmonic = (2 * users!.value * producers!.value) / (users!.value + producers!.value);
      expect(f1!.value).toBeCloseTo(harmonic, 12);
    }
  });

  it('is undefined where all is one class', () => {
    expect(estimateStratified([{ size: 100, counts: confusionMatrixFromRows([[9, 0], [0, 0]]) }])!.kappa).toBeNull(); // prettier-ignore
  });
});

describe('weights by area, zones and the second choice', () => {
  it('weighs strata by area where it is given', () => {
    const byArea = estimateStratified(
      olofsson.map((one, h) => ({ ...one, size: 1e6, areaHa: mappedPixels[h] * 0.09 })),
    )!;
    expect(byArea.overall.value).toBeCloseTo(estimateStratified(olofsson)!.overall.value, 12);
    expect(() => estimateStratified([{ ...olofsson[0], areaHa: 3 }, olofsson[1]])).toThrow(/all strata or of none/);
  });

  const units: ReferenceUnit[] = [
    { stratum: 0, mapped: 0, reference: 0, zone: 1 },
    { stratum: 0, mapped: 0, reference: 1, alternate: 0, zone: 1 },
    { stratum: 0, mapped: 0, reference: 0, zone: 2 },
    { stratum: 0, mapped: 0, reference: 1, alternate: 1, zone: 2 },
    { stratum: 1, mapped: 1, reference: 1, zone: 1 },
    { stratum: 1, mapped: 1, reference: 0, alternate: null, zone: 2 },
  ];
  const sizes = [{ size: 300 }, { size: 100 }];
  const overallOf = (options: Parameters<typeof countReferenceUnits>[3]) =>
    estimateStratified(countReferenceUnits(units, sizes, 2, options))!.overall;

  it('estimates a zone from the points in it, weighted by their strata (by hand)', () => {
    // Zone 1: weights 75, 75 and 50; right are the first and the last: 125/200.
    expect(overallOf({ zone: 1 }).value).toBeCloseTo(0.625, 12);
    expect(overallOf({ zone: 2 }).value).toBeCloseTo(75 / 200, 12);
    // V = Σ N²·s²/n / 200², residuals .375, −.625, 0, 0 and .375, 0: s² = .171875 (sum² = .0625) and .0703125.
    const variance =
      ((300 ** 2 * (0.53125 - 0.0625 / 4)) / 3 / 4 + (100 ** 2 * (0.140625 - 0.140625 / 2)) / 2) / 200 ** 2;
    expect(overallOf({ zone: 1 }).standardError).toBeCloseTo(Math.sqrt(variance), 12);
    expect(estimateStratified(countReferenceUnits(units, sizes, 2, { zone: 9 }))).toBeNull();
  });

  it('counts the second choice as right only when asked to', () => {
    expect(overallOf({}).value).toBeCloseTo((300 * 0.5 + 100 * 0.5) / 400, 12);
    expect(overallOf({ labels: 'either' }).value).toBeCloseTo((300 * 0.75 + 100 * 0.5) / 400, 12);
  });
});

describe('report of a design', () => {
  const estimate = estimateStratified(olofsson)!;
  const mappedAreaHa = mappedPixels.map((pixels) => pixels * 0.09);
  const report = reportDesign(estimate, { totalAreaHa: totalHa, mappedAreaHa, recovered: recoverIntervals(olofsson) });

  it('has areas and half-widths of Olofsson et al. 2014, beside the mapped ones with the difference', () => {
    report.perClass.forEach(({ areaHa, differenceHa, mappedAreaHa: mapped }, k) => {
      expect(Math.abs(areaHa.value! - printed.areaHa[k])).toBeLessThan(1);
      expect(Math.abs((areaHa.high! - areaHa.low!) / 2 - printed.areaHalfWidthHa[k])).toBeLessThan(1.5);
      expect(differenceHa).toBeCloseTo(areaHa.value! - mapped!, 9);
    });
    expect(report.perClass.reduce((sum, { areaHa }) => sum + areaHa.value!, 0)).toBeCloseTo(totalHa, 6);
  });

  it('has the overall accuracy of the map, not of the counts (control), and parts that sum to 1', () => {
    expect(report.overall.value).toBeCloseTo(0.946512, 6);
    expect(Math.abs(report.overall.value! - 587 / 640)).toBeGreaterThan(0.02);
    const { quantityDisagreement, allocationDisagreement } = report;
    expect(report.overall.value! + quantityDisagreement.value! + allocationDisagreement.value!).toBeCloseTo(1, 12);
  });

  it('calls figures fragile that rest on few points, and gives the cautious interval beside', () => {
    expect(report.perClass[2].users.isFragile).toBe(false);
    const few = estimateStratified([{ size: 1000, counts: confusionMatrixFromRows([[20, 1], [0, 9]]) }])!; // prettier-ignore
    expect(reportDesign(few, { totalAreaHa: 1 }).perClass[1].users.isFragile).toBe(true);
    const { producers } = report.perClass[0];
    expect(producers.cautious!.low).toBeLessThan(producers.low!);
    expect(report.overall.cautious).toBeNull();
  });

  it('keeps undefined figures null and refuses an area that is none', () => {
    const { perClass } = reportDesign(
      estimateStratified([{ size: 9, counts: confusionMatrixFromRows([[5, 0], [0, 0]]) }])!, // prettier-ignore
      { totalAreaHa: 10 },
    );
    expect(perClass[1].users).toMatchObject({ value: null, standardError: null, low: null, high: null });
    expect(() => reportDesign(estimate, { totalAreaHa: 0 })).toThrow(RangeError);
  });
});

describe('intervals of shares', () => {
  it('is the Wilson interval with n − 1 for a simple random sample, and no point where all are right', () => {
    const { overall } = estimateStratified([{ size: 1e6, counts: confusionMatrixFromRows([[40, 5], [5, 51]]) }])!; // prettier-ignore
    const wilson = wilsonInterval((91 / 101) * 100, 100)!;
    expect(intervalOfShare(overall)!.low).toBeCloseTo(wilson.low, 12);
    const all = estimateStratified([{ size: 1e6, counts: confusionMatrixFromRows([[40, 0], [0, 60]]) }])!.overall; // prettier-ignore
    expect(intervalOfShare(all, 'normal')).toMatchObject({ low: 1, high: 1 });
    expect(intervalOfShare(all)!.low).toBeCloseTo(wilsonInterval(100, 100)!.low, 12);
  });

  it('recovers a Wilson interval from a single stratum, and does not take "none seen" for "none there"', () => {
    const one = recoverIntervals([{ size: 1e6, counts: confusionMatrixFromRows([[30, 4], [6, 60]]) }])!; // prettier-ignore
    const wilson = wilsonInterval(36, 100)!;
    expect(one[0].areaShare!.low).toBeCloseTo(wilson.low, 12);
    expect(one[0].areaShare!.high).toBeCloseTo(wilson.high, 12);

    // A rare class (1 % of the map) never missed in 100 points of the large stratum.
    const strata: StratumSample[] = [
      { size: 9900, counts: confusionMatrixFromRows([[100, 0], [0, 0]]) }, // prettier-ignore
      { size: 100, counts: confusionMatrixFromRows([[0, 0], [5, 45]]) }, // prettier-ignore
    ];
    const published = intervalOfShare(estimateStratified(strata)!.perClass[1].producers, 'normal')!;
    expect(published).toMatchObject({ low: 1, high: 1 });
    const { producers, areaShare } = recoverIntervals(strata)![1];
    expect(producers!.low).toBeLessThan(0.3);
    expect(producers!.high).toBe(1);
    // 0 of 100: Wilson's upper end z²/(n + z²) = .036995, worth .0366 of the area.
    expect(areaShare!.high).toBeCloseTo(0.009 + 0.99 * 0.036995, 3);
  });
});

describe('allocation within what strata hold', () => {
  const strata = [
    { areaShare: 0.5, expectedUsers: 0.8 },
    { areaShare: 0.499, expectedUsers: 0.8 },
    { areaShare: 0.001, expectedUsers: 1 },
  ];

  it('gives what a small stratum has, and the rest to the others', () => {
    expect(allocateSample(strata, 300, { kind: 'equal' }, [1e6, 1e6, 40])).toEqual([130, 130, 40]);
    expect(allocateSample(strata, 300, { kind: 'minimum', atLeast: 50 }, [1e6, 1e6, 40])[2]).toBe(40);
    expect(allocateSample(strata, 100, { kind: 'neyman' })).toEqual([50, 50, 0]);
    expect(() => allocateSample(strata, 100, { kind: 'minimum', atLeast: 40 })).toThrow(/do not reach/);
    expect(() => allocateSample(strata, 100, { kind: 'equal' }, [10, 10, 10])).toThrow(/more than the 30/);
  });

  it('gives a curve that falls with n, undefined while a stratum has under two units', () => {
    const curve = curvePrecision(strata, [2, 100, 200, 400], { kind: 'equal' });
    expect(curve[0].standardError).toBeNull();
    expect(curve[3].standardError! / curve[1].standardError!).toBeCloseTo(0.5, 1);
    expect(curvePrecision(strata, [60, 200], { kind: 'minimum', atLeast: 50 })).toHaveLength(1);
  });
});

describe('comparison of maps and of kappas', () => {
  it('has the covariance of two maps on the same points in the variance of the difference (by hand, one stratum)', () => {
    // 2 × 2 table of Agresti 1990, p. 350: both right 794, first only 150, second only 86, neither 570.
    const cell = (n: number, first: number, second: number) =>
      Array.from({ length: n }, () => ({ stratum: 0, first, second, reference: 1 }));
    const units = [...cell(794, 1, 1), ...cell(150, 1, 0), ...cell(86, 0, 1), ...cell(570, 0, 0)];
    const result = compareMaps(units, [{ size: 1e9 }])!;
    expect(result.difference).toBeCloseTo(64 / 1600, 12);
    // Var(d) = (p10 + p01 − (p10 − p01)²)/(n − 1).
    expect(result.standardError).toBeCloseTo(Math.sqrt((236 / 1600 - (64 / 1600) ** 2) / 1599), 12);
    // Cov = (p11 − p1·p2)/(n − 1).
    expect(result.covariance).toBeCloseTo((794 / 1600 - (944 / 1600) * (880 / 1600)) / 1599, 12);
    expect(result.mcNemar!.exactPValue / checkValues.mcnemar.exactP).toBeCloseTo(1, 9);
    expect(result.mcNemar!.quoted).toBe('chi-square');
    // Taking the maps as independent would be far too unsure (control).
    const independent = Math.sqrt(result.standardError! ** 2 + 2 * result.covariance!);
    expect(independent / result.standardError!).toBeGreaterThan(1.4);
  });

  it('weighs strata, and is undefined without points in one', () => {
    const units = [
      { stratum: 0, first: 0, second: 1, reference: 0 },
      { stratum: 0, first: 0, second: 0, reference: 0 },
      { stratum: 1, first: 1, second: 0, reference: 0 },
    ];
    const result = compareMaps(units, [{ size: 90 }, { size: 10 }])!;
    expect(result.first).toBeCloseTo(0.9, 12);
    expect(result.second).toBeCloseTo(0.55, 12);
    expect(result).toMatchObject({ standardError: null, covariance: null, interval: null, pValue: null });
    expect(compareMaps(units.slice(0, 2), [{ size: 90 }, { size: 10 }])).toBeNull();
  });

  it('quotes the exact McNemar under 25 points that differ: 1 to 9 gives 2·11/1024', () => {
    expect(compareByMcNemar(1, 9)).toMatchObject({ quoted: 'exact', exactPValue: expect.closeTo(22 / 1024, 12) });
    expect(compareByMcNemar(13, 12)!.quoted).toBe('chi-square');
  });

  it('compares two independent kappas, and one with 0 (z by hand from the published values)', () => {
    const first = computeKappa(confusionMatrixFromRows(checkValues.confusion.congalton1991.matrix))!;
    const second = computeKappa(confusionMatrixFromRows(checkValues.confusion.cohen1968.matrix))!;
    const { z, pValue } = compareIndependentKappas(first, second)!;
    expect(z).toBeCloseTo((0.653516 - 0.491525) / Math.sqrt(0.000769951 + 0.002601185), 4);
    expect(pValue).toBeCloseTo(0.00528, 4);
    expect(testKappa(first)!.z).toBeCloseTo(23.8811, 4);
  });

  it('rejects a true hypothesis about one time in twenty when maps are equally good', () => {
    const rng = createRng(8);
    let rejected = 0;
    for (let trial = 0; trial < 1000; trial++) {
      const units = Array.from({ length: 200 }, () => {
        const isHard = rng.nextFloat() < 0.3;
        const error = isHard ? 0.6 : 0.05;
        return { stratum: 0, first: Number(rng.nextFloat() > error), second: Number(rng.nextFloat() > error), reference: 1 }; // prettier-ignore
      });
      if (compareMaps(units, [{ size: 1e6 }])!.pValue! < 0.05) rejected++;
    }
    expect(rejected / 1000).toBeGreaterThan(0.03);
    expect(rejected / 1000).toBeLessThan(0.07);
  });
});
