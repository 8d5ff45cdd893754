import {
  confusionMatrixFromRows,
  summariseConfusionMatrix,
  type ConfusionMatrix,
} from '../../server/analysis/accuracy/confusion-matrix.ts';
import { clusterRatioInterval, wilsonInterval, type Interval } from '../../server/analysis/accuracy/interval.ts';
import { computeKappa } from '../../server/analysis/accuracy/kappa.ts';
import { bootstrapPolygons } from '../../server/analysis/accuracy/polygon-bootstrap.ts';
import { createRng, type Rng } from '../../server/analysis/sampling/rng.ts';
import type { TilePolygon } from '../fixtures/simulated-map.ts';
import { createTally, type CoverageRow } from './coverage-tally.ts';

export interface PolygonCoverageOptions {
  nDesigns: number;
  nReplicates: number;
  polygonsPerClass: number;
  /** Classes whose figures are reported. */
  classes: { name: string; index: number }[];
  seed: number;
}

/**
 * Draws polygons of each class again and again, and counts how often intervals of the pixel figures hold the value they
 * estimate: the one of all polygons, classes weighing as in the sample.
 */
export function measurePolygonCoverage(
  population: readonly (readonly TilePolygon[])[],
  { nDesigns, nReplicates, polygonsPerClass, classes, seed }: PolygonCoverageOptions,
): CoverageRow[] {
  const nClasses = population.length;
  const target = expectedMatrix(population, polygonsPerClass);
  const truth = summariseConfusionMatrix(target);
  const tally = createTally();
  const rng = createRng(seed);
  for (let d = 0; d < nDesigns; d++) {
    const sample = population.flatMap((polygons) => drawSome(polygons, polygonsPerClass, rng));
    const matrix = matrixOf(sample, nClasses);
    const summary = summariseConfusionMatrix(matrix);
    const percentile = bootstrapPolygons(sample, nClasses, { seed: d, nReplicates, interval: 'percentile' });
    const bca = bootstrapPolygons(sample, nClasses, { seed: d, nReplicates });
    const together = bootstrapPolygons(sample, nClasses, { seed: d, nReplicates, resampling: 'all-together' });
    const add = (figure: string, wanted: number, method: string, got: Interval | null): void =>
      tally.add(figure, method, wanted, got);
    const addAll = (
      figure: string,
      wanted: number,
      ends: { percentile: Ends; bca: Ends; together: Ends },
      naive: Interval | null,
      linear: Interval | null,
    ): void => {
      add(figure, wanted, 'pixels as independent', naive);
      if (linear) add(figure, wanted, 'linearised, Student’s t', linear);
      add(figure, wanted, 'bootstrap within class, percentile', toInterval(ends.percentile));
      add(figure, wanted, 'bootstrap within class, BCa', toInterval(ends.bca));
      add(figure, wanted, 'bootstrap all together, BCa', toInterval(ends.together));
    };
    addAll(
      'overall',
      truth.overall!,
      { percentile: percentile.overall, bca: bca.overall, together: together.overall },
      wilsonInterval(summary.correct, summary.total),
      linearised(sample, 'all', 0),
    );
    const kappa = computeKappa(matrix)!;
    const half = 1.96 * Math.sqrt(kappa.variance);
    addAll(
      'kappa',
      computeKappa(target)!.kappa,
      { percentile: percentile.kappa, bca: bca.kappa, together: together.kappa },
      { low: kappa.kappa - half, high: kappa.kappa + half },
      null,
    );
    for (const { name, index } of classes) {
      const one = summary.perClass[index];
      for (const side of ['users', 'producers'] as const) {
        addAll(
          `${side} of ${name}`,
          truth.perClass[index][side]!,
          {
            percentile: percentile.perClass[index][side],
            bca: bca.perClass[index][side],
            together: together.perClass[index][side],
          },
          wilsonInterval(one.correct, side === 'users' ? one.mapped : one.reference),
          linearised(sample, side, index),
        );
      }
    }
  }
  return tally.rows();
}

type Ends = { low: number | null; high: number | null };

function toInterval({ low, high }: Ends): Interval | null {
  return low === null || high === null ? null : { low, high };
}

function drawSome<T>(items: readonly T[], n: number, rng: Rng): T[] {
  return Array.from({ length: n }, () => items[rng.nextBelow(items.length)]);
}

function matrixOf(polygons: readonly TilePolygon[], nClasses: number): ConfusionMatrix {
  const counts = Array.from({ length: nClasses }, () => new Array<number>(nClasses).fill(0));
  for (const { referenceClass, mappedCounts } of polygons) {
    mappedCounts.forEach((count, mapped) => (counts[mapped][referenceClass] += count));
  }
  return confusionMatrixFromRows(counts);
}

function expectedMatrix(population: readonly (readonly TilePolygon[])[], nPerClass: number): ConfusionMatrix {
  const rows = population.map(() => population.map(() => 0));
  population.forEach((polygons, reference) => {
    for (const { mappedCounts } of polygons) {
      mappedCounts.forEach((count, mapped) => (rows[mapped][reference] += (count * nPerClass) / polygons.length));
    }
  });
  return confusionMatrixFromRows(rows);
}

function linearised(sample: readonly TilePolygon[], side: 'all' | 'users' | 'producers', k: number): Interval | null {
  const isIn = (mapped: number, reference: number): boolean =>
    side === 'all' || (side === 'users' ? mapped : reference) === k;
  const hits = sample.map(({ referenceClass: r, mappedCounts }) => (isIn(r, r) ? mappedCounts[r] : 0));
  const sizes = sample.map(({ referenceClass: r, mappedCounts }) =>
    mappedCounts.reduce((sum, count, mapped) => sum + (isIn(mapped, r) ? count : 0), 0),
  );
  return clusterRatioInterval(hits, sizes);
}
