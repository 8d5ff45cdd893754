import { link, open, readFile } from 'node:fs/promises';
import { join } from 'node:path';
import { z } from 'zod';
import { extractShapefile } from './extract-shapefile.ts';
import { isFaultOfFile, requireLocalPath, runGdal } from './gdal-process.ts';
import { VectorRefusal } from './vector-refusal.ts';

export interface VectorFeature {
  /** GeoJSON geometry in degrees on WGS84, whatever the file's own system. */
  geometry: { type: string; coordinates: unknown } | null;
  properties: Record<string, string | number | boolean | null>;
}

export interface VectorFile {
  features: VectorFeature[];
  /** Names of the fields, in the file's order. */
  fields: string[];
}

export interface ReadVectorOptions {
  /** A folder of one's own for what is unpacked and converted. */
  scratchDir: string;
  maxFeatures?: number;
  signal?: AbortSignal;
}

const TIMEOUT_MS = 60_000;
const UNREADABLE = 'GDAL cannot read it as GeoJSON, GeoPackage, KML or zipped Shapefile';
const MAX_FEATURES = 100_000;

const collectionSchema = z.object({
  features: z.array(
    z.object({
      geometry: z.looseObject({ type: z.string(), coordinates: z.unknown() }).nullable(),
      properties: z.record(z.string(), z.unknown()).nullable(),
    }),
  ),
});

/**
 * Reads the first layer of a GeoJSON, GeoPackage, KML or zipped Shapefile through GDAL, in degrees on WGS84; curves become lines,
 * heights are dropped.
 * @throws VectorRefusal when it is none of these, damaged, without a reference system, or too large
 * @throws GdalProcessError when GDAL is missing or the machine ran out of something
 */
export async function readVectorFile(path: string, options: ReadVectorOptions): Promise<VectorFile> {
  const { scratchDir, maxFeatures = MAX_FEATURES, signal } = options;
  const source = await placeByContent(path, scratchDir);
  const converted = join(scratchDir, 'converted.geojson');
  const args = [
    ...['-f', 'GeoJSON', '-t_srs', 'EPSG:4326', '-lco', 'RFC7946=NO', '-lco', 'COORDINATE_PRECISION=9'],
    ...['-dim', 'XY', '-nlt', 'CONVERT_TO_LINEAR', '-limit', String(maxFeatures + 1), '-nln', 'features'],
    ...[requireLocalPath(converted), requireLocalPath(source), await findLayer(source, signal)],
  ];
  try {
    await runGdal('ogr2ogr', args, { origin: 'upload', timeoutMs: TIMEOUT_MS, ...(signal && { signal }) });
  } catch (error) {
    if (isFaultOfFile(error)) throw new VectorRefusal(describeFault(error.stderr));
    throw error;
  }
  const parsed = collectionSchema.safeParse(JSON.parse(await readFile(converted, 'utf8')));
  if (!parsed.success) throw new VectorRefusal('GDAL made nothing readable of it');
  const { features } = parsed.data;
  if (features.length > maxFeatures) throw new VectorRefusal(`it holds more than ${maxFeatures} features`);
  const fields = new Set<string>();
  const read = features.map(({ geometry, properties }): VectorFeature => {
    const plain = Object.fromEntries(Object.entries(properties ?? {}).map(([name, value]) => [name, flatten(value)]));
    for (const name of Object.keys(plain)) fields.add(name);
    return { geometry: geometry && { type: geometry.type, coordinates: geometry.coordinates }, properties: plain };
  });
  return { features: read, fields: [...fields] };
}

/**
 * The file under a name with the extension of what its first bytes say it is: GDAL goes by both, and opens nothing that
 * is none of these.
 */
async function placeByContent(path: string, dir: string): Promise<string> {
  const head = await readHead(path);
  if (head.startsWith('PK\u0003\u0004')) return extractShapefile(path, dir);
  const extension = recognise(head);
  if (extension === null) throw new VectorRefusal(UNREADABLE);
  const placed = join(dir, `upload.${extension}`);
  await link(path, placed);
  return placed;
}

const HEAD_BYTES = 4096;

async function readHead(path: string): Promise<string> {
  const file = await open(path);
  try {
    const { buffer, bytesRead } = await file.read(Buffer.alloc(HEAD_BYTES), 0, HEAD_BYTES, 0);
    return buffer.toString('latin1', 0, bytesRead);
  } finally {
    await file.close();
  }
}

function recognise(head: string): 'gpkg' | 'geojson' | 'kml' | null {
  if (head.startsWith('SQLite format 3\u0000')) return 'gpkg';
  const text = head.replace(/^(\u00ef\u00bb\u00bf)?\s*/, '');
  if (text.startsWith('{')) return 'geojson';
  return text.startsWith('<') && /<kml[\s>]/.test(text) && !/<OGRVRT/i.test(text) ? 'kml' : null;
}

/** The first layer's name; a GeoPackage or KML may hold several. */
async function findLayer(path: string, signal: AbortSignal | undefined): Promise<string> {
  try {
    const { stdout } = await runGdal('ogrinfo', ['-ro', '-q', path], {
      origin: 'upload',
      timeoutMs: TIMEOUT_MS,
      ...(signal && { signal }),
    });
    const name = /^1: (.+?)(?: \([^()]*\))?$/m.exec(stdout)?.[1];
    if (!name) throw new VectorRefusal('it has no layer');
    return name;
  } catch (error) {
    if (isFaultOfFile(error)) throw new VectorRefusal(describeFault(error.stderr));
    throw error;
  }
}

function flatten(value: unknown): string | number | boolean | null {
  if (value === null || value === undefined) return null;
  if (typeof value === 'number' || typeof value === 'boolean' || typeof value === 'string') return value;
  return JSON.stringify(value);
}

/** What GDAL says, without paths of this machine. */
function describeFault(stderr: string): string {
  if (/source layer has no coordinate system|Can't transform coordinates/i.test(stderr)) {
    return 'it does not say which reference system its coordinates are in';
  }
  return UNREADABLE;
}
