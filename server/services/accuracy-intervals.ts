import { KAPPA_CAUTION } from '../../shared/constants/cautions.ts';
import type { Accuracy, Estimate } from '../../shared/contracts/accuracy.ts';
import type { ConfusionMatrix } from '../analysis/accuracy/confusion-matrix.ts';
import { wilsonInterval } from '../analysis/accuracy/interval.ts';
import { computeKappa } from '../analysis/accuracy/kappa.ts';
import {
  bootstrapPolygons,
  type BootstrapFigure,
  type PolygonBootstrap,
} from '../analysis/accuracy/polygon-bootstrap.ts';
import { normalQuantile } from '../analysis/accuracy/quantiles.ts';

const PIXEL_KAPPA_NOTE =
  ' Pixels of one polygon are not independent, so the standard error and the 95 % interval come from drawing whole polygons again (bootstrap), not from the large-sample formula for independent units.';
const POLYGON_KAPPA_NOTE =
  ' The standard error is the large-sample one for independent units (Fleiss, Cohen & Everitt 1969).';

/**
 * No narrower than the interval of independent pixels (Wilson): pixels of a polygon are alike or at best independent, so
 * a smaller spread between a few polygons is chance.
 */
export function widen(
  { value, low, high }: Estimate,
  { correct, total }: { correct: number; total: number },
): Estimate {
  const floor = wilsonInterval(correct, total);
  if (!floor || low === null || high === null) return { value, low, high };
  return { value, low: Math.min(low, floor.low), high: Math.max(high, floor.high) };
}

/** Any fixed number: the same polygons always give the same interval. */
const BOOTSTRAP_SEED = 1;

/** Draws polygons again within their class; together where a class has a single one, which could not vary by itself. */
export function resamplePolygons(
  polygons: readonly { referenceClass: number; mappedCounts: number[] }[],
  nClasses: number,
): PolygonBootstrap {
  const counts = polygons.map(({ referenceClass, mappedCounts }, i) => ({ id: `${i}`, referenceClass, mappedCounts }));
  const within = bootstrapPolygons(counts, nClasses, { seed: BOOTSTRAP_SEED });
  return within.nClassesWithOnePolygon === 0
    ? within
    : bootstrapPolygons(counts, nClasses, { seed: BOOTSTRAP_SEED, resampling: 'all-together' });
}

/** A bootstrapped figure as the contract has it; Wilson with polygons as trials where they do not differ at all. */
export function toEstimate({ value, low, high, nPolygons, problem }: BootstrapFigure): Estimate {
  if (value === null) return { value, low: null, high: null };
  // Without any spread between polygons the interval would be a point, which a few polygons cannot prove.
  if (problem === 'no-spread') return { value, ...orNull(wilsonInterval(value * nPolygons, nPolygons)) };
  if (low === null || high === null) return { value, low: null, high: null };
  // A bias correction may move an interval of very few polygons past the figure itself.
  return { value, low: Math.min(low, value), high: Math.max(high, value) };
}

/** The ends of an interval, both null where there is none. */
export function orNull(interval: { low: number; high: number } | null): { low: number | null; high: number | null } {
  return { low: interval?.low ?? null, high: interval?.high ?? null };
}

/** Kappa of pixels, with no smaller standard error and interval than independent pixels would give (see `widen`). */
export function reportResampledKappa(
  { value, standardError, low, high }: BootstrapFigure,
  matrix: ConfusionMatrix,
): Accuracy['kappa'] {
  const caution = KAPPA_CAUTION + PIXEL_KAPPA_NOTE;
  const ofPixels = Math.sqrt(computeKappa(matrix)?.variance ?? 0);
  if (value === null || standardError === null || low === null || high === null) {
    return { value, standardError: null, low: null, high: null, caution };
  }
  const half = normalQuantile(0.975) * ofPixels;
  return {
    value,
    standardError: Math.max(standardError, ofPixels),
    low: Math.max(-1, Math.min(low, value - half)),
    high: Math.min(1, Math.max(high, value + half)),
    caution,
  };
}

/** Kappa of polygons, which are taken as independent units. */
export function measureKappa(matrix: ConfusionMatrix): Accuracy['kappa'] {
  const result = computeKappa(matrix);
  const caution = KAPPA_CAUTION + POLYGON_KAPPA_NOTE;
  if (!result) return { value: null, standardError: null, low: null, high: null, caution };
  const standardError = Math.sqrt(result.variance);
  const half = normalQuantile(0.975) * standardError;
  // A variance of zero (no disagreement at all) is what the formula gives, and no interval.
  const hasInterval = standardError > 0;
  return {
    value: result.kappa,
    standardError,
    low: hasInterval ? Math.max(-1, result.kappa - half) : null,
    high: hasInterval ? Math.min(1, result.kappa + half) : null,
    caution,
  };
}
