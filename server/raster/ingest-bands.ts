import { createHash } from 'node:crypto';
import { createReadStream } from 'node:fs';
import { mkdir, rename, rm } from 'node:fs/promises';
import { join } from 'node:path';
import { pipeline } from 'node:stream/promises';
import { addOverviews } from './add-overviews.ts';
import { chooseMaskedType, writeMaskedRaw } from './apply-mask.ts';
import { chooseCompression, listCreationOptions } from './band-file-format.ts';
import { BandStore } from './band-store.ts';
import { computeBandStatistics, type BandStatistics } from './band-statistics.ts';
import type { BandDtype } from './band-dtype.ts';
import { isFaultOfFile, requireLocalPath, runGdal } from './gdal-process.ts';
import type { SourceBand, SourceInfo } from './inspect-source.ts';
import { writeGeoTiffFromRaw } from './raw-to-geotiff.ts';
import { SourceRefusal } from './source-refusal.ts';

/** A band as it was written to the scene's folder. */
export interface IngestedBand {
  /** 1-based band of the source. */
  sourceIndex: number;
  /** `band-01.tif`, … in the folder given. */
  fileName: string;
  dtype: BandDtype;
  /** Value of pixels without data; a masked source gets one that no valid pixel has. */
  nodata: number | null;
  description: string;
  scale: number;
  offset: number;
  /** Lowercase hexadecimal SHA-256 of the file. */
  sha256: string;
  /** Null when no pixel of the band has data. */
  statistics: BandStatistics | null;
}

export interface IngestOptions {
  /** Source bands wanted, 1-based; all imagery bands where not given. */
  bands?: readonly number[];
  /** Number of the first file written, for a scene made of several sources. */
  firstFileNumber?: number;
  signal?: AbortSignal;
  /** Called with a rising fraction 0–1. */
  onProgress?: (fraction: number) => void;
  /** Limit for each GDAL step on a band. */
  timeoutMs?: number;
}

const stepShares = { write: 0.5, overviews: 0.2, statistics: 0.3 };

/**
 * Writes each band of an inspected source as a tiled GeoTIFF with overviews and measures it.
 * An alpha band or a mask over the whole file becomes nodata. On any failure the files written are removed.
 * @throws {SourceRefusal} `all-nodata` when no band has a single pixel with data; `unreadable` when pixels can't be decoded.
 * @throws {RangeError} when a wanted band isn't in the source.
 * @throws {GdalProcessError} when GDAL fails, or a limit or the signal stops it.
 */
export async function ingestBands(
  sourcePath: string,
  info: SourceInfo,
  outDir: string,
  options: IngestOptions = {},
): Promise<IngestedBand[]> {
  requireLocalPath(sourcePath);
  requireLocalPath(outDir);
  const wanted = pickBands(info, options.bands);
  await mkdir(outDir, { recursive: true });
  const workDir = join(outDir, 'ingest-work');
  await mkdir(workDir, { recursive: true });
  const store = new BandStore({ cacheMb: 16, decode: 'async' });
  const ingested: IngestedBand[] = [];
  let isDone = false;
  try {
    for (const [position, band] of wanted.entries()) {
      const number = (options.firstFileNumber ?? 1) + position;
      const fileName = `band-${String(number).padStart(2, '0')}.tif`;
      const onProgress = (fraction: number): void => options.onProgress?.((position + fraction) / wanted.length);
      ingested.push(
        await ingestBand({ sourcePath, info, band, outDir, workDir, fileName, store, options, onProgress }),
      );
    }
    if (ingested.every((band) => band.statistics === null)) throw refuseAllNodata(wanted);
    isDone = true;
    return ingested;
  } finally {
    await store.close();
    await rm(workDir, { recursive: true, force: true });
    if (!isDone) await Promise.all(ingested.map(({ fileName }) => rm(join(outDir, fileName), { force: true })));
  }
}

function pickBands(info: SourceInfo, wanted: readonly number[] | undefined): SourceBand[] {
  if (wanted === undefined) return info.bands;
  return wanted.map((index) => {
    const band = info.bands.find((candidate) => candidate.index === index);
    if (band === undefined) {
      throw new RangeError(
        `the source has no imagery band ${index}; it has ${info.bands.map((b) => b.index).join(', ')}`,
      );
    }
    return band;
  });
}

function refuseAllNodata(bands: readonly SourceBand[]): SourceRefusal {
  const values = [...new Set(bands.map((band) => (band.nodata === null ? 'the mask' : String(band.nodata))))];
  return new SourceRefusal(
    'all-nodata',
    `no pixel with data in any band (no data is ${values.join(', ')})`,
    'at least one pixel with data',
    'Check the nodata value the file declares, and that the file covers the area meant.',
  );
}

interface BandJob {
  sourcePath: string;
  info: SourceInfo;
  band: SourceBand;
  outDir: string;
  workDir: string;
  fileName: string;
  store: BandStore;
  options: IngestOptions;
  onProgress: (fraction: number) => void;
}

async function ingestBand(job: BandJob): Promise<IngestedBand> {
  const { info, band, outDir, workDir, fileName, store, options, onProgress } = job;
  const { signal, timeoutMs = 1_800_000 } = options;
  // Written aside and moved at the end, so that a file under its final name is always whole.
  const draftPath = join(workDir, fileName);
  let { dtype } = band;
  let overviewMethod = chooseOverviewMethod(dtype);
  const onWrite = (fraction: number): void => onProgress(fraction * stepShares.write);
  if (info.maskKind === 'none') {
    await extractBand(job, String(band.index), draftPath, dtype, timeoutMs, onWrite);
  } else {
    dtype = await writeMaskedBand(job, draftPath, timeoutMs, onWrite);
    overviewMethod = chooseOverviewMethod(dtype);
  }
  await addOverviews(draftPath, info, overviewMethod, {
    compression: chooseCompression(dtype),
    signal,
    timeoutMs,
    onProgress: (fraction) => onProgress(stepShares.write + fraction * stepShares.overviews),
  });

  const written = await store.open(draftPath);
  const statistics = await computeBandStatistics(written, {
    signal,
    onProgress: (fraction) => onProgress(1 - stepShares.statistics + fraction * stepShares.statistics),
  });
  const { nodata } = written;
  await store.forget(draftPath);
  const sha256 = await hashFile(draftPath, signal);
  await rename(draftPath, join(outDir, fileName));
  const { description, scale, offset, index: sourceIndex } = band;
  return { sourceIndex, fileName, dtype, nodata, description, scale, offset, sha256, statistics };
}

/** GDAL before 3.7 averages int8 as if it were uint8, so those overviews take the nearest pixel. */
function chooseOverviewMethod(dtype: BandDtype): 'average' | 'nearest' {
  return dtype === 'int8' ? 'nearest' : 'average';
}

async function extractBand(
  { sourcePath, info, band, options }: BandJob,
  bandArgument: string,
  outPath: string,
  dtype: BandDtype,
  timeoutMs: number,
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
    { origin: 'upload', timeoutMs, signal: options.signal, onProgress },
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

async function writeMaskedBand(
  job: BandJob,
  outPath: string,
  timeoutMs: number,
  onProgress: (fraction: number) => void,
): Promise<BandDtype> {
  const { info, band, workDir, store, options } = job;
  const imagePath = join(workDir, 'image.tif');
  const maskPath = join(workDir, 'mask.tif');
  const rawPath = join(workDir, 'masked.raw');
  try {
    await extractBand(job, String(band.index), imagePath, band.dtype, timeoutMs, (f) => onProgress(f * 0.4));
    await extractBand(job, `mask,${band.index}`, maskPath, 'uint8', timeoutMs, (f) => onProgress(0.4 + f * 0.2));
    const image = await store.open(imagePath);
    const mask = await store.open(maskPath);
    const masked = await chooseMaskedType(image, mask, options.signal);
    await writeMaskedRaw(image, mask, masked, rawPath, options.signal);
    await writeGeoTiffFromRaw({ rawPath, ...masked, grid: image.grid, wkt: info.crs.wkt }, outPath, {
      overviews: 'none',
      signal: options.signal,
      onProgress: (fraction) => onProgress(0.7 + fraction * 0.3),
    });
    return masked.dtype;
  } finally {
    await store.forget(imagePath);
    await store.forget(maskPath);
    await Promise.all([imagePath, maskPath, rawPath].map((path) => rm(path, { force: true })));
  }
}

/** Lowercase hexadecimal SHA-256 of a file, read as a stream. */
export async function hashFile(path: string, signal?: AbortSignal): Promise<string> {
  const hash = createHash('sha256');
  await pipeline(createReadStream(path), hash, { signal });
  return hash.digest('hex');
}
