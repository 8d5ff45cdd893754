import { rm } from 'node:fs/promises';
import { join } from 'node:path';
import { chooseMaskedType, writeMaskedRaw } from './apply-mask.ts';
import type { BandDtype } from './band-dtype.ts';
import { listCreationOptions } from './band-file-format.ts';
import { BandStore } from './band-store.ts';
import { isFaultOfFile, runGdal } from './gdal-process.ts';
import type { SourceBand, SourceInfo } from './inspect-source.ts';
import { writeGeoTiffFromRaw } from './raw-to-geotiff.ts';
import { SourceRefusal } from './source-refusal.ts';

/** One band to be taken out of an inspected source. */
export interface BandExtraction {
  sourcePath: string;
  info: SourceInfo;
  band: SourceBand;
  /** Private folder for passing files. */
  workDir: string;
  outPath: string;
  timeoutMs: number;
  /** Limit on the program that decodes; a JPEG 2000 image without tiles is decoded whole, at four bytes a sample. */
  memoryBytes: number;
  signal: AbortSignal;
  onProgress: (fraction: number) => void;
}

/**
 * Writes a band as a tiled GeoTIFF without overviews, with the source's mask turned into nodata, and tells its sample type,
 * which is wider than the source's where a mask leaves no value free.
 * @throws {SourceRefusal} `unreadable` when pixels can't be decoded.
 * @throws {GdalProcessError}
 */
export async function extractBand(extraction: BandExtraction): Promise<BandDtype> {
  const { info, band, outPath, onProgress } = extraction;
  if (info.maskKind !== 'none') return extractMaskedBand(extraction);
  await translateBand(extraction, String(band.index), outPath, band.dtype, onProgress);
  return band.dtype;
}

async function translateBand(
  { sourcePath, info, band, timeoutMs, memoryBytes, signal }: BandExtraction,
  bandArgument: string,
  outPath: string,
  dtype: BandDtype,
  onProgress: (fraction: number) => void,
): Promise<void> {
  const isImagery = bandArgument === String(band.index);
  const nodata = isImagery && band.nodata !== null ? (Number.isNaN(band.nodata) ? 'nan' : String(band.nodata)) : 'none';
  const run = runGdal(
    'gdal_translate',
    [
      ...['-of', 'GTiff', '-b', bandArgument, '-mask', 'none', '-a_nodata', nodata, '-norat'],
      // A palette's colours would change what an average of its codes means.
      ...['-colorinterp', 'gray', '-a_srs', info.crs.wkt],
      ...listCreationOptions(dtype),
      ...[sourcePath, outPath],
    ],
    { origin: 'upload', timeoutMs, memoryBytes, signal, onProgress },
  );
  try {
    await run;
  } catch (error) {
    if (!isFaultOfFile(error)) throw error;
    throw new SourceRefusal(
      'unreadable',
      `pixels of band ${band.index} that can't be decoded`,
      'a file that can be read to its end',
      'It may have been cut off or damaged on the way; check it and upload it again.',
    );
  }
}

async function extractMaskedBand(extraction: BandExtraction): Promise<BandDtype> {
  const { info, band, workDir, outPath, signal, onProgress } = extraction;
  const imagePath = join(workDir, `image-${band.index}.tif`);
  const maskPath = join(workDir, `mask-${band.index}.tif`);
  const rawPath = join(workDir, `masked-${band.index}.raw`);
  const store = new BandStore({ cacheMb: 0, decode: 'async' });
  try {
    await translateBand(extraction, String(band.index), imagePath, band.dtype, (f) => onProgress(f * 0.4));
    await translateBand(extraction, `mask,${band.index}`, maskPath, 'uint8', (f) => onProgress(0.4 + f * 0.2));
    const image = await store.open(imagePath);
    const mask = await store.open(maskPath);
    const masked = await chooseMaskedType(image, mask, signal);
    await writeMaskedRaw(image, mask, masked, rawPath, signal);
    await writeGeoTiffFromRaw({ rawPath, ...masked, grid: image.grid, wkt: info.crs.wkt }, outPath, {
      overviews: 'none',
      signal,
      onProgress: (fraction) => onProgress(0.7 + fraction * 0.3),
    });
    return masked.dtype;
  } finally {
    await store.close();
    await Promise.all([imagePath, maskPath, rawPath].map((path) => rm(path, { force: true })));
  }
}
