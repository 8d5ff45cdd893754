import { createHash } from 'node:crypto';
import { open, readFile } from 'node:fs/promises';
import { inflateRawSync } from 'node:zlib';
import { assignPixelsOnce } from '../../analysis/sampling/assign-pixels-once.ts';
import { rasterisePolygon } from '../../analysis/sampling/rasterise-polygon.ts';
import { addCodeCounts, addOwnedCodes, createCodeCounts } from '../../raster/count-codes.ts';
import type { ComputeTasks, FinishedMap } from './tasks.ts';

/** Joins deflated strips into one raw class raster and counts its codes, over all and in the held-out polygons. */
export async function finishMap(input: ComputeTasks['finish-map']['input']): Promise<FinishedMap> {
  const { grid, stripPaths, rawPath, rowAreaM2, heldOut, progress } = input;
  const owned = assignPixelsOnce(
    heldOut.map(({ id, classIndex, polygon }) => ({
      id,
      classIndex,
      pixels: rasterisePolygon(polygon, grid.width, grid.height),
    })),
  );
  const ownedCounts = new Uint32Array(heldOut.length * 256);
  const counts = createCodeCounts();
  const hash = createHash('sha256');
  const raw = await open(rawPath, 'w');
  try {
    let offset = 0;
    let nextOwned = 0;
    for (const [i, path] of stripPaths.entries()) {
      const codes = inflateRawSync(await readFile(path));
      hash.update(codes);
      await raw.writeFile(codes);
      addCodeCounts(counts, codes, grid.width, offset / grid.width, rowAreaM2);
      nextOwned = addOwnedCodes(ownedCounts, owned, codes, offset, nextOwned);
      offset += codes.length;
      Atomics.store(progress, 0, i + 1);
    }
    if (offset !== grid.width * grid.height) {
      throw new RangeError(`The strips hold ${offset} pixels of ${grid.width} × ${grid.height}.`);
    }
  } finally {
    await raw.close();
  }
  return {
    sha256: hash.digest('hex'),
    pixelsByCode: toRecord(counts.pixels, counts.pixels),
    areaM2ByCode: toRecord(counts.areaM2, counts.pixels),
    heldOutCodes: heldOut.map((_, owner) => {
      const codes = ownedCounts.subarray(owner * 256, (owner + 1) * 256);
      return toRecord(codes, codes);
    }),
    nRepeated: owned.nRepeated,
    nConflicting: owned.nConflicting,
  };
}

/** Values by code, of the codes that occur. */
export function toRecord(values: ArrayLike<number>, pixels: ArrayLike<number>): Record<string, number> {
  return Object.fromEntries(
    Array.from(values, (value, code) => [code, value] as const).filter(([code]) => pixels[code]),
  );
}
