import type { Agreement, How } from '../../shared/contracts/reference.ts';
import { bootstrapPoints } from '../analysis/accuracy/agreement-bootstrap.ts';
import {
  computeClassAgreement,
  computeFleissKappa,
  computeKrippendorffAlpha,
  computePairKappa,
  computeRawAgreement,
  countClassPairs,
  type PointAnswers,
} from '../analysis/accuracy/interpreter-agreement.ts';
import { createRng } from '../analysis/sampling/rng.ts';
import type { App } from '../app-context.ts';
import type { ReferenceDesign } from '../entities/reference-design.ts';
import type { User } from '../entities/user.ts';
import { requireInterpreted } from './design-adjudication.ts';
import { loadAnsweredPoints } from './design-settle.ts';

/** Any fixed number: the same answers always give the same interval. */
const SEED = 1;
const REPLICATES = 1000;
/** Points × replicates are kept near this, so that no request holds the server up. */
const BUDGET = 1_000_000;

const BOOTSTRAP = '95 % percentile interval by drawing whole points again (bootstrap; Efron & Tibshirani 1993)';
const FORMULAS = {
  raw: {
    formula: `share of the pairs of answers at a point that agree, averaged over points with at least two; ${BOOTSTRAP}`,
    source: 'Fleiss 1971, Psychological Bulletin 76:378–382 (observed agreement)',
  },
  cohen: {
    formula: `κ = (p_o − p_e) / (1 − p_e) over the points both answered; ${BOOTSTRAP}`,
    source: 'Cohen 1960, Educational and Psychological Measurement 20:37–46',
  },
  fleiss: {
    formula: `κ = (P̄ − P̄_e) / (1 − P̄_e) over the points with all their answers; ${BOOTSTRAP}`,
    source: 'Fleiss 1971, Psychological Bulletin 76:378–382',
  },
  krippendorff: {
    formula: `α = 1 − D_o / D_e for nominal data, missing answers allowed; ${BOOTSTRAP}`,
    source: 'Krippendorff 2011, Computing Krippendorff’s Alpha-Reliability',
  },
  class: {
    formula: `share of the other answers of a point that name the class, over all answers that name it; ${BOOTSTRAP}`,
    source: 'Fleiss 1971, Psychological Bulletin 76:378–382 (agreement by category), weighted for missing answers',
  },
} as const;

/** How far the interpreters agree, before anything was decided. @throws Conflict "still-interpreting" */
export async function measureAgreement(app: App, design: ReferenceDesign): Promise<Agreement> {
  requireInterpreted(design);
  const answered = (await loadAnsweredPoints(app, design.id)).filter(({ answers }) => answers.length > 0);
  const people = new Map<string, User | null>();
  for (const { answers } of answered) for (const { userId, user } of answers) people.set(userId ?? '', user);
  const ids = [...people.keys()].sort((a, b) => (people.get(a)?.name ?? '').localeCompare(people.get(b)?.name ?? ''));
  const placeOf = new Map(design.classes.map(({ id }, i) => [id, i]));
  const points: PointAnswers[] = answered.map(({ answers }) =>
    ids.map((id) => {
      const answer = answers.find(({ userId }) => (userId ?? '') === id);
      return answer ? (placeOf.get(answer.classId) ?? null) : null;
    }),
  );
  const nClasses = design.classes.length;
  const compared = points.filter((answers) => answers.filter((answer) => answer !== null).length >= 2);

  const figure = <T>(
    kind: keyof typeof FORMULAS,
    used: readonly T[],
    measure: (points: readonly T[]) => number | null,
  ): Agreement['raw'] => {
    const nReplicates = Math.max(50, Math.min(REPLICATES, Math.floor(BUDGET / Math.max(1, used.length))));
    const { value, standardError, low, high } = bootstrapPoints(used, measure, createRng(SEED), { nReplicates });
    const inputs: How['inputs'] = [
      { name: 'points', value: used.length },
      { name: 'interpreters', value: ids.length },
      { name: 'bootstrap replicates', value: nReplicates },
    ];
    return { value, standardError, low, high, n: used.length, how: { ...FORMULAS[kind], inputs } };
  };
  const both = (first: number, second: number) =>
    points.filter((answers) => answers[first] !== null && answers[second] !== null);
  const pairs = ids
    .flatMap((_, first) => ids.slice(first + 1).map((__, i) => ({ first, second: first + 1 + i })))
    .map((pair) => ({ ...pair, shared: both(pair.first, pair.second) }))
    .filter(({ shared }) => shared.length > 0);
  const full = compared.filter(
    (answers) => answers.filter((answer) => answer !== null).length === design.answersPerPoint,
  );
  const [most] = pairs.toSorted((a, b) => b.shared.length - a.shared.length);
  return {
    designId: design.id,
    interpreters: ids.map((id, i) => {
      const user = people.get(id);
      return {
        person: user ? { id: user.id, name: user.name } : null,
        answered: points.filter((answers) => answers[i] !== null).length,
      };
    }),
    nPoints: compared.length,
    raw: figure('raw', compared, (used) => computeRawAgreement(used, nClasses)),
    cohen: pairs.map(({ first, second, shared }) => ({
      ...{ first, second },
      figure: figure('cohen', shared, (used) => computePairKappa(used, nClasses, first, second)?.kappa ?? null),
    })),
    fleiss: figure('fleiss', full, (used) => computeFleissKappa(used, nClasses, design.answersPerPoint)?.kappa ?? null),
    krippendorff: figure('krippendorff', compared, (used) => computeKrippendorffAlpha(used, nClasses)),
    perClass: design.classes.map((one, classIndex) => {
      const pairs = countClassPairs(compared, classIndex);
      return {
        class: one,
        answers: pairs.reduce((sum, { answers }) => sum + answers, 0),
        figure: figure('class', pairs, computeClassAgreement),
      };
    }),
    matrix: most ? crossTabulate(most.shared, most.first, most.second, nClasses) : null,
    cautions: [
      'Agreement is that of the first choices, before anything was decided.',
      'Points are counted alike, however much area they stand for: the figures speak for the points, not for the area.',
      'People who agree may be wrong together.',
    ],
  };
}

function crossTabulate(points: readonly PointAnswers[], first: number, second: number, nClasses: number): number[][] {
  const matrix = Array.from({ length: nClasses }, () => new Array<number>(nClasses).fill(0));
  for (const answers of points) {
    const row = matrix[answers[first] ?? -1];
    const column = answers[second] ?? -1;
    if (row?.[column] !== undefined) row[column]++;
  }
  return matrix;
}
