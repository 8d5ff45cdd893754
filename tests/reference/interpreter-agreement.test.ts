import { describe, expect, it } from 'vitest';
import { bootstrapPoints } from '../../server/analysis/accuracy/agreement-bootstrap.ts';
import {
  computeClassAgreement,
  computeFleissKappa,
  computeKrippendorffAlpha,
  computePairKappa,
  computeRawAgreement,
  countClassPairs,
  type PointAnswers,
} from '../../server/analysis/accuracy/interpreter-agreement.ts';
import { createRng } from '../../server/analysis/sampling/rng.ts';
import { checkValues } from '../fixtures/check-values.ts';

/** Answers that give the counts of a row. */
function answersOf(rows: number[][]): PointAnswers[] {
  return rows.map((row) => row.flatMap((count, k) => new Array<number>(count).fill(k)));
}

/** Rows of observers as printed, `.` for no answer, classes from 1; turned into points of answers from 0. */
function pointsOf(...observers: string[]): PointAnswers[] {
  const rows = observers.map((row) => row.split(' ').map((code) => (code === '.' ? null : Number(code) - 1)));
  return rows[0].map((_, point) => rows.map((row) => row[point]));
}

describe("Fleiss' kappa", () => {
  it('is 0.430 for the 30 patients and 6 raters of Fleiss 1971, Psychological Bulletin 76:378–382', () => {
    const { counts, Pbar, Pe, kappa, se1979 } = checkValues.fleiss1971;
    const result = computeFleissKappa(answersOf(counts), 5, 6)!;
    expect(result.observed).toBeCloseTo(Pbar, 12);
    expect(result.expected).toBeCloseTo(Pe, 12);
    expect(result.kappa).toBeCloseTo(kappa, 12);
    expect(result.nullStandardError).toBeCloseTo(se1979, 12);
    expect(result.z).toBeCloseTo(17.65183, 4);
    // The standard error of 1971, corrected in 1979, is another one (control).
    expect(Math.abs(result.nullStandardError - 0.0275031)).toBeGreaterThan(0.003);
  });

  it('is 0.210 for the encyclopaedia example of 10 subjects and 14 raters, which is not in Fleiss 1971', () => {
    const { counts, Pbar, Pe, kappa } = checkValues.fleissEncyclopedia;
    const result = computeFleissKappa(answersOf(counts), 5, 14)!;
    expect([result.observed, result.expected]).toEqual([expect.closeTo(Pbar, 12), expect.closeTo(Pe, 12)]);
    expect(result.kappa).toBeCloseTo(kappa, 12);
  });

  it('is undefined where everyone always says the same class, and takes only points with all answers', () => {
    expect(computeFleissKappa(answersOf([[3, 0], [3, 0]]), 2, 3)).toBeNull(); // prettier-ignore
    expect(computeFleissKappa([[0, null], [null, 1]], 2, 2)).toBeNull(); // prettier-ignore
    expect(computeFleissKappa([[0, 0], [1, 1], [0, null]], 2, 2)).toMatchObject({ kappa: 1, nPoints: 2 }); // prettier-ignore
  });
});

describe("Krippendorff's alpha for classes", () => {
  // Values as printed in the documentation of R's irr::kripp.alpha and of Python packages that name the paper.
  const four = pointsOf(
    '1 2 3 3 2 1 4 1 2 . . .',
    '1 2 3 3 2 2 4 1 2 5 . 3',
    '. 3 3 3 2 3 4 2 2 5 1 .',
    '1 2 3 3 2 4 4 1 2 5 1 .',
  );

  it('is .743 for the four observers with missing answers of Krippendorff 2011, Computing Alpha-Reliability', () => {
    expect(computeKrippendorffAlpha(four, 5)).toBeCloseTo(0.743, 3);
  });

  it('is .691 for the three coders of the encyclopaedia example', () => {
    const three = pointsOf(
      '. . . . . 3 4 1 2 1 1 3 3 . 3',
      '1 . 2 1 3 3 4 3 . . . . . . .',
      '. . 2 1 3 4 4 . 2 1 1 3 3 . 4',
    );
    expect(computeKrippendorffAlpha(three, 4)).toBeCloseTo(0.691, 3);
  });

  it('is no plain agreement, nor what dropping all points with a missing answer gives (control)', () => {
    const complete = four.filter((answers) => answers.every((answer) => answer !== null));
    expect(Math.abs(computeKrippendorffAlpha(complete, 5)! - 0.743)).toBeGreaterThan(0.005);
    expect(Math.abs(computeRawAgreement(four, 5)! - 0.743)).toBeGreaterThan(0.02);
  });

  it('nears Fleiss’ kappa for complete answers: 1 − alpha = (1 − kappa)(1 − 1/N), N answers in all', () => {
    const { counts, kappa } = checkValues.fleiss1971;
    expect(computeKrippendorffAlpha(answersOf(counts), 5)).toBeCloseTo(1 - (1 - kappa) * (1 - 1 / 180), 12);
  });

  it('is undefined without two answers anywhere and where all answers are one class', () => {
    expect(computeKrippendorffAlpha([[0, null], [null, 1]], 2)).toBeNull(); // prettier-ignore
    expect(computeKrippendorffAlpha([[0, 0], [0, 0]], 2)).toBeNull(); // prettier-ignore
    expect(() => computeKrippendorffAlpha([[0, 2]], 2)).toThrow(/answer 2/);
  });
});

it('has Cohen’s kappa of two interpreters, .492 for Cohen 1968, Table 1, over the points both answered', () => {
  const { matrix } = checkValues.confusion.cohen1968;
  const points: PointAnswers[] = matrix.flatMap((row, i) =>
    row.flatMap((count, j) => Array.from({ length: count }, () => [i, j])),
  );
  const result = computePairKappa([...points, [0, null], [null, 2]], 3, 0, 1)!;
  expect(result.kappa).toBeCloseTo(0.491525, 6);
  expect(result.variance).toBeCloseTo(0.002601185, 8);
  expect(result.nPoints).toBe(200);
  expect(computePairKappa([[0, 0]], 3, 0, 1)).toBeNull();
});

it('has the share of agreeing pairs, worked by hand', () => {
  // 1, one pair of three, undefined (one answer): mean of 1 and 1/3.
  expect(computeRawAgreement([[0, 0, null], [0, 1, 1], [1, null, null]], 2)).toBeCloseTo(2 / 3, 12); // prettier-ignore
  expect(computeRawAgreement([[0, null]], 2)).toBeNull();
});

describe('agreement about one class', () => {
  const agreementOf = (points: readonly PointAnswers[], k: number) => computeClassAgreement(countClassPairs(points, k));

  it('gives the kappas by category of Fleiss 1971, Psychological Bulletin 76:378–382 (printed values from memory)', () => {
    const { counts } = checkValues.fleiss1971;
    const points = answersOf(counts);
    const total = 30 * 6;
    const kappas = [0, 1, 2, 3, 4].map((k) => {
      const share = counts.reduce((sum, row) => sum + row[k], 0) / total;
      return (agreementOf(points, k)! - share) / (1 - share);
    });
    expect(kappas.map((kappa) => kappa.toFixed(3))).toEqual(['0.245', '0.245', '0.520', '0.471', '0.566']);
  });

  it('averages, over the answers, to raw agreement where every point has as many answers', () => {
    const points = answersOf(checkValues.fleiss1971.counts);
    const byAnswers = [0, 1, 2, 3, 4].reduce((sum, k) => {
      const answers = points.flat().filter((answer) => answer === k).length;
      return sum + (answers / 180) * agreementOf(points, k)!;
    }, 0);
    expect(byAnswers).toBeCloseTo(computeRawAgreement(points, 5)!, 12);
  });

  it('leaves out points with one answer, takes missing ones, and is undefined for a class nobody named', () => {
    const points: PointAnswers[] = [
      [0, 0, null],
      [0, 1, 1],
      [0, null, null],
    ];
    // Three answers name class 0 at points that can agree; the two of the first point agree with each other.
    expect(agreementOf(points, 0)).toBeCloseTo(2 / 3, 12);
    expect(agreementOf(points, 1)).toBeCloseTo(1 / 2, 12);
    expect(agreementOf(points, 2)).toBeNull();
  });
});

describe('interval of agreement by drawing points again', () => {
  it('has the spread of a mean of independent points, and is the same for a seed', () => {
    const points: PointAnswers[] = Array.from({ length: 200 }, (_, i) => [0, i % 4 === 0 ? 1 : 0]);
    const measure = (drawn: readonly PointAnswers[]) => computeRawAgreement(drawn, 2);
    const first = bootstrapPoints(points, measure, createRng(3));
    expect(first.value).toBe(0.75);
    // Binomial: sqrt(.75 · .25 / 200) = .030619.
    expect(Math.abs(first.standardError! / 0.030619 - 1)).toBeLessThan(0.08);
    expect(first.low).toBeLessThan(0.72);
    expect(bootstrapPoints(points, measure, createRng(3))).toEqual(first);
  });

  it('has no interval where the figure is undefined, does not vary, or is undefined too often', () => {
    const alpha = (drawn: readonly PointAnswers[]) => computeKrippendorffAlpha(drawn, 2);
    expect(bootstrapPoints([], alpha, createRng(1))).toMatchObject({ value: null, low: null });
    const raw = (drawn: readonly PointAnswers[]) => computeRawAgreement(drawn, 2);
    expect(bootstrapPoints([[0, 0], [1, 1]], raw, createRng(1))).toMatchObject({ value: 1, low: null }); // prettier-ignore
    // Half of the replicates of two points hold one class only.
    const often = bootstrapPoints([[0, 0], [1, 1]], alpha, createRng(1)); // prettier-ignore
    expect(often.nUndefined).toBeGreaterThan(400);
    expect(often.low).toBeNull();
  });
});
