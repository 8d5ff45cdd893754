import { createReadStream, createWriteStream } from 'node:fs';
import { mkdtemp, rename, rm, stat, writeFile } from 'node:fs/promises';
import { basename, dirname, join } from 'node:path';
import { pipeline } from 'node:stream/promises';
import { requireLocalPath } from './gdal-process.ts';
import { hashFile } from './hash-file.ts';
import type { RasterGrid } from './raster-grid.ts';
import { escapeXml, writeGeoTiffFromRaw, type Rgba } from './raw-to-geotiff.ts';

/** Value of class-map pixels without a class. */
export const classMapNodata = 255;

export interface ClassMapClass {
  /** 0–254, as in the strips. */
  code: number;
  name: string;
  /** Red, green, blue, each 0–255. */
  color: [number, number, number];
}

export interface ClassMapRequest {
  /** Raw uint8 files, full scene width, row-major, from top to bottom; together width × height bytes. */
  stripPaths: readonly string[];
  grid: RasterGrid;
  wkt: string;
  classes: readonly ClassMapClass[];
  /** Title in the file's metadata. */
  title?: string;
  /** Further text metadata of the data set, such as a run's digest; keys of letters, digits and underscores. */
  metadata?: Record<string, string>;
}

export interface ClassMapFile {
  path: string;
  /** GDAL's sidecar with the class names as categories, which desktop programs read. */
  auxPath: string;
  sha256: string;
  bytes: number;
}

/**
 * Writes a class map as a tiled GeoTIFF with colour table, overviews and class names (`CLASS_<code>` in the band's metadata
 * and categories in `<name>.aux.xml`). The same strips and classes give the same bytes. Memory stays bounded.
 * @throws {RangeError} when the strips don't make up the grid, or a code is doubled or out of range.
 * @throws {GdalProcessError}
 */
export async function writeClassMapFile(
  request: ClassMapRequest,
  outPath: string,
  options: { signal?: AbortSignal; onProgress?: (fraction: number) => void } = {},
): Promise<ClassMapFile> {
  requireLocalPath(outPath);
  validateClasses(request.classes);
  await validateStrips(request);
  // Beside the result, so that the finished file can be moved into place in one step.
  const workDir = await mkdtemp(join(dirname(outPath), '.class-map-'));
  try {
    const rawPath = join(workDir, 'classes.raw');
    const draftPath = join(workDir, basename(outPath));
    await joinFiles(request.stripPaths, rawPath, options.signal);
    await writeGeoTiffFromRaw(
      {
        rawPath,
        dtype: 'uint8',
        grid: request.grid,
        wkt: request.wkt,
        nodata: classMapNodata,
        description: 'Class',
        colorTable: buildColorTable(request.classes),
        metadata: {
          ...(request.title === undefined ? {} : { TIFFTAG_IMAGEDESCRIPTION: request.title }),
          ...request.metadata,
        },
        bandMetadata: Object.fromEntries(request.classes.map(({ code, name }) => [`CLASS_${code}`, name])),
      },
      draftPath,
      { overviews: 'nearest', signal: options.signal, onProgress: options.onProgress },
    );
    const sha256 = await hashFile(draftPath, options.signal);
    const auxPath = `${outPath}.aux.xml`;
    await writeFile(auxPath, describeCategories(request.classes));
    await rename(draftPath, outPath);
    return { path: outPath, auxPath, sha256, bytes: (await stat(outPath)).size };
  } finally {
    await rm(workDir, { recursive: true, force: true });
  }
}

function validateClasses(classes: readonly ClassMapClass[]): void {
  const seen = new Set<number>();
  for (const { code } of classes) {
    if (!Number.isInteger(code) || code < 0 || code >= classMapNodata) {
      throw new RangeError(`class code ${code} is not a whole number from 0 to ${classMapNodata - 1}`);
    }
    if (seen.has(code)) throw new RangeError(`class code ${code} stands for two classes`);
    seen.add(code);
  }
}

async function validateStrips({ stripPaths, grid }: ClassMapRequest): Promise<void> {
  let total = 0;
  for (const path of stripPaths) {
    const { size } = await stat(path);
    if (size === 0 || size % grid.width !== 0) {
      throw new RangeError(`strip ${basename(path)} has ${size} bytes, not whole rows of ${grid.width}`);
    }
    total += size;
  }
  if (total !== grid.width * grid.height) {
    throw new RangeError(`strips have ${total / grid.width} rows of ${grid.width}, wanted ${grid.height}`);
  }
}

async function joinFiles(paths: readonly string[], outPath: string, signal: AbortSignal | undefined): Promise<void> {
  for (const path of paths)
    await pipeline(createReadStream(path), createWriteStream(outPath, { flags: 'a' }), { signal });
}

/** Entries 0–255; codes without a class are black and, like nodata, transparent where a reader heeds opacity. */
function buildColorTable(classes: readonly ClassMapClass[]): Rgba[] {
  const table = Array.from({ length: 256 }, (): Rgba => [0, 0, 0, 0]);
  for (const { code, color } of classes) table[code] = [...color, 255];
  return table;
}

/** GDAL's auxiliary file: category i is the name of code i. */
function describeCategories(classes: readonly ClassMapClass[]): string {
  const lastCode = Math.max(-1, ...classes.map(({ code }) => code));
  const names = Array.from({ length: lastCode + 1 }, () => '');
  for (const { code, name } of classes) names[code] = name;
  return [
    '<PAMDataset>',
    '  <PAMRasterBand band="1">',
    '    <CategoryNames>',
    ...names.map((name) => `      <Category>${escapeXml(name)}</Category>`),
    '    </CategoryNames>',
    '  </PAMRasterBand>',
    '</PAMDataset>',
    '',
  ].join('\n');
}
