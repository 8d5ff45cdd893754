import { computeKappa } from '../../server/analysis/accuracy/kappa.ts';
import { confusionMatrixFromPairs, summariseConfusionMatrix } from '../../server/analysis/accuracy/confusion-matrix.ts';
import type { Estimate } from '../../server/analysis/accuracy/combined-ratio.ts';
import { intervalOfShare, normalInterval } from '../../server/analysis/accuracy/design-interval.ts';
import { countReferenceUnits, type ReferenceUnit } from '../../server/analysis/accuracy/reference-units.ts';
import { recoverIntervals } from '../../server/analysis/accuracy/recovered-interval.ts';
import { estimateStratified } from '../../server/analysis/accuracy/stratified-estimate.ts';
import type { DrawnPoint } from '../../server/analysis/sampling/draw-points.ts';
import { drawRanks } from '../../server/analysis/sampling/draw-ranks.ts';
import { keepSpacing } from '../../server/analysis/sampling/keep-spacing.ts';
import type { SimulatedMap } from '../fixtures/simulated-map.ts';
import { createTally, type CoverageRow } from './coverage-tally.ts';

export interface DesignCoverageOptions {
  nDesigns: number;
  /** Stratum of each pixel, 0..nStrata−1. */
  strata: Uint8Array;
  /** Points in each stratum. */
  allocation: readonly number[];
  classes: { name: string; index: number }[];
  spacingPixels?: number;
}

/** Draws stratified designs from a map again and again, and counts how often their intervals hold the true values. */
export function measureDesignCoverage(
  map: SimulatedMap,
  { nDesigns, strata, allocation, classes, spacingPixels = 0 }: DesignCoverageOptions,
): CoverageRow[] {
  const { nClasses, truth, mapped, width } = map;
  const pixels = allocation.map((_, h) => indicesOf(strata, h));
  const sizes = pixels.map(({ length }) => ({ size: length }));
  const population = confusionMatrixFromPairs(mapped, truth, nClasses);
  const wanted = summariseConfusionMatrix(population);
  const wantedKappa = computeKappa(population)!.kappa;
  const tally = createTally();
  const share = (figure: string, value: number, estimate: Estimate | null): void => {
    tally.add(figure, 'estimate ± 1.96 S', value, intervalOfShare(estimate, 'normal'));
    tally.add(figure, 'Wilson, effective units', value, intervalOfShare(estimate, 'wilson'));
  };
  for (let d = 0; d < nDesigns; d++) {
    const points = allocation.flatMap((n, stratum) => {
      // Spacing needs spare candidates to choose from.
      const nCandidates = Math.min(pixels[stratum].length, spacingPixels > 0 ? 3 * n + 20 : n);
      return Array.from(drawRanks(pixels[stratum].length, nCandidates, d, `stratum ${stratum}`), (rank, order) =>
        pointAt(pixels[stratum][rank], width, stratum, order),
      );
    });
    const { kept } = keepSpacing(points, allocation, spacingPixels);
    const units = kept.map(({ stratum, row, column }): ReferenceUnit => {
      const at = row * width + column;
      return { stratum, mapped: mapped[at], reference: truth[at] };
    });
    const counted = countReferenceUnits(units, sizes, nClasses);
    const estimate = estimateStratified(counted);
    const recovered = recoverIntervals(counted);
    if (!estimate || !recovered) throw new Error(`Design ${d} left a stratum without a point.`);
    share('overall', wanted.overall!, estimate.overall);
    tally.add('kappa', 'estimate ± 1.96 S', wantedKappa, normalInterval(estimate.kappa));
    for (const { name, index } of classes) {
      const one = wanted.perClass[index];
      share(`user's of ${name}`, one.users!, estimate.perClass[index].users);
      share(`producer's of ${name}`, one.producers!, estimate.perClass[index].producers);
      tally.add(`producer's of ${name}`, 'recovered from strata', one.producers!, recovered[index].producers);
      share(`F1 of ${name}`, one.f1!, estimate.perClass[index].f1);
      share(`area share of ${name}`, one.reference / wanted.total, estimate.perClass[index].areaShare);
      tally.add(
        `area share of ${name}`,
        'recovered from strata',
        one.reference / wanted.total,
        recovered[index].areaShare,
      );
    }
  }
  return tally.rows();
}

function pointAt(pixel: number, width: number, stratum: number, order: number): DrawnPoint {
  return { stratum, order, row: Math.floor(pixel / width), column: pixel % width };
}

function indicesOf(strata: Uint8Array, code: number): Uint32Array {
  let n = 0;
  for (const value of strata) if (value === code) n++;
  const indices = new Uint32Array(n);
  let next = 0;
  strata.forEach((value, i) => {
    if (value === code) indices[next++] = i;
  });
  return indices;
}
