import { describe, expect, it } from 'vitest';
import {
  confusionMatrixFromRows,
  confusionMatrixMargins,
  summariseConfusionMatrix,
} from '../../server/analysis/accuracy/confusion-matrix.ts';
import { computeDisagreement } from '../../server/analysis/accuracy/disagreement.ts';
import { computeKappa } from '../../server/analysis/accuracy/kappa.ts';
import { compareByMcNemar } from '../../server/analysis/accuracy/mcnemar.ts';
import { checkValues } from '../fixtures/check-values.ts';

const sources = {
  congalton1991: 'Congalton 1991, Remote Sensing of Environment 37:35–46',
  cohen1968: 'Cohen 1968, Psychological Bulletin 70:213–220, Table 1',
  storyCongalton1986_table1: 'Story & Congalton 1986, PE&RS 52:397–399, Table 1',
} as const;

function relativeError(got: number | null, wanted: number): number {
  return Math.abs(got! - wanted) / Math.abs(wanted);
}

describe.each(Object.keys(sources) as (keyof typeof sources)[])('published error matrix %s', (key) => {
  const { matrix: rows, expected } = checkValues.confusion[key];
  const matrix = confusionMatrixFromRows(rows);
  const summary = summariseConfusionMatrix(matrix);
  const kappa = computeKappa(matrix)!;

  it(`gives the overall, user's and producer's accuracy of ${sources[key]}`, () => {
    expect(summary.total).toBe(expected.n);
    expect(relativeError(summary.overall, expected.po)).toBeLessThan(1e-12);
    summary.perClass.forEach((one, c) => {
      expect(relativeError(one.users, expected.userAcc[c])).toBeLessThan(1e-12);
      expect(relativeError(one.producers, expected.producerAcc[c])).toBeLessThan(1e-12);
    });
  });

  it(`gives kappa and both variances of ${sources[key]}`, () => {
    expect(relativeError(kappa.expected, expected.pe)).toBeLessThan(1e-9);
    expect(relativeError(kappa.kappa, expected.kappa)).toBeLessThan(1e-9);
    expect(relativeError(kappa.variance, expected.var)).toBeLessThan(1e-9);
    expect(relativeError(kappa.nullVariance, expected.var0)).toBeLessThan(1e-9);
  });

  it('equals the variance formula of Fleiss, Cohen & Everitt 1969, which is written differently', () => {
    const { mapped, reference } = confusionMatrixMargins(matrix);
    const n = summary.total;
    const k = kappa.kappa;
    let diagonal = 0;
    let off = 0;
    for (let i = 0; i < matrix.nClasses; i++) {
      for (let j = 0; j < matrix.nClasses; j++) {
        const p = matrix.counts[i * matrix.nClasses + j] / n;
        if (i === j) diagonal += p * (1 - ((mapped[i] + reference[i]) / n) * (1 - k)) ** 2;
        else off += p * ((reference[i] + mapped[j]) / n) ** 2;
      }
    }
    const pe = kappa.expected;
    const fce = (diagonal + (1 - k) ** 2 * off - (k - pe * (1 - k)) ** 2) / (n * (1 - pe) ** 2);
    expect(relativeError(kappa.variance, fce)).toBeLessThan(1e-9);
  });

  it('is not the value with uncrossed subscripts that Congalton & Green 1999 print (kept as "as printed")', () => {
    expect(relativeError(kappa.variance, expected.varCongaltonPrinted)).toBeGreaterThan(1e-3);
    expect(relativeError(varianceAsPrinted(rows), expected.varCongaltonPrinted)).toBeLessThan(1e-9);
  });
});

describe('Congalton 1991 as printed', () => {
  const { matrix: rows } = checkValues.confusion.congalton1991;
  const kappa = computeKappa(confusionMatrixFromRows(rows))!;

  it('has the Z values of the right and of the printed variance', () => {
    expect(kappa.z).toBeCloseTo(23.5518, 4);
    expect(kappa.nullZ).toBeCloseTo(23.8811, 4);
    // Congalton & Green 1999, p. 108: var(KHAT) = 0.0007778, from uncrossed subscripts in θ4.
    expect(kappa.kappa / Math.sqrt(varianceAsPrinted(rows))).toBeCloseTo(23.4327, 3);
    expect(varianceAsPrinted(rows)).toBeCloseTo(0.0007778, 7);
  });

  it('splits into quantity and allocation disagreement (Pontius & Millones 2011, IJRS 32:4407–4429; recomputed)', () => {
    const split = computeDisagreement(confusionMatrixFromRows(rows))!;
    expect(split.quantity).toBeCloseTo(0.092166, 6);
    expect(split.allocation).toBeCloseTo(0.168203, 6);
    expect(split.agreement).toBeCloseTo(0.739631, 6);
    expect(split.agreement + split.quantity + split.allocation).toBeCloseTo(1, 12);
  });
});

it('gives kappa .454277 for the forest, water and urban matrix (from memory as printed; internally consistent)', () => {
  const matrix = confusionMatrixFromRows([
    [28, 14, 15],
    [1, 15, 5],
    [1, 1, 20],
  ]);
  const { overall, perClass } = summariseConfusionMatrix(matrix);
  expect(overall).toBeCloseTo(0.63, 9);
  expect(perClass.map((c) => Math.round(c.producers! * 10000) / 100)).toEqual([93.33, 50, 50]);
  expect(perClass.map((c) => Math.round(c.users! * 10000) / 100)).toEqual([49.12, 71.43, 90.91]);
  expect(computeKappa(matrix)!.kappa).toBeCloseTo(0.454277, 6);
});

it('shows how far kappa moves at 95 % overall accuracy (Foody 2020, Remote Sensing of Environment 239:111630)', () => {
  const low = computeKappa(confusionMatrixFromRows([[95, 2.5], [2.5, 0]])); // prettier-ignore
  const high = computeKappa(confusionMatrixFromRows([[47.5, 2.5], [2.5, 47.5]])); // prettier-ignore
  expect(low!.observed).toBeCloseTo(0.95, 12);
  expect(high!.observed).toBeCloseTo(0.95, 12);
  expect(low!.kappa).toBeCloseTo(-0.025641, 6);
  expect(high!.kappa).toBeCloseTo(0.9, 12);
});

it('gives the McNemar figures of Agresti 1990, p. 350 (values of R mcnemar.test; Edwards correction)', () => {
  const { b, c, chi2, chi2cc, z, p, pcc, exactP } = checkValues.mcnemar;
  const result = compareByMcNemar(b, c)!;
  expect(relativeError(result.z, z)).toBeLessThan(1e-12);
  expect(relativeError(result.chiSquare, chi2)).toBeLessThan(1e-12);
  expect(relativeError(result.correctedChiSquare, chi2cc)).toBeLessThan(1e-12);
  expect(relativeError(result.pValue, p)).toBeLessThan(1e-10);
  expect(relativeError(result.correctedPValue, pcc)).toBeLessThan(1e-10);
  expect(relativeError(result.exactPValue, exactP)).toBeLessThan(1e-10);
});

/** θ4 with the subscripts as the book prints them: (p_i+ + p_+j)² instead of (p_j+ + p_+i)². */
function varianceAsPrinted(rows: number[][]): number {
  const matrix = confusionMatrixFromRows(rows);
  const { mapped, reference } = confusionMatrixMargins(matrix);
  const n = mapped.reduce((a, b) => a + b, 0);
  let [t1, t2, t3, t4] = [0, 0, 0, 0];
  rows.forEach((row, i) => {
    t1 += row[i] / n;
    t2 += (mapped[i] * reference[i]) / n ** 2;
    t3 += (row[i] * (mapped[i] + reference[i])) / n ** 2;
    row.forEach((count, j) => (t4 += (count / n) * ((mapped[i] + reference[j]) / n) ** 2));
  });
  const d = 1 - t2;
  return (
    ((t1 * (1 - t1)) / d ** 2 +
      (2 * (1 - t1) * (2 * t1 * t2 - t3)) / d ** 3 +
      ((1 - t1) ** 2 * (t4 - 4 * t2 ** 2)) / d ** 4) /
    n
  );
}
