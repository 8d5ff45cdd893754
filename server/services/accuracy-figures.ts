import type { Accuracy, AccuracyUnit, Estimate } from '../../shared/contracts/accuracy.ts';
import {
  addToConfusionMatrix,
  createConfusionMatrix,
  summariseConfusionMatrix,
  type ConfusionMatrix,
} from '../analysis/accuracy/confusion-matrix.ts';
import { computeDisagreement } from '../analysis/accuracy/disagreement.ts';
import { clusterRatioInterval, wilsonInterval } from '../analysis/accuracy/interval.ts';
import { countPolygonAgreement } from '../analysis/accuracy/polygon-agreement.ts';
import type { RunClass } from '../entities/run.ts';
import {
  measureKappa,
  orNull,
  reportResampledKappa,
  resamplePolygons,
  toEstimate,
  widen,
} from './accuracy-intervals.ts';

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
    'Pixels of the held-out polygons, the polygons taken as clusters: pixels of one polygon are alike and are not independent. 95 % interval of overall, producer’s accuracy and kappa by drawing whole polygons again (2,000 bootstrap replicates, polygons drawn within their class, Rao & Wu 1988; BCa interval, Efron 1987, widened by Student’s t; fixed seed). User’s accuracy from the spread between all polygons (ratio estimate in cluster sampling, Cochran 1977, with Student’s t), which is wider: its errors come from few polygons of other classes. Where all polygons agree, the Wilson score interval with as many trials as polygons. Never narrower than with pixels as independent: so small a spread between few polygons is chance.',
  polygon:
    'Each held-out polygon counts once, by the class most of its pixels are mapped as; a tie never counts in favour of the map. 95 % Wilson score interval (Wilson 1927).',
};
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
  const counted = countHeldOut(heldOut, classes, unit);
  return unit === 'pixel'
    ? widen(
        toEstimate(resamplePolygons(counted.polygons, classes.length).overall),
        summariseConfusionMatrix(counted.matrix),
      )
    : estimateShare(counted, unit, () => true, 'all');
}

/**
 * The share of units that are right, among those mapped as (`rows`) or of (`columns`) the chosen classes.
 * Never an interval from pixels of a polygon as independent, but for the least width of one.
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
  if (interval.degenerate) return { value, ...orNull(wilsonInterval(value * nClusters, nClusters)) };
  return widen({ value, low: interval.low, high: interval.high }, { correct: right, total });
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
  const resampled = unit === 'pixel' ? resamplePolygons(counted.polygons, n) : null;
  const overall = resampled
    ? widen(toEstimate(resampled.overall), summary)
    : estimateShare(counted, unit, () => true, 'all');
  const toProducers = (index: number, correct: number, total: number): Estimate => {
    const figure = resampled?.perClass[index]?.producers;
    if (!figure) return estimateShare(counted, unit, (c) => c === index, 'columns');
    return widen(toEstimate(figure), { correct, total });
  };
  return {
    matrix: classes.map((_, mapped) => Array.from(matrix.counts.subarray(mapped * n, (mapped + 1) * n))),
    unmapped,
    total: summary.total,
    polygonCount: heldOut.length,
    overall: { ...overall, method: METHOD[unit] },
    kappa: resampled ? reportResampledKappa(resampled.kappa, matrix) : measureKappa(matrix),
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
        producers: toProducers(index, correct, reference),
        f1,
        warning: warnOfFew(reference, heldOutPolygons, unit),
      };
    }),
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
