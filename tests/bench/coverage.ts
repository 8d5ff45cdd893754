/**
 * Draws designs again and again from the true map of the demo's island against a map of it made by seeded confusion
 * noise, and prints how often 95 % intervals hold the true values: design-based ones from reference points, and polygon
 * bootstrap against linearised and naive pixel intervals from sample polygons.
 * Run: npm run bench:coverage [-- --designs=2000 --polygon-designs=1000 --replicates=1000]
 * Fails when, with a least number of points in each class, the interval of overall accuracy covers less than 93 or more
 * than 97 % or one of the user's accuracies less than 93 %.
 */
import { allocateSample } from '../../server/analysis/accuracy/allocate-sample.ts';
import { CLASS, N_CLASSES } from '../../server/demo/island/class-codes.ts';
import { ISLAND_WIDTH } from '../../server/demo/island/island-grid.ts';
import { makeLandscape } from '../../server/demo/island/landscape.ts';
import { collectTilePolygons, simulateMap } from '../fixtures/simulated-map.ts';
import { printCoverage } from './coverage-tally.ts';
import { measureDesignCoverage } from './design-coverage.ts';
import { measurePolygonCoverage } from './polygon-coverage.ts';

function readOption(name: string, fallback: number): number {
  const given = process.argv.find((argument) => argument.startsWith(`--${name}=`));
  return given === undefined ? fallback : Number(given.split('=')[1]);
}
const nDesigns = readOption('designs', 2000);
const nPolygonDesigns = readOption('polygon-designs', 1000);
const nReplicates = readOption('replicates', 1000);

const truth = makeLandscape().trueClass.map((code) => code - 1);
const map = simulateMap(truth, ISLAND_WIDTH, N_CLASSES, 11);
const classes = [
  { name: 'improved pasture (common)', index: CLASS.improvedPasture - 1 },
  { name: 'built-up (rare)', index: CLASS.builtUp - 1 },
];
const planned = Array.from({ length: N_CLASSES }, (_, k) => ({
  areaShare: map.mapped.reduce((n, code) => n + Number(code === k), 0) / truth.length,
  expectedUsers: 0.85,
}));
const shareOf = (k: number): string => `${(100 * planned[k].areaShare).toFixed(2)} %`;
console.log(
  `Mapped shares: ${classes.map(({ name, index }) => `${name} ${shareOf(index)}`).join(', ')}; ${nDesigns} designs`,
);

const allocate = (n: number, atLeast: number): number[] => allocateSample(planned, n, { kind: 'minimum', atLeast });
const designs: [title: string, allocation: number[]][] = [
  ['1000 points, at least 75 in each map class', allocate(1000, 75)],
  ['640 points, at least 50 in each map class', allocate(640, 50)],
  ['640 points, in proportion (the rare class gets few)', allocate(640, 3)],
];
const results = designs.map(([title, allocation]) => {
  const rows = measureDesignCoverage(map, { nDesigns, strata: map.mapped, allocation, classes });
  printCoverage(`${title}: ${allocation.join(' ')}`, rows);
  return rows;
});

const spacingPixels = 15;
printCoverage(
  `${designs[1][0]}, at least ${spacingPixels} pixels apart`,
  measureDesignCoverage(map, { nDesigns, strata: map.mapped, allocation: designs[1][1], classes, spacingPixels }),
);

const quarters = truth.map((_, i) => 2 * Number(i >= truth.length / 2) + Number(i % ISLAND_WIDTH >= ISLAND_WIDTH / 2));
printCoverage(
  'Strata that are not the map classes: 250 points in each quarter of the island',
  measureDesignCoverage(map, { nDesigns, strata: quarters, allocation: [250, 250, 250, 250], classes }),
);

const population = collectTilePolygons(map);
for (const polygonsPerClass of [4, 8, 25]) {
  const start = performance.now();
  const rows = measurePolygonCoverage(population, {
    ...{ nDesigns: nPolygonDesigns, nReplicates, polygonsPerClass, classes, seed: 3 },
  });
  printCoverage(`${polygonsPerClass} sample polygons in each class, ${nPolygonDesigns} draws`, rows);
  console.log(`  ${((performance.now() - start) / 1000).toFixed(1)} s`);
}

// A score interval may cover more than it says where almost all units are right; covering less is what must not be.
const mustCover = results
  .slice(0, 2)
  .flatMap((rows) =>
    rows.filter(({ figure, method }) => /^(overall|user's)/.test(figure) && method.startsWith('Wilson')),
  );
const missed = mustCover.filter(({ figure, coverage }) => coverage < 0.93 || (figure === 'overall' && coverage > 0.97));
for (const { figure, coverage } of missed) console.error(`${figure}: ${(100 * coverage).toFixed(1)} %, not 93–97 %`);
if (missed.length > 0) process.exitCode = 1;
