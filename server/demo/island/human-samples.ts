import { CLASS, N_CLASSES } from './class-codes.ts';
import { distanceTo } from './distance-transform.ts';
import type { Island } from './island-types.ts';
import type { Point } from './sample-geometry.ts';
import { pixelsInside, ringsOverlap } from './sample-geometry.ts';
import { writeRemark } from './sample-remarks.ts';
import type { Rng } from './seeded-rng.ts';
import { seededRng } from './seeded-rng.ts';

/** A training sample as a person drew it. */
export interface HumanSample {
  labeller: 'a' | 'b';
  classCode: number;
  /** Closed, simple, counter-clockwise ring of eastings and northings, metres, EPSG:32628. */
  ring: [x: number, y: number][];
  confidence: 'low' | 'medium' | 'high';
  note: string;
}

/** Samples drawn per class, by class code; 250 in all. */
const N_SAMPLES = [0, 23, 20, 19, 27, 23, 27, 36, 35, 18, 22] as const;
/** How far inside its class a sample's starting point lies, pixels, by class code. */
const INSIDE_PX = [0, 1.9, 1.4, 1.4, 1.9, 1.9, 1.9, 1.4, 1.4, 1.4, 1.4] as const;
/** Samples, counted within a class, that are given to the class they are easily taken for. */
const MISTAKES: Record<number, { takenFor: number; at: number[] }> = {
  [CLASS.improvedPasture]: { takenFor: CLASS.arable, at: [7, 23] },
  [CLASS.arable]: { takenFor: CLASS.improvedPasture, at: [11, 29] },
  [CLASS.heathAndMoor]: { takenFor: CLASS.bareRock, at: [9] },
  [CLASS.bareRock]: { takenFor: CLASS.heathAndMoor, at: [13] },
  [CLASS.broadleafWoodland]: { takenFor: CLASS.coniferPlantation, at: [16] },
  [CLASS.coniferPlantation]: { takenFor: CLASS.broadleafWoodland, at: [5] },
};
const FEWEST_PIXELS = 12;
const MOST_PIXELS = 122;

interface Sheet {
  width: number;
  height: number;
  trueClass: Uint8Array;
  /** Late-summer bands a labeller sees field edges in. */
  nir: Uint16Array;
  red: Uint16Array;
  spring: Uint16Array;
  /** Distance to the nearest pixel of another class, pixels. */
  insidePx: Float32Array;
}

function bandOf(island: Island, scene: 0 | 1, role: 'nir' | 'red'): Uint16Array {
  const band = island.scenes[scene].bands.find((b) => b.role === role);
  if (!band) throw new Error(`The scene has no ${role} band.`);
  return band.dn;
}

function prepareSheet(island: Island): Sheet {
  const { width, height, trueClass } = island;
  const isEdge = new Uint8Array(trueClass.length);
  for (let i = 0; i < trueClass.length; i++) {
    const x = i % width;
    const c = trueClass[i];
    const differs =
      (x > 0 && trueClass[i - 1] !== c) ||
      (x < width - 1 && trueClass[i + 1] !== c) ||
      (i >= width && trueClass[i - width] !== c) ||
      (i < trueClass.length - width && trueClass[i + width] !== c);
    if (differs) isEdge[i] = 1;
  }
  return {
    width,
    height,
    trueClass,
    nir: bandOf(island, 1, 'nir'),
    red: bandOf(island, 1, 'red'),
    spring: bandOf(island, 0, 'red'),
    insidePx: distanceTo(isEdge, width, height),
  };
}

/** How far one can look from a starting point before the ground visibly changes. */
function sightPx(sheet: Sheet, start: number, direction: number, reachPx: number): number {
  const { width, height, trueClass, nir, red } = sheet;
  const classCode = trueClass[start];
  const followsFields = classCode === CLASS.arable || classCode === CLASS.improvedPasture;
  const x0 = (start % width) + 0.5;
  const y0 = Math.floor(start / width) + 0.5;
  for (let r = 0.5; r < reachPx; r += 0.25) {
    const x = Math.floor(x0 + r * Math.cos(direction));
    const y = Math.floor(y0 + r * Math.sin(direction));
    if (x < 2 || y < 2 || x > width - 3 || y > height - 3) return r;
    const i = y * width + x;
    if (trueClass[i] !== classCode) return r;
    // 0.05 and 0.03 of reflectance: another crop, or a hedge.
    if (followsFields && (Math.abs(nir[i] - nir[start]) > 2000 || Math.abs(red[i] - red[start]) > 1200)) return r;
  }
  return reachPx;
}

/** Clicks round what can be seen from a starting point, a little off, as a hand does. */
function clickOutline(sheet: Sheet, start: number, rng: Rng): Point[] {
  const target = FEWEST_PIXELS * (MOST_PIXELS / FEWEST_PIXELS) ** (0.12 + 0.83 * rng.next());
  const reach = Math.sqrt(target / Math.PI) * rng.range(1.1, 1.5);
  const nVertices = 6 + rng.int(6);
  const turn = rng.range(0, Math.PI * 2);
  const radii: number[] = [];
  const directions: number[] = [];
  for (let k = 0; k < nVertices; k++) {
    // Falling angles in rows-down pixels run counter-clockwise on a north-up map.
    const direction = turn - ((k + rng.range(-0.28, 0.28)) * Math.PI * 2) / nVertices;
    directions.push(direction);
    radii.push(Math.max(0.9, sightPx(sheet, start, direction, reach) - 0.35 + 0.55 * rng.normal()));
  }
  const x0 = (start % sheet.width) + 0.5;
  const y0 = Math.floor(start / sheet.width) + 0.5;
  return directions.map((d, k): Point => [x0 + radii[k] * Math.cos(d), y0 + radii[k] * Math.sin(d)]);
}

/** Of a few likely starting points, the one furthest from the class's samples so far. */
function chooseStart(sheet: Sheet, pool: Int32Array, taken: number[], rng: Rng): number {
  let best = -1;
  let bestAway = -1;
  for (let k = 0; k < 9; k++) {
    const candidate = pool[rng.int(pool.length)];
    let away = 300 * rng.next() + 1;
    for (const other of taken) {
      const dx = (candidate % sheet.width) - (other % sheet.width);
      const dy = Math.floor(candidate / sheet.width) - Math.floor(other / sheet.width);
      away = Math.min(away, Math.hypot(dx, dy));
    }
    if (away > bestAway) {
      bestAway = away;
      best = candidate;
    }
  }
  return best;
}

/** Labellers share the island out in blocks, like squares of a draughtboard. */
function labellerAt(sheet: Sheet, pixel: number): 'a' | 'b' {
  const column = Math.floor(((pixel % sheet.width) / sheet.width) * 4);
  const row = Math.floor((Math.floor(pixel / sheet.width) / sheet.height) * 3);
  return (column + row) % 2 === 0 ? 'a' : 'b';
}

/** Share of `pixels` that are truly of one class. */
function purityOf(sheet: Sheet, pixels: number[], classCode: number): number {
  return pixels.filter((p) => sheet.trueClass[p] === classCode).length / pixels.length;
}

/**
 * Draws about 250 training samples over the island the way two people would: outlines a little off
 * the edges, some mixed pixels, about one in thirty given to a class it is easily taken for.
 * No two samples overlap.
 * @throws when a class has too little ground for its samples.
 */
export function drawHumanSamples(island: Island): HumanSample[] {
  const sheet = prepareSheet(island);
  const rng = seededRng(401);
  const rings: Point[][] = [];
  const samples: HumanSample[] = [];
  for (let classCode = 1; classCode <= N_CLASSES; classCode++) {
    const pool: number[] = [];
    for (let i = 0; i < sheet.trueClass.length; i++) {
      const farOut = classCode === CLASS.openWater && sheet.insidePx[i] > 130;
      if (sheet.trueClass[i] === classCode && sheet.insidePx[i] >= INSIDE_PX[classCode] && !farOut) pool.push(i);
    }
    const starts = Int32Array.from(pool);
    const taken: number[] = [];
    for (let tries = 0; taken.length < N_SAMPLES[classCode]; tries++) {
      if (tries > 5000 || starts.length === 0) throw new Error(`Too little ground of class ${classCode} to sample.`);
      const start = chooseStart(sheet, starts, taken, rng);
      const ring = clickOutline(sheet, start, rng);
      const pixels = pixelsInside(ring, sheet.width, sheet.height);
      if (pixels.length < FEWEST_PIXELS || pixels.length > MOST_PIXELS) continue;
      if (pixels.some((p) => sheet.spring[p] === 0)) continue;
      if (purityOf(sheet, pixels, classCode) < 0.72 || rings.some((other) => ringsOverlap(ring, other))) continue;
      const mistake = MISTAKES[classCode]?.at.includes(taken.length) ?? false;
      const given = mistake ? MISTAKES[classCode].takenFor : classCode;
      const points = ring.map(([x, y]): [number, number] => [
        Math.round((island.originX + x * island.pixelMeters) * 10) / 10,
        Math.round((island.originY - y * island.pixelMeters) * 10) / 10,
      ]);
      rings.push(ring);
      taken.push(start);
      samples.push({
        labeller: labellerAt(sheet, start),
        classCode: given,
        ring: [...points, points[0]],
        ...writeRemark(given, mistake, rng),
      });
    }
  }
  return samples;
}
