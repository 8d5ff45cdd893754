import { createWriteStream } from 'node:fs';
import { finished } from 'node:stream/promises';
import { once } from 'node:events';
import { createBandArray, getIntegerRange, isRepresentable, type BandArray, type BandDtype } from './band-dtype.ts';
import type { BandFile } from './band-file.ts';
import { readSceneStrips } from './scene-reader.ts';

/** A sample type and a nodata value that no valid pixel of the band has. */
export interface MaskedType {
  dtype: BandDtype;
  nodata: number;
}

const wider: Partial<Record<BandDtype, BandDtype>> = {
  int8: 'int16',
  uint8: 'uint16',
  int16: 'int32',
  uint16: 'uint32',
};
const maxRareValues = 64;

/**
 * Chooses the value that will stand for "masked out" in a band: its declared nodata value; else NaN for floating point;
 * else 0, or the largest or smallest value of the type, or the first unused one; where an 8- or 16-bit band uses
 * every value, the next wider type and its largest value.
 * @throws {RangeError} when a 32-bit integer band uses every value that is tried.
 */
export async function chooseMaskedType(band: BandFile, mask: BandFile, signal?: AbortSignal): Promise<MaskedType> {
  const { dtype, nodata } = band;
  if (nodata !== null) return { dtype, nodata };
  const range = getIntegerRange(dtype);
  if (range === null) return { dtype, nodata: NaN };
  const [low, high] = range;
  const isSmall = high - low < 65536;
  const candidates = isSmall
    ? [0, high, low, ...Array.from({ length: high - low + 1 }, (_, i) => low + i)]
    : [0, high, low, ...Array.from({ length: maxRareValues }, (_, i) => high - 1 - i)];
  const isUsed = new Set<number>();
  const open = new Set(candidates);
  for await (const { bands } of readSceneStrips(band.grid, [band, mask], { signal })) {
    const [values, maskValues] = bands;
    for (let i = 0; i < values.length; i++) {
      if (maskValues[i] !== 0 && open.has(values[i])) isUsed.add(values[i]);
    }
  }
  const free = candidates.find((candidate) => !isUsed.has(candidate));
  if (free !== undefined) return { dtype, nodata: free };
  const next = wider[dtype];
  if (next === undefined) throw new RangeError(`no ${dtype} value is free to stand for masked-out pixels`);
  return { dtype: next, nodata: getIntegerRange(next)![1] };
}

/**
 * Writes a band as raw samples with every pixel that the mask has as 0 set to the nodata value, strip by strip.
 * @throws {RangeError} when the nodata value doesn't fit the type.
 */
export async function writeMaskedRaw(
  band: BandFile,
  mask: BandFile,
  { dtype, nodata }: MaskedType,
  rawPath: string,
  signal?: AbortSignal,
): Promise<void> {
  if (!isRepresentable(dtype, nodata)) throw new RangeError(`nodata ${nodata} doesn't fit ${dtype}`);
  const out = createWriteStream(rawPath);
  // Waited for below; without a listener from the start a failed open would go unheard.
  const written = finished(out);
  written.catch(() => undefined);
  try {
    for await (const { bands } of readSceneStrips(band.grid, [band, mask], { signal })) {
      const [values, maskValues] = bands;
      const strip = band.dtype === dtype ? values : castStrip(values, dtype);
      for (let i = 0; i < strip.length; i++) if (maskValues[i] === 0) strip[i] = nodata;
      const bytes = new Uint8Array(strip.buffer, strip.byteOffset, strip.byteLength);
      if (!out.write(bytes)) await Promise.race([once(out, 'drain'), written]);
    }
    out.end();
    await written;
  } catch (error) {
    out.destroy();
    throw error;
  }
}

function castStrip(values: BandArray, dtype: BandDtype): BandArray {
  const cast = createBandArray(dtype, values.length);
  cast.set(values);
  return cast;
}
