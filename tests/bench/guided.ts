/**
 * Rounds of guided sampling against random sampling: how many samples reach the overall accuracy of 1000 random ones, on
 * the open satellite data set (UCI Statlog Satellite, CC BY 4.0) and on the true map of the demo's island. A sample here is one
 * pixel with its true class. Guided: 100 random ones first, then rounds of 50 chosen by `choosePlaces` from the votes of a
 * forest of all samples so far.
 * Run: npm run bench:guided [-- --seeds=10]
 * Fails when 500 guided samples do not reach what 1000 random ones do, in the mean over the seeds.
 */
import { trainModel, type TrainingSet } from '../../server/analysis/classifiers/classifier.ts';
import {
  defaultRandomForestParams,
  randomForest,
  readRandomForestPart,
} from '../../server/analysis/classifiers/random-forest.ts';
import { choosePlaces, type CandidatePlace } from '../../server/analysis/sampling/choose-places.ts';
import { createRng } from '../../server/analysis/sampling/rng.ts';
import { generateIsland } from '../../server/demo/island/generate-island.ts';
import { loadSatellite } from '../fixtures/satellite.ts';
import { readOption } from './reference-run.ts';

const FIRST = 100;
const ROUND = 50;
const GUIDED = [300, 400, 500];
const RANDOM = [300, 500, 1000, 2000];
const nSeeds = readOption('seeds', 10);

/** Where samples may be drawn, and what the map is judged by. */
interface Ground {
  name: string;
  pool: TrainingSet;
  test: TrainingSet;
  /** Place of each row of the pool in its scene; null where rows have no place. */
  placeOf: ((row: number) => { row: number; column: number }) | null;
  spacingPixels: number;
}

function pickRows(set: TrainingSet, rows: ArrayLike<number>): TrainingSet {
  const { nFeatures } = set;
  const features = new Float32Array(rows.length * nFeatures);
  const labels = new Uint8Array(rows.length);
  for (let i = 0; i < rows.length; i++) {
    features.set(set.features.subarray(rows[i] * nFeatures, (rows[i] + 1) * nFeatures), i * nFeatures);
    labels[i] = set.labels[rows[i]];
  }
  return { ...set, features, labels, nRows: rows.length };
}

function trainOn(ground: Ground, rows: number[], seed: number) {
  return trainModel(randomForest, pickRows(ground.pool, rows), defaultRandomForestParams, seed);
}

function measureAccuracy(ground: Ground, rows: number[], seed: number): number {
  const { model } = trainOn(ground, rows, seed);
  const { test } = ground;
  const classIndex = new Uint8Array(test.nRows);
  model.predictBlock(test.features, test.nRows, classIndex);
  return classIndex.reduce((n, c, i) => n + Number(c === test.labels[i]), 0) / test.nRows;
}

/** Rows of the pool not sampled yet, as a forest of the samples so far sees them. */
function listCandidates(ground: Ground, sampled: number[], seed: number): { rows: number[]; places: CandidatePlace[] } {
  const { pool, placeOf } = ground;
  const { nFeatures, nClasses, nRows } = pool;
  const votes = new Uint16Array(nRows * nClasses);
  const { parts } = trainOn(ground, sampled, seed);
  for (const part of parts) {
    const { tree } = readRandomForestPart(part);
    for (let row = 0; row < nRows; row++) {
      let node = 0;
      while (tree.feature[node] >= 0) {
        const goesLeft = pool.features[row * nFeatures + tree.feature[node]] <= tree.threshold[node];
        node = tree.left[node] + (goesLeft ? 0 : 1);
      }
      votes[row * nClasses + tree.leafClass[node]]++;
    }
  }
  const isSampled = new Set(sampled);
  const rows: number[] = [];
  const places: CandidatePlace[] = [];
  for (let row = 0; row < nRows; row++) {
    if (isSampled.has(row)) continue;
    const own = votes.subarray(row * nClasses, (row + 1) * nClasses);
    const order = Array.from(own, (_, c) => c).sort((a, b) => own[b] - own[a]);
    const [leading, second] = order;
    rows.push(row);
    places.push({
      ...(placeOf?.(row) ?? { row: 0, column: 0 }),
      ...{ leading, second, margin: (own[leading] - own[second]) / parts.length },
    });
  }
  return { rows, places };
}

function sampleGuided(ground: Ground, seed: number, total: number): number[] {
  const sampled = [...drawOrder(ground, seed).subarray(0, FIRST)];
  while (sampled.length < total) {
    const { rows, places } = listCandidates(ground, sampled, seed);
    const chosen = choosePlaces(places, {
      count: Math.min(ROUND, total - sampled.length),
      spacingPixels: ground.placeOf ? ground.spacingPixels : 0,
      taken: ground.placeOf ? sampled.map(ground.placeOf) : [],
      seed: seed * 1000 + sampled.length,
    });
    sampled.push(...chosen.map((i) => rows[i]));
  }
  return sampled;
}

function drawOrder({ pool }: Ground, seed: number): Uint32Array {
  return createRng(seed).shuffle(Uint32Array.from({ length: pool.nRows }, (_, i) => i));
}

function satelliteGround(): Ground {
  const { train, test } = loadSatellite();
  return { name: 'open satellite data, 36 bands, 6 classes', pool: train, test, placeOf: null, spacingPixels: 0 };
}

/** Every fourth pixel each way may be sampled; 20,000 random pixels judge the map. */
function islandGround(): Ground {
  const island = generateIsland();
  const bands = island.scenes[1].bands.filter(({ role }) => role !== 'thermal').map(({ dn }) => dn);
  const { width, height } = island;
  const toSet = (pixels: number[]): TrainingSet => ({
    features: Float32Array.from(pixels.flatMap((pixel) => bands.map((dn) => dn[pixel]))),
    labels: Uint8Array.from(pixels, (pixel) => island.trueClass[pixel] - 1),
    ...{ nRows: pixels.length, nFeatures: bands.length, nClasses: 10 },
  });
  const pool: number[] = [];
  for (let y = 2; y < height; y += 4) for (let x = 2; x < width; x += 4) pool.push(y * width + x);
  const rng = createRng(77);
  const test = Array.from({ length: 20_000 }, () => rng.nextBelow(width * height));
  return {
    ...{ name: 'true map of the demo, 6 bands, 10 classes', pool: toSet(pool), test: toSet(test), spacingPixels: 12 },
    placeOf: (row) => ({ row: Math.floor(pool[row] / width), column: pool[row] % width }),
  };
}

const seeds = Array.from({ length: nSeeds }, (_, i) => i + 1);
const mean = (values: number[]) => values.reduce((sum, value) => sum + value, 0) / values.length;
let hasFailed = false;
for (const ground of [satelliteGround(), islandGround()]) {
  console.log(`${ground.name}; overall accuracy, mean of ${nSeeds} seeds`);
  const random = new Map(
    RANDOM.map((n) => [
      n,
      mean(seeds.map((seed) => measureAccuracy(ground, [...drawOrder(ground, seed).subarray(0, n)], seed))),
    ]),
  );
  for (const [n, accuracy] of random) console.log(`  ${n} random: ${accuracy.toFixed(4)}`);
  const wanted = random.get(1000)!;
  const sampled = seeds.map((seed) => sampleGuided(ground, seed, Math.max(...GUIDED)));
  for (const n of GUIDED) {
    const accuracy = mean(seeds.map((seed, i) => measureAccuracy(ground, sampled[i].slice(0, n), seed)));
    console.log(`  ${n} guided: ${accuracy.toFixed(4)}${accuracy >= wanted ? ', as good as 1000 random' : ''}`);
    if (n === 500 && accuracy < wanted) hasFailed = true;
  }
}
if (hasFailed) {
  console.error('500 guided samples do not reach what 1000 random ones do.');
  process.exitCode = 1;
}
