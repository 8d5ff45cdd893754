import { beforeAll, describe, expect, it } from 'vitest';
import type { CoverageRow } from '../bench/coverage-tally.ts';
import { measureDesignCoverage } from '../bench/design-coverage.ts';
import { measurePolygonCoverage } from '../bench/polygon-coverage.ts';
import { collectTilePolygons, makePatchyTruth, simulateMap, type SimulatedMap } from '../fixtures/simulated-map.ts';

// The short, seeded version of tests/bench/coverage.ts, on a small invented map. Bounds allow for the chance of a few
// hundred designs: the coverage of 600 has a standard error of .9 %.

const width = 300;
const classes = [
  { name: 'common', index: 0 },
  { name: 'rare', index: 4 },
];
let map: SimulatedMap;
const find = (rows: CoverageRow[], figure: string, method: string): CoverageRow =>
  rows.find((row) => row.figure === figure && row.method.startsWith(method))!;

beforeAll(() => {
  map = simulateMap(makePatchyTruth(width, 200, [0.45, 0.3, 0.15, 0.07, 0.03], 7), width, 5, 11);
});

describe('95 % intervals of 600 stratified designs hold the true value 93–97 % of the time', () => {
  let rows: CoverageRow[];
  beforeAll(() => {
    rows = measureDesignCoverage(map, {
      nDesigns: 600,
      strata: map.mapped,
      allocation: [150, 100, 60, 60, 60],
      classes,
    });
  });

  it.each(['overall', "user's of common", "user's of rare"])('for %s', (figure) => {
    const { coverage } = find(rows, figure, 'Wilson');
    expect(coverage).toBeGreaterThan(0.93);
    expect(coverage).toBeLessThan(0.975);
  });

  it("for producer's accuracy and area share of the rare class by the recovered interval at least so often", () => {
    expect(find(rows, "producer's of rare", 'recovered').coverage).toBeGreaterThan(0.93);
    expect(find(rows, 'area share of rare', 'recovered').coverage).toBeGreaterThan(0.93);
  });
});

describe('95 % intervals of pixel figures from 15 polygons a class, 200 draws', () => {
  let rows: CoverageRow[];
  beforeAll(() => {
    const population = collectTilePolygons(map);
    expect(Math.min(...population.map(({ length }) => length))).toBeGreaterThan(15);
    rows = measurePolygonCoverage(population, {
      ...{ nDesigns: 200, nReplicates: 300, polygonsPerClass: 15, classes, seed: 3 },
    });
  });

  it.each(['overall', 'kappa'])('hold the true %s when polygons are drawn again', (figure) => {
    expect(find(rows, figure, 'bootstrap within class, BCa').coverage).toBeGreaterThan(0.9);
  });

  it.each(['overall', 'kappa', 'producers of common'])(
    'miss the true %s far too often when pixels are taken as independent (control)',
    (figure) => {
      expect(find(rows, figure, 'pixels as independent').coverage).toBeLessThan(0.75);
    },
  );
});
