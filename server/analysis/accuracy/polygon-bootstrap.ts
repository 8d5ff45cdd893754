import { createRng, type Rng } from '../sampling/rng.ts';
import { bcaInterval, expandedTail, percentileInterval, standardErrorOfReplicates } from './bootstrap-interval.ts';
import {
  addPolygon,
  clearTotals,
  countCarriers,
  createTotals,
  packPolygons,
  type MatrixTotals,
  type PackedPolygons,
} from './packed-polygons.ts';
import type { PolygonCounts } from './polygon-agreement.ts';

/**
 * `within-class` keeps the number of polygons of each reference class, as a split by class does; `all-together` lets it
 * vary.
 */
export type PolygonResampling = 'within-class' | 'all-together';

export interface PolygonBootstrapOptions {
  seed: number;
  nReplicates?: number;
  confidence?: number;
  interval?: 'percentile' | 'bca';
  resampling?: PolygonResampling;
}

export interface BootstrapFigure {
  /** The figure of the polygons as they are; `null` where it is undefined. */
  value: number | null;
  /** Standard deviation of the replicates in which the figure is defined. */
  standardError: number | null;
  /** `null` where `problem` says why. */
  low: number | null;
  high: number | null;
  /** Polygons that carry the figure's denominator. */
  nPolygons: number;
  /** Replicates in which the figure is undefined; they are left out of the interval. */
  nUndefined: number;
  /**
   * `undefined`: the figure itself is; `one-polygon`: nothing to compare it with; `no-spread`: all replicates are equal,
   * so the interval would be a point; `often-undefined`: undefined in more than a tenth of the replicates (our own limit,
   * no published source), so that the rest would not speak for it.
   */
  problem: null | 'undefined' | 'one-polygon' | 'no-spread' | 'often-undefined';
}

export interface PolygonBootstrap {
  nPolygons: number;
  nReplicates: number;
  /** Classes with one polygon, which never varies when resampled within its class. */
  nClassesWithOnePolygon: number;
  overall: BootstrapFigure;
  kappa: BootstrapFigure;
  perClass: { users: BootstrapFigure; producers: BootstrapFigure; f1: BootstrapFigure }[];
}

const UNDEFINED_SHARE_ALLOWED = 0.1;

/**
 * Bootstraps the pixel figures of held-out polygons by drawing whole polygons, since pixels of one polygon are not
 * independent.
 *
 * `mappedCounts` of each polygon have length nClasses; polygons without counted pixels are left out. Of k polygons
 * (of a class, or of all) k − 1 are drawn with replacement, each weighing k/(k − 1): drawing all k would make the
 * variance too small by (k − 1)/k, much for the few polygons a class has. The result depends on the seed and the order
 * of the polygons alone. Intervals are BCa by default, which hold the true value more often than percentile ones for
 * accuracies near 1 (measured by tests/bench/coverage.ts), and their tails are widened by Student's t with polygons less
 * groups (overall, kappa) or the figure's polygons less one as degrees of freedom. User's accuracy is the weak one: its
 * errors come from polygons of other classes, of which few samples hold enough. Time is
 * nReplicates × (polygons × classes met in each + nClasses).
 * Source: Rao & Wu 1988, Journal of the American Statistical Association 83:231–241; Efron & Tibshirani 1993, An
 * Introduction to the Bootstrap.
 * @throws RangeError when a polygon has not nClasses counts, a class out of range, or fewer than 50 replicates are asked.
 */
export function bootstrapPolygons(
  polygons: readonly PolygonCounts[],
  nClasses: number,
  {
    seed,
    nReplicates = 2000,
    confidence = 0.95,
    interval = 'bca',
    resampling = 'within-class',
  }: PolygonBootstrapOptions,
): PolygonBootstrap {
  if (!Number.isInteger(nReplicates) || nReplicates < 50) {
    throw new RangeError(`At least 50 replicates are needed, got ${nReplicates}.`);
  }
  const packed = packPolygons(polygons, nClasses);
  const nFigures = 2 + 3 * nClasses;
  const totals = createTotals(nClasses);
  for (let i = 0; i < packed.nPolygons; i++) addPolygon(totals, packed, i, 1);
  const values = new Float64Array(nFigures);
  writeFigures(totals, values, 0, 1);
  const leaveOneOut = interval === 'bca' ? jackknife(packed, totals, nFigures) : null;

  const groups = groupPolygons(packed, nClasses, resampling);
  const rng = createRng(seed);
  // Figure by figure, so that each one's replicates lie together and can be sorted in place.
  const replicates = new Float64Array(nFigures * nReplicates);
  const drawn = createTotals(nClasses);
  const held = createTotals(nClasses);
  for (let r = 0; r < nReplicates; r++) {
    clearTotals(drawn);
    for (const group of groups) drawGroup(drawn, packed, group, rng, held);
    writeFigures(drawn, replicates, r, nReplicates);
  }

  const carriers = countCarriers(packed, nClasses);
  // Each class whose polygons vary by themselves takes one degree.
  const ofAll = Math.max(1, packed.nPolygons - groups.length);
  const figureAt = (at: number, nPolygons: number, degreesOfFreedom = nPolygons - 1): BootstrapFigure => {
    const all = replicates.subarray(at * nReplicates, (at + 1) * nReplicates).sort();
    // The sort puts not-a-number last.
    let nDefined = all.length;
    while (nDefined > 0 && Number.isNaN(all[nDefined - 1])) nDefined--;
    const sorted = all.subarray(0, nDefined);
    const value = Number.isNaN(values[at]) ? null : values[at];
    const figure = { value, standardError: null, low: null, high: null, nPolygons, nUndefined: nReplicates - nDefined };
    if (value === null) return { ...figure, problem: 'undefined' };
    if (nPolygons < 2) return { ...figure, problem: 'one-polygon' };
    if (figure.nUndefined > UNDEFINED_SHARE_ALLOWED * nReplicates) return { ...figure, problem: 'often-undefined' };
    if (sorted[nDefined - 1] - sorted[0] < 1e-12) return { ...figure, standardError: 0, problem: 'no-spread' };
    const tail = expandedTail(degreesOfFreedom, confidence);
    const ends = leaveOneOut ? bcaInterval(sorted, value, leaveOneOut(at), tail) : percentileInterval(sorted, tail);
    return { ...figure, standardError: standardErrorOfReplicates(sorted), ...ends!, problem: null };
  };
  return {
    nPolygons: packed.nPolygons,
    nReplicates,
    nClassesWithOnePolygon: carriers.reference.filter((n) => n === 1).length,
    overall: figureAt(0, packed.nPolygons, ofAll),
    kappa: figureAt(1, packed.nPolygons, ofAll),
    perClass: Array.from({ length: nClasses }, (_, k) => ({
      users: figureAt(2 + 3 * k, carriers.mapped[k]),
      producers: figureAt(3 + 3 * k, carriers.reference[k]),
      f1: figureAt(4 + 3 * k, carriers.either[k]),
    })),
  };
}

function groupPolygons(packed: PackedPolygons, nClasses: number, resampling: PolygonResampling): Uint32Array[] {
  const groups: number[][] = Array.from({ length: resampling === 'within-class' ? nClasses : 1 }, () => []);
  for (let i = 0; i < packed.nPolygons; i++) {
    groups[resampling === 'within-class' ? packed.referenceClass[i] : 0].push(i);
  }
  return groups.filter((group) => group.length > 0).map((group) => Uint32Array.from(group));
}

/** The hot loop: `addPolygon` written out, and the weight put on once at the end. */
function drawGroup(
  totals: MatrixTotals,
  packed: PackedPolygons,
  group: Uint32Array,
  rng: Rng,
  held: MatrixTotals,
): void {
  const k = group.length;
  if (k === 1) return addPolygon(totals, packed, group[0], 1);
  const { referenceClass, size, start, mappedClass, count } = packed;
  const { mapped, reference, correct } = held;
  clearTotals(held);
  for (let d = 1; d < k; d++) {
    const i = group[rng.nextBelow(k)];
    const truth = referenceClass[i];
    reference[truth] += size[i];
    const end = start[i + 1];
    for (let e = start[i]; e < end; e++) {
      const c = mappedClass[e];
      mapped[c] += count[e];
      if (c === truth) correct[c] += count[e];
    }
  }
  const weight = k / (k - 1);
  for (let c = 0; c < mapped.length; c++) {
    totals.mapped[c] += weight * mapped[c];
    totals.reference[c] += weight * reference[c];
    totals.correct[c] += weight * correct[c];
  }
}

/** Writes overall, kappa and each class's user's, producer's and F1 to `to[at + f·step]`, NaN where undefined. */
function writeFigures({ mapped, reference, correct }: MatrixTotals, to: Float64Array, at: number, step: number): void {
  const nClasses = mapped.length;
  let total = 0;
  let right = 0;
  let byChance = 0;
  for (let k = 0; k < nClasses; k++) {
    total += reference[k];
    right += correct[k];
    byChance += mapped[k] * reference[k];
    to[at + (2 + 3 * k) * step] = mapped[k] > 0 ? correct[k] / mapped[k] : NaN;
    to[at + (3 + 3 * k) * step] = reference[k] > 0 ? correct[k] / reference[k] : NaN;
    const both = mapped[k] + reference[k];
    to[at + (4 + 3 * k) * step] = both > 0 ? (2 * correct[k]) / both : NaN;
  }
  const observed = total > 0 ? right / total : NaN;
  const beyondChance = 1 - byChance / (total * total);
  to[at] = observed;
  to[at + step] = beyondChance > 1e-12 ? (observed - 1 + beyondChance) / beyondChance : NaN;
}

/** Figures with each polygon left out in turn, those that stay defined. */
function jackknife(packed: PackedPolygons, totals: MatrixTotals, nFigures: number): (figure: number) => Float64Array {
  const n = packed.nPolygons;
  const table = new Float64Array(nFigures * n);
  for (let i = 0; i < n; i++) {
    addPolygon(totals, packed, i, -1);
    writeFigures(totals, table, i, n);
    addPolygon(totals, packed, i, 1);
  }
  return (figure) => table.subarray(figure * n, (figure + 1) * n).filter((value) => !Number.isNaN(value));
}
