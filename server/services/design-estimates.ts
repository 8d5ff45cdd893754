import { KAPPA_CAUTION, MAP_CAUTIONS } from '../../shared/constants/cautions.ts';
import { UNCLASSIFIED_CODE } from '../../shared/constants/class-codes.ts';
import type { DesignFigure, Estimates, How } from '../../shared/contracts/reference.ts';
import { MIN_UNITS, reportDesign, type DesignReport } from '../analysis/accuracy/design-report.ts';
import { recoverIntervals } from '../analysis/accuracy/recovered-interval.ts';
import {
  countReferenceUnits,
  type LabelRule,
  type ReferenceUnit,
  type StratumSize,
} from '../analysis/accuracy/reference-units.ts';
import { estimateStratified, type StratifiedEstimate } from '../analysis/accuracy/stratified-estimate.ts';
import { SPACING_EFFECT } from '../analysis/sampling/keep-spacing.ts';
import type { App } from '../app-context.ts';
import { Project } from '../entities/project.ts';
import type { ReferenceDesign } from '../entities/reference-design.ts';
import { Conflict } from '../errors.ts';
import { requireResult } from './accuracy.ts';
import { presentFigure } from './design-figures.ts';
import { loadAnsweredPoints, type AnsweredPoint } from './design-settle.ts';

type Rows = Estimates['rows'];

/** Rows of the matrices: the classes, and what the map left unclassified where there is any. */
export function listRows({ classes, run }: Pick<ReferenceDesign, 'classes' | 'run'>): Rows {
  const rows: Rows = classes.map(({ id, code, name, colour }) => ({ classId: id, code, name, colour }));
  const isLeft = (requireResult(run).pixelsByCode[UNCLASSIFIED_CODE] ?? 0) > 0;
  return isLeft ? [...rows, { classId: null, code: UNCLASSIFIED_CODE, name: 'Unclassified', colour: '#808080' }] : rows;
}

export function toUnits(points: readonly AnsweredPoint[], rows: Rows): ReferenceUnit[] {
  const ofClass = new Map(rows.map(({ classId }, i) => [classId, i]));
  const ofCode = new Map(rows.map(({ code }, i) => [code, i]));
  return points.flatMap(({ point, settled }) => {
    if (!settled) return [];
    const mapped = ofCode.get(point.mappedCode);
    const reference = ofClass.get(settled.classId);
    if (mapped === undefined || reference === undefined)
      throw new Error(`Point ${point.number} has a class of no row.`);
    const alternates = settled.alternateClassIds.map((id) => ofClass.get(id));
    // With several second choices the one the map shows counts: the rule is lenient by its name.
    const alternate = alternates.includes(mapped) ? mapped : (alternates[0] ?? null);
    return [{ stratum: point.stratum, mapped, reference, alternate }];
  });
}

interface Estimated {
  counts: number[][];
  estimate: StratifiedEstimate | null;
  report: DesignReport | null;
}

function estimate(
  units: readonly ReferenceUnit[],
  strata: readonly StratumSize[],
  rows: Rows,
  mappedAreaHa: readonly number[],
  labels: LabelRule,
): Estimated {
  const n = rows.length;
  const samples = countReferenceUnits(units, strata, n, { labels });
  const counts = rows.map((_, i) =>
    rows.map((__, j) => samples.reduce((sum, sample) => sum + (sample.counts.counts[i * n + j] ?? 0), 0)),
  );
  const result = estimateStratified(samples);
  const totalAreaHa = strata.reduce((sum, { areaHa = 0 }) => sum + areaHa, 0);
  const report = result && reportDesign(result, { totalAreaHa, mappedAreaHa, recovered: recoverIntervals(samples) });
  return { counts, estimate: result, report };
}

/** @throws Conflict "not-closed" before, so that nobody stops when the figures please */
export function requireClosed({ state }: Pick<ReferenceDesign, 'state'>): void {
  if (state === 'closed') return;
  throw new Conflict(
    'Estimates are made once the design is closed, so that nobody stops when the figures please.',
    { found: `it is ${state}`, wanted: 'closed' },
    'not-closed',
  );
}

/**
 * Accuracy and areas from the reference points of a closed design, weighted by the strata they were drawn from.
 * @throws Conflict "not-closed" before
 */
export async function estimateDesign(app: App, design: ReferenceDesign): Promise<Estimates> {
  requireClosed(design);
  const points = await loadAnsweredPoints(app, design.id);
  const project = await app.db.getRepository(Project).findOneByOrFail({ id: design.projectId });
  const { strata } = design;
  const rows = listRows(design);
  const sizes = strata.map(({ pixels, areaHa }) => ({ size: pixels, areaHa }));
  const totalAreaHa = strata.reduce((sum, { areaHa }) => sum + areaHa, 0);
  // Of the map itself: strata need not be its classes.
  const { areaHaByCode } = requireResult(design.run);
  const mappedAreaHa = rows.map(({ code }) => areaHaByCode[code] ?? 0);
  const units = toUnits(points, rows);
  const primary = estimate(units, sizes, rows, mappedAreaHa, 'primary');
  const either = estimate(units, sizes, rows, mappedAreaHa, 'either');
  const usedOf = strata.map((_, h) => units.filter(({ stratum }) => stratum === h).length);
  const drawnOf = strata.map((_, h) => points.filter(({ point }) => point.stratum === h).length);
  const shared: How['inputs'] = [
    { name: 'points used', value: units.length },
    { name: 'strata (weight W, points used n)', value: describeWeights(strata, usedOf) },
  ];
  const overall = presentFigure(primary.report?.overall ?? null, 'overall', [
    { name: 'points on the diagonal', value: diagonal(primary.counts) },
    ...shared,
  ]);
  const unsettled = points.length - units.length;
  const empty = strata.filter((_, h) => usedOf[h] === 0).map(({ name }) => name);
  return {
    ...{ designId: design.id, runId: design.runId, digest: design.digest ?? '' },
    design: {
      ...{ n: points.length, used: units.length, unsettled, seed: design.seed },
      decided: points.filter(({ settled }) => settled?.by === 'decision').length,
      ...{ minSpacingMeters: design.minSpacingMeters, totalAreaHa },
      strata: strata.map(({ code, name, colour, pixels, areaHa, share }, h) => ({
        ...{ code, name, colour, pixels, areaHa, weight: share, drawn: drawnOf[h] ?? 0, used: usedOf[h] ?? 0 },
      })),
    },
    rows,
    columns: design.classes,
    // Nothing on the ground is unclassified, so that row has no column.
    counts: primary.counts.map((row) => row.slice(0, design.classes.length)),
    proportions: primary.estimate && toProportions(primary.estimate, design.classes.length),
    overall,
    kappa: presentKappa(primary.report?.kappa ?? null, shared),
    quantityDisagreement: presentFigure(primary.report?.quantityDisagreement ?? null, 'quantity', shared),
    allocationDisagreement: presentFigure(primary.report?.allocationDisagreement ?? null, 'allocation', shared),
    perClass: design.classes.map((landClass, k) => {
      const of = primary.report?.perClass[k] ?? null;
      const mappedPoints = (primary.counts[k] ?? []).reduce((sum, count) => sum + count, 0);
      const referencePoints = primary.counts.reduce((sum, row) => sum + (row[k] ?? 0), 0);
      const inputs: How['inputs'] = [
        { name: `points mapped as ${landClass.name}`, value: mappedPoints },
        { name: `points of reference class ${landClass.name}`, value: referencePoints },
        { name: 'points of both', value: primary.counts[k]?.[k] ?? 0 },
        ...shared,
      ];
      const { id, code, name, colour } = landClass;
      return {
        ...{ classId: id, code, name, colour, mappedPoints, referencePoints },
        users: presentFigure(of?.users ?? null, 'users', inputs),
        producers: presentFigure(of?.producers ?? null, 'producers', inputs),
        f1: presentFigure(of?.f1 ?? null, 'f1', inputs),
        areaShare: presentFigure(of?.areaShare ?? null, 'areaShare', inputs),
        areaHa: presentFigure(of?.areaHa ?? null, 'areaHa', [
          { name: 'total area, ha', value: totalAreaHa },
          ...inputs,
        ]),
        mappedAreaHa: mappedAreaHa[k] ?? 0,
        differenceHa: of?.differenceHa ?? null,
        warning: warnOfFew(mappedPoints, referencePoints),
      };
    }),
    eitherLabel: presentEither(either, design, shared),
    target: judgeTarget(project.targetOverallAccuracy, overall),
    problem:
      primary.estimate !== null
        ? null
        : `No estimate can be made: no point with a settled class lies in ${empty.join(', ')}.`,
    cautions: listCautions(design, points, unsettled),
  };
}

/** Kappa with its Z test against no agreement beyond chance. */
function presentKappa(kappa: DesignReport['kappa'] | null, shared: How['inputs']): Estimates['kappa'] {
  const z = kappa?.value != null && kappa.standardError ? kappa.value / kappa.standardError : null;
  const inputs = [{ name: 'Z = K / S, against K = 0', value: z }, ...shared];
  return { ...presentFigure(kappa, 'kappa', inputs), caution: KAPPA_CAUTION };
}

const MAX_STRATA_SPELT_OUT = 30;

function describeWeights(strata: ReferenceDesign['strata'], usedOf: readonly number[]): string {
  if (strata.length > MAX_STRATA_SPELT_OUT) return `${strata.length} strata, see the table of the design`;
  return strata.map(({ name, share }, h) => `${name}: W = ${share.toFixed(6)}, n = ${usedOf[h]}`).join('; ');
}

function presentEither(either: Estimated, design: ReferenceDesign, shared: How['inputs']): Estimates['eitherLabel'] {
  const { report, counts } = either;
  const inputs = [{ name: 'points right by either label', value: diagonal(counts) }, ...shared];
  return {
    overall: presentFigure(report?.overall ?? null, 'overall', inputs),
    perClass: design.classes.map(({ id }, k) => ({
      classId: id,
      users: presentFigure(report?.perClass[k]?.users ?? null, 'users', inputs),
      producers: presentFigure(report?.perClass[k]?.producers ?? null, 'producers', inputs),
    })),
  };
}

function diagonal(counts: readonly number[][]): number {
  return counts.reduce((sum, row, k) => sum + (row[k] ?? 0), 0);
}

function toProportions({ proportions: { nClasses, counts } }: StratifiedEstimate, nColumns: number): number[][] {
  return Array.from({ length: nClasses }, (_, i) => [...counts.slice(i * nClasses, i * nClasses + nColumns)]);
}

function warnOfFew(mapped: number, reference: number): string | null {
  const parts = [
    ...(mapped < MIN_UNITS ? [`${mapped} points mapped`] : []),
    ...(reference < MIN_UNITS ? [`${reference} points of this reference class`] : []),
  ];
  if (parts.length === 0) return null;
  return `${parts.join(' and ')}: under the rule of thumb of ${MIN_UNITS} a class (Congalton 1991). Read the intervals.`;
}

/** A target is met or missed only when the whole interval says so. */
function judgeTarget(target: number | null, { low, high }: DesignFigure): Estimates['target'] {
  if (target === null || low === null || high === null) return null;
  return { overall: target, verdict: low >= target ? 'met' : high < target ? 'missed' : 'uncertain' };
}

function isInterpreter(points: readonly AnsweredPoint[], userId: string): boolean {
  return points.some(({ point, answers }) => point.decidedById === userId || answers.some((a) => a.userId === userId));
}

function listCautions(design: ReferenceDesign, points: readonly AnsweredPoint[], unsettled: number): string[] {
  const thin = points.filter(
    ({ answers, settled }) => settled?.by === 'agreement' && answers.length < design.answersPerPoint,
  ).length;
  return [
    ...(unsettled > 0
      ? [
          `${unsettled} of ${points.length} points have no settled class and are left out. The estimates take them to be like the others of their stratum, which cannot be known.`,
        ]
      : []),
    ...(thin > 0 ? [`${thin} points have fewer answers than the ${design.answersPerPoint} the design asks for.`] : []),
    ...(design.run.startedById !== null && isInterpreter(points, design.run.startedById)
      ? ['Who started the run also interpreted points, and may have known its map.']
      : []),
    ...(design.minSpacingMeters > 0
      ? [`${SPACING_EFFECT} Candidates left out here: ${design.leftOutBySpacing.reduce((sum, n) => sum + n, 0)}.`]
      : []),
    ...(design.augmentsId === null
      ? []
      : [
          'The design carries on an earlier one. Growing a design because of what its figures said makes intervals too narrow.',
        ]),
    'The reference itself is people’s interpretation and not free of error; see the agreement of the interpreters.',
    ...MAP_CAUTIONS,
  ];
}
