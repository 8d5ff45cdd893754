import { addToConfusionMatrix, createConfusionMatrix } from './confusion-matrix.ts';
import { computeKappa } from './kappa.ts';

/** Answers of the interpreters at one point: a class index, or `null` for one who gave none. */
export type PointAnswers = readonly (number | null)[];

/**
 * Share of pairs of answers at a point that agree, averaged over the points with at least two answers; `null` without
 * such a point. Every point counts alike, however many answered it.
 */
export function computeRawAgreement(points: readonly PointAnswers[], nClasses: number): number | null {
  let sum = 0;
  let n = 0;
  for (const counts of countAnswers(points, nClasses)) {
    const share = agreeingPairs(counts);
    if (share === null) continue;
    sum += share;
    n++;
  }
  return n > 0 ? sum / n : null;
}

/**
 * Cohen's kappa of two interpreters over the points both answered; `null` where it is undefined.
 * Source: Cohen 1960, Educational and Psychological Measurement 20:37–46.
 */
export function computePairKappa(
  points: readonly PointAnswers[],
  nClasses: number,
  first: number,
  second: number,
): { kappa: number; variance: number; nPoints: number } | null {
  const matrix = createConfusionMatrix(nClasses);
  let nPoints = 0;
  for (const answers of points) {
    const [a, b] = [answers[first] ?? null, answers[second] ?? null];
    if (a === null || b === null) continue;
    addToConfusionMatrix(matrix, a, b);
    nPoints++;
  }
  const result = computeKappa(matrix);
  return result && { kappa: result.kappa, variance: result.variance, nPoints };
}

export interface FleissResult {
  kappa: number;
  /** P̄, mean agreement over points. */
  observed: number;
  /** P̄e, agreement expected by chance. */
  expected: number;
  /** Standard error under kappa = 0. */
  nullStandardError: number;
  z: number | null;
  /** Points used: those with exactly nAnswers answers. */
  nPoints: number;
}

/**
 * Fleiss' kappa over the points that have exactly `nAnswers` answers (it asks for the same number at each); `null`
 * without such points, for fewer than two answers, and where all answers are one class (P̄e = 1).
 *
 * Source: Fleiss 1971, Psychological Bulletin 76:378–382; standard error under the hypothesis of no agreement beyond
 * chance: Fleiss, Nee & Landis 1979, Psychological Bulletin 86:974–977.
 */
export function computeFleissKappa(
  points: readonly PointAnswers[],
  nClasses: number,
  nAnswers: number,
): FleissResult | null {
  if (nAnswers < 2) return null;
  const used = countAnswers(points, nClasses).filter((counts) => sum(counts) === nAnswers);
  if (used.length === 0) return null;
  const shares = new Array<number>(nClasses).fill(0);
  let observed = 0;
  for (const counts of used) {
    observed += agreeingPairs(counts)! / used.length;
    counts.forEach((count, k) => (shares[k] += count / (used.length * nAnswers)));
  }
  const expected = sum(shares.map((p) => p * p));
  if (1 - expected < 1e-12) return null;
  const spread = sum(shares.map((p) => p * (1 - p)));
  const skew = sum(shares.map((p) => p * (1 - p) * (1 - 2 * p)));
  const nullStandardError =
    (Math.SQRT2 / (spread * Math.sqrt(used.length * nAnswers * (nAnswers - 1)))) *
    Math.sqrt(Math.max(0, spread * spread - skew));
  const kappa = (observed - expected) / (1 - expected);
  return {
    kappa,
    observed,
    expected,
    nullStandardError,
    z: nullStandardError > 0 ? kappa / nullStandardError : null,
    nPoints: used.length,
  };
}

/**
 * Krippendorff's alpha for classes (nominal data), with missing answers: 1 − D_o/D_e from the coincidence matrix of all
 * pairs of answers at a point, each point's pairs weighing 1/(m − 1). Points with fewer than two answers say nothing and
 * are left out. `null` without pairs, and where all answers are one class (D_e = 0).
 *
 * Source: Krippendorff 2011, Computing Krippendorff's Alpha-Reliability, University of Pennsylvania working paper.
 */
export function computeKrippendorffAlpha(points: readonly PointAnswers[], nClasses: number): number | null {
  const totals = new Array<number>(nClasses).fill(0);
  let nPaired = 0;
  let agreeing = 0;
  for (const counts of countAnswers(points, nClasses)) {
    const m = sum(counts);
    if (m < 2) continue;
    nPaired += m;
    agreeing += m * agreeingPairs(counts)!;
    counts.forEach((count, k) => (totals[k] += count));
  }
  if (nPaired === 0) return null;
  const byChance = sum(totals.map((n) => n * (n - 1))) / (nPaired - 1);
  if (nPaired - byChance < 1e-9) return null;
  return 1 - (nPaired - agreeing) / (nPaired - byChance);
}

/** What one point says of the agreement about a class. */
export interface ClassPairs {
  /** Answers that name the class, at a point with at least two answers. */
  answers: number;
  /** The same, each times the share of the other answers of the point that name the class as well. */
  agreeing: number;
}

/** What each point with at least two answers says of a class, for `computeClassAgreement`. */
export function countClassPairs(points: readonly PointAnswers[], classIndex: number): ClassPairs[] {
  return points.flatMap((given) => {
    const m = given.reduce<number>((n, answer) => n + (answer === null ? 0 : 1), 0);
    if (m < 2) return [];
    const answers = given.reduce<number>((n, answer) => n + (answer === classIndex ? 1 : 0), 0);
    return [{ answers, agreeing: (answers * (answers - 1)) / (m - 1) }];
  });
}

/**
 * Agreement about one class: the chance that another answer of a point names the class, given that one does; `null` where
 * no answer names it. Missing answers are allowed, as in the coincidence matrix of Krippendorff 2011.
 *
 * Source: Fleiss 1971, Psychological Bulletin 76:378–382, the conditional probability for a category (the same number of
 * answers at each point), of which this is the weighted form.
 */
export function computeClassAgreement(pairs: readonly ClassPairs[]): number | null {
  let answers = 0;
  let agreeing = 0;
  for (const pair of pairs) {
    answers += pair.answers;
    agreeing += pair.agreeing;
  }
  return answers > 0 ? agreeing / answers : null;
}

/** Answers of each point by class. @throws RangeError for a class index out of range. */
function countAnswers(points: readonly PointAnswers[], nClasses: number): number[][] {
  return points.map((answers, i) => {
    const counts = new Array<number>(nClasses).fill(0);
    for (const answer of answers) {
      if (answer === null) continue;
      if (!Number.isInteger(answer) || answer < 0 || answer >= nClasses) {
        throw new RangeError(`Point ${i} has the answer ${answer}, expected 0..${nClasses - 1}.`);
      }
      counts[answer]++;
    }
    return counts;
  });
}

/** Share of the pairs of answers at a point that agree; `null` for fewer than two answers. */
function agreeingPairs(counts: readonly number[]): number | null {
  const m = sum(counts);
  return m < 2 ? null : sum(counts.map((n) => n * (n - 1))) / (m * (m - 1));
}

function sum(values: readonly number[]): number {
  return values.reduce((total, value) => total + value, 0);
}
