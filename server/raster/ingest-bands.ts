import { mkdir, rename, rm } from 'node:fs/promises';
import { join } from 'node:path';
import { addOverviews } from './add-overviews.ts';
import { chooseCompression } from './band-file-format.ts';
import { BandStore } from './band-store.ts';
import { computeBandStatistics, type BandStatistics } from './band-statistics.ts';
import type { BandDtype } from './band-dtype.ts';
import { extractBand, type BandExtraction } from './extract-band.ts';
import { requireLocalPath } from './gdal-process.ts';
import { hashFile } from './hash-file.ts';
import type { SourceBand, SourceInfo } from './inspect-source.ts';
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
  /** Bands worked on at once; each takes one GDAL process at a time. */
  concurrentBands?: number;
  /** Limit for each GDAL step on a band. */
  timeoutMs?: number;
  /** Limit on the memory of the program that decodes a band. */
  memoryBytes?: number;
}

const defaultMemoryBytes = 3 * 1024 ** 3;
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
  const firstNumber = options.firstFileNumber ?? 1;
  // Named after the first file, so that a run that takes up after a crash clears what the crash left.
  const workDir = join(outDir, `ingest-${firstNumber}`);
  await rm(workDir, { recursive: true, force: true });
  await mkdir(workDir);
  const store = new BandStore({ cacheMb: 0, decode: 'async' });
  const stop = new AbortController();
  const signal = options.signal === undefined ? stop.signal : AbortSignal.any([options.signal, stop.signal]);
  const fractions = new Float64Array(wanted.length);
  const jobs = wanted.map((band, position): BandJob => {
    const onProgress = (fraction: number): void => {
      fractions[position] = fraction;
      options.onProgress?.(fractions.reduce((sum, one) => sum + one, 0) / wanted.length);
    };
    const fileName = `band-${String(firstNumber + position).padStart(2, '0')}.tif`;
    const { timeoutMs = 1_800_000, memoryBytes = defaultMemoryBytes } = options;
    return { sourcePath, info, band, outDir, workDir, fileName, store, timeoutMs, memoryBytes, signal, onProgress };
  });
  let isDone = false;
  try {
    const ingested = await runInLanes(jobs, options.concurrentBands ?? 2, ingestBand, stop);
    if (ingested.every((band) => band.statistics === null)) throw refuseAllNodata(wanted);
    isDone = true;
    return ingested;
  } finally {
    await store.close();
    await rm(workDir, { recursive: true, force: true });
    if (!isDone) await Promise.all(jobs.map(({ fileName }) => rm(join(outDir, fileName), { force: true })));
  }
}

/** Runs a step for each item, so many at once; the first failure stops the others and is thrown once they have ended. */
async function runInLanes<Item, Result>(
  items: readonly Item[],
  nLanes: number,
  step: (item: Item) => Promise<Result>,
  stop: AbortController,
): Promise<Result[]> {
  const results: Result[] = [];
  const failures: unknown[] = [];
  const waiting = [...items.entries()];
  const runLane = async (): Promise<void> => {
    for (let next = waiting.shift(); next !== undefined && failures.length === 0; next = waiting.shift()) {
      const [position, item] = next;
      try {
        results[position] = await step(item);
      } catch (error) {
        failures.push(error);
        stop.abort();
      }
    }
  };
  await Promise.all(Array.from({ length: nLanes }, runLane));
  if (failures.length > 0) throw failures[0];
  return results;
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

interface BandJob extends Omit<BandExtraction, 'outPath'> {
  outDir: string;
  fileName: string;
  store: BandStore;
}

async function ingestBand(job: BandJob): Promise<IngestedBand> {
  const { info, band, outDir, workDir, fileName, store, timeoutMs, signal, onProgress } = job;
  // Written aside and moved at the end, so that a file under its final name is always whole.
  const draftPath = join(workDir, fileName);
  const dtype = await extractBand({
    ...job,
    outPath: draftPath,
    onProgress: (fraction) => onProgress(fraction * stepShares.write),
  });
  await addOverviews(draftPath, info, chooseOverviewMethod(dtype), {
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
  onProgress(1);
  const { description, scale, offset, index: sourceIndex } = band;
  return { sourceIndex, fileName, dtype, nodata, description, scale, offset, sha256, statistics };
}

/** GDAL before 3.7 averages int8 as if it were uint8, so those overviews take the nearest pixel. */
function chooseOverviewMethod(dtype: BandDtype): 'average' | 'nearest' {
  return dtype === 'int8' ? 'nearest' : 'average';
}
