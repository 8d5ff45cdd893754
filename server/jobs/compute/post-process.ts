import { createHash } from 'node:crypto';
import { writeFile } from 'node:fs/promises';
import { NODATA_CODE } from '../../../shared/constants/class-codes.ts';
import { filterMajority } from '../../analysis/post-processing/majority-filter.ts';
import { makeRecodeTable, recode } from '../../analysis/post-processing/recode.ts';
import { sieve } from '../../analysis/post-processing/sieve.ts';
import { assignPixelsOnce } from '../../analysis/sampling/assign-pixels-once.ts';
import { rasteriseMultiPolygon, rasterisePolygon } from '../../analysis/sampling/rasterise-polygon.ts';
import type { BandFile } from '../../raster/band-file.ts';
import { addCodeCounts, addOwnedCodes, createCodeCounts } from '../../raster/count-codes.ts';
import type { RasterGrid } from '../../raster/raster-grid.ts';
import { toRecord } from './finish-map.ts';
import type { ComputeTasks, MapStep, MapStepEffect } from './tasks.ts';

const STRIP_ROWS = 256;
const THOUSANDTHS = 1000;

/** Applies steps to a map in their order and counts what came of each. */
export async function postProcess(
  input: ComputeTasks['post-process']['input'],
  map: BandFile,
): Promise<ComputeTasks['post-process']['result']> {
  const { grid, steps, rawPath, rowAreaM2, heldOut, progress } = input;
  let codes = await readWhole(map, grid);
  const effects: MapStepEffect[] = [];
  for (const [i, step] of steps.entries()) {
    const say = (share: number) => Atomics.store(progress, 0, Math.floor((i + share) * THOUSANDTHS));
    const after = applyStep(codes, grid, rowAreaM2, step, say);
    effects.push({ ...measureChange(codes, after.codes, grid.width, rowAreaM2), ...after.patches });
    codes = after.codes;
    say(1);
  }
  await writeFile(rawPath, codes);
  const counts = createCodeCounts();
  addCodeCounts(counts, codes, grid.width, 0, rowAreaM2);
  const owned = assignPixelsOnce(
    heldOut.map(({ id, classIndex, polygon }) => ({
      id,
      classIndex,
      pixels: rasterisePolygon(polygon, grid.width, grid.height),
    })),
  );
  const ownedCounts = new Uint32Array(heldOut.length * 256);
  addOwnedCodes(ownedCounts, owned, codes, 0, 0);
  return {
    sha256: createHash('sha256').update(codes).digest('hex'),
    pixelsByCode: toRecord(counts.pixels, counts.pixels),
    areaM2ByCode: toRecord(counts.areaM2, counts.pixels),
    heldOutCodes: heldOut.map((_, owner) => {
      const ofOwner = ownedCounts.subarray(owner * 256, (owner + 1) * 256);
      return toRecord(ofOwner, ofOwner);
    }),
    nRepeated: owned.nRepeated,
    nConflicting: owned.nConflicting,
    effects,
  };
}

async function readWhole(map: BandFile, { width, height }: RasterGrid): Promise<Uint8Array> {
  const codes = new Uint8Array(width * height);
  for (let row = 0; row < height; row += STRIP_ROWS) {
    const rows = Math.min(STRIP_ROWS, height - row);
    codes.set(await map.readWindow(0, 0, row, width, rows, { keep: false }), row * width);
  }
  return codes;
}

type Patches = Pick<MapStepEffect, 'nMerged' | 'nLeft'>;
const NO_PATCHES: Patches = { nMerged: null, nLeft: null };

function applyStep(
  codes: Uint8Array,
  { width, height }: RasterGrid,
  rowAreaM2: Float64Array,
  step: MapStep,
  say: (share: number) => void,
): { codes: Uint8Array; patches: Patches } {
  switch (step.kind) {
    case 'majority': {
      const options = { ...step, nodata: NODATA_CODE, onRows: (rows: number) => say(rows / height) };
      return { codes: filterMajority(codes, width, height, options), patches: NO_PATCHES };
    }
    case 'sieve': {
      const { nMerged, nLeft, ...after } = sieve(codes, width, rowAreaM2, { ...step, nodata: NODATA_CODE });
      return { codes: after.codes, patches: { nMerged, nLeft } };
    }
    case 'recode': {
      const after = codes.slice();
      recode(after, makeRecodeTable(step.pairs));
      return { codes: after, patches: NO_PATCHES };
    }
    case 'paint':
      return { codes: paint(codes, width, height, step), patches: NO_PATCHES };
  }
}

function paint(codes: Uint8Array, width: number, height: number, step: MapStep & { kind: 'paint' }): Uint8Array {
  const inside = rasteriseMultiPolygon(step.polygons, width, height);
  const table = makeRecodeTable(
    step.from === null
      ? Array.from({ length: 256 }, (_, code) => [code, step.to] as const).filter(([code]) => code !== NODATA_CODE)
      : [[step.from, step.to]],
  );
  const after = codes.slice();
  if (step.where === 'inside') {
    recode(after, table, inside);
    return after;
  }
  recode(after, table);
  for (const pixel of inside) after[pixel] = codes[pixel] ?? NODATA_CODE;
  return after;
}

function measureChange(
  before: Uint8Array,
  after: Uint8Array,
  width: number,
  rowAreaM2: Float64Array,
): { changedPixels: number; changedM2: number } {
  let changedPixels = 0;
  let changedM2 = 0;
  for (let row = 0, i = 0; i < before.length; row++) {
    let inRow = 0;
    for (const end = i + width; i < end; i++) if (before[i] !== after[i]) inRow++;
    changedPixels += inRow;
    changedM2 += inRow * (rowAreaM2[row] ?? 0);
  }
  return { changedPixels, changedM2 };
}
