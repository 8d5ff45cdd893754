import { KAPPA_CAUTION } from '../../shared/constants/cautions.ts';
import type { Accuracy, AccuracyUnit, Estimate } from '../../shared/contracts/accuracy.ts';
import {
  addToConfusionMatrix,
  createConfusionMatrix,
  summariseConfusionMatrix,
  type ConfusionMatrix,
} from '../analysis/accuracy/confusion-matrix.ts';
import { computeDisagreement } from '../analysis/accuracy/disagreement.ts';
import { clusterRatioInterval, wilsonInterval } from '../analysis/accuracy/interval.ts';
import { computeKappa } from '../analysis/accuracy/kappa.ts';
import { countPolygonAgreement } from '../analysis/accuracy/polygon-agreement.ts';
import { normalQuantile } from '../analysis/accuracy/quantiles.ts';
import type { RunClass } from '../entities/run.ts';

/** A held-out polygon and what the map says of its pixels. */
export interface HeldOutPolygon {
  id: string;
  /** Reference class, as its place among the run's classes. */
  classIndex: number;
  /** Pixels by mapped class code; codes of no class are pixels the map says nothing of. */
  mappedPixels: Record<string, number>;
}

/** Held-out polygons counted by class. */
interface Counted {
  polygons: { referenceClass: number; mappedCounts: number[]; unmapped: number; majority: number | null }[];
  matrix: ConfusionMatrix;
  unmapped: number[];
}

const METHOD: Record<AccuracyUnit, string> = {
  pixel:
    'Pixels of the held-out polygons, the polygons taken as clusters: pixels of one polygon are alike and are not independent. 95 % interval from the spread between polygons (ratio estimate in cluster sampling, Cochran 1977, with Student’s t); where all polygons agree, the Wilson score interval with as many trials as polygons.',
  polygon:
    'Each held-out polygon counts once, by the class most of its pixels are mapped as; a tie never counts in favour of the map. 95 % Wilson score interval (Wilson 1927).',
};
const PIXEL_KAPPA_NOTE =
  ' The standard error is the large-sample one for independent units (Fleiss, Cohen & Everitt 1969). Pixels of one polygon are not independent, so here it is too small, and no interval is given.';
const POLYGON_KAPPA_NOTE =
  ' The standard error is the large-sample one for independent units (Fleiss, Cohen & Everitt 1969).';

/** Counts pixels or polygons of the held-out samples by mapped and reference class. */
export function countHeldOut(
  heldOut: readonly HeldOutPolygon[],
  classes: readonly RunClass[],
  unit: AccuracyUnit,
): Counted {
  const counts = heldOut.map(({ id, classIndex, mappedPixels }) => {
    const mappedCounts = classes.map(({ code }) => mappedPixels[code] ?? 0);
    const all = Object.values(mappedPixels).reduce((sum, n) => sum + n, 0);
    const unmapped = all - mappedCounts.reduce((sum, n) => sum + n, 0);
    return { id, referenceClass: classIndex, mappedCounts, unmapped };
  });
  const agreement = countPolygonAgreement(counts, classes.length);
  const polygons = counts.map((polygon, i) => ({ ...polygon, majority: agreement.majority[i] ?? null }));
  const unmapped = classes.map(() => 0);
  const add = (index: number, n: number) => (unmapped[index] = (unmapped[index] ?? 0) + n);
  if (unit === 'polygon') {
    for (const { referenceClass, majority } of polygons) if (majority === null) add(referenceClass, 1);
    return { polygons, matrix: agreement.matrix, unmapped };
  }
  const matrix = createConfusionMatrix(classes.length);
  for (const { referenceClass, mappedCounts, unmapped: nUnmapped } of polygons) {
    mappedCounts.forEach((n, mapped) => addToConfusionMatrix(matrix, mapped, referenceClass, n));
    add(referenceClass, nUnmapped);
  }
  return { polygons, matrix, unmapped };
}

/** Overall accuracy with its interval; null where it is undefined. */
export function measureOverall(
  heldOut: readonly HeldOutPolygon[],
  classes: readonly RunClass[],
  unit: AccuracyUnit,
): Estimate {
  return estimateShare(countHeldOut(heldOut, classes, unit), unit, () => true, 'all');
}

/**
 * The share of units that are right, among those mapped as (`rows`) or of (`columns`) the chosen classes.
 * Never an interval that takes pixels of a polygon as independent.
 */
function estimateShare(
  { polygons }: Counted,
  unit: AccuracyUnit,
  isChosen: (classIndex: number) => boolean,
  side: 'all' | 'rows' | 'columns',
): Estimate {
  const hits: number[] = [];
  const sizes: number[] = [];
  for (const { referenceClass, mappedCounts, majority } of polygons) {
    const counts = unit === 'pixel' ? mappedCounts : mappedCounts.map((_, i) => (i === majority ? 1 : 0));
    const isCounted = (mapped: number) => side === 'all' || isChosen(side === 'rows' ? mapped : referenceClass);
    hits.push(isCounted(referenceClass) ? (counts[referenceClass] ?? 0) : 0);
    sizes.push(counts.reduce((sum, n, mapped) => (isCounted(mapped) ? sum + n : sum), 0));
  }
  const total = sizes.reduce((sum, n) => sum + n, 0);
  if (total === 0) return { value: null, low: null, high: null };
  const right = hits.reduce((sum, n) => sum + n, 0);
  const value = right / total;
  if (unit === 'polygon') return { value, ...orNull(wilsonInterval(right, total)) };
  const interval = clusterRatioInterval(hits, sizes);
  if (!interval) return { value, low: null, high: null };
  // Without any spread between polygons the interval would be a point, which a few polygons cannot prove.
  const { nClusters } = interval;
  return { value, ...orNull(interval.degenerate ? wilsonInterval(value * nClusters, nClusters) : interval) };
}

function orNull(interval: { low: number; high: number } | null): { low: number | null; high: number | null } {
  return { low: interval?.low ?? null, high: interval?.high ?? null };
}

type Figures = Pick<
  Accuracy,
  | 'matrix'
  | 'unmapped'
  | 'total'
  | 'polygonCount'
  | 'overall'
  | 'kappa'
  | 'quantityDisagreement'
  | 'allocationDisagreement'
  | 'perClass'
>;

/** All accuracy figures of held-out polygons. A figure that cannot be computed is null, never 0 or not-a-number. */
export function measureAccuracy(
  heldOut: readonly HeldOutPolygon[],
  classes: readonly RunClass[],
  unit: AccuracyUnit,
): Figures {
  const counted = countHeldOut(heldOut, classes, unit);
  const { matrix, unmapped } = counted;
  const summary = summariseConfusionMatrix(matrix);
  const disagreement = computeDisagreement(matrix);
  const n = classes.length;
  return {
    matrix: classes.map((_, mapped) => Array.from(matrix.counts.subarray(mapped * n, (mapped + 1) * n))),
    unmapped,
    total: summary.total,
    polygonCount: heldOut.length,
    overall: { ...estimateShare(counted, unit, () => true, 'all'), method: METHOD[unit] },
    kappa: measureKappa(matrix, unit),
    quantityDisagreement: disagreement?.quantity ?? null,
    allocationDisagreement: disagreement?.allocation ?? null,
    perClass: summary.perClass.map(({ mapped, reference, correct, f1 }, index) => {
      const heldOutPolygons = heldOut.filter(({ classIndex }) => classIndex === index).length;
      return {
        classId: classes[index]?.id ?? '',
        mappedCount: mapped,
        referenceCount: reference,
        correctCount: correct,
        heldOutPolygons,
        users: estimateShare(counted, unit, (c) => c === index, 'rows'),
        producers: estimateShare(counted, unit, (c) => c === index, 'columns'),
        f1,
        warning: warnOfFew(reference, heldOutPolygons, unit),
      };
    }),
  };
}

function measureKappa(matrix: ConfusionMatrix, unit: AccuracyUnit): Accuracy['kappa'] {
  const result = computeKappa(matrix);
  const caution = KAPPA_CAUTION + (unit === 'pixel' ? PIXEL_KAPPA_NOTE : POLYGON_KAPPA_NOTE);
  if (!result) return { value: null, standardError: null, low: null, high: null, caution };
  const standardError = Math.sqrt(result.variance);
  const half = normalQuantile(0.975) * standardError;
  // A variance of zero (no disagreement at all) is what the formula gives, and no interval.
  const hasInterval = unit === 'polygon' && standardError > 0;
  return {
    value: result.kappa,
    standardError,
    low: hasInterval ? Math.max(-1, result.kappa - half) : null,
    high: hasInterval ? Math.min(1, result.kappa + half) : null,
    caution,
  };
}

/** Rule of thumb for accuracy samples: Congalton 1991, Remote Sensing of Environment 37:35–46. */
const UNITS_WANTED = 50;
/** Common practice, no published source. */
const POLYGONS_WANTED = 5;

function warnOfFew(units: number, polygons: number, unit: AccuracyUnit): string | null {
  const reasons: string[] = [];
  if (units < UNITS_WANTED) {
    reasons.push(
      `${units} held-out ${unit}${units === 1 ? '' : 's'}; under the rule of thumb of ${UNITS_WANTED} units a class (Congalton 1991)`,
    );
  }
  if (polygons < POLYGONS_WANTED) {
    reasons.push(
      `${polygons} held-out polygon${polygons === 1 ? '' : 's'}; fewer than ${POLYGONS_WANTED} say little (common practice, no published source)`,
    );
  }
  return reasons.length > 0 ? `Too few to rely on: ${reasons.join('; ')}.` : null;
}
