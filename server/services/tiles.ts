import { createHash } from 'node:crypto';
import sharp from 'sharp';
import { COMPOSITES } from '../../shared/constants/bands.ts';
import type { TileQuery } from '../../shared/contracts/scene.ts';
import type { App } from '../app-context.ts';
import type { Band } from '../entities/band.ts';
import type { Scene } from '../entities/scene.ts';
import { InvalidInput, NotFound } from '../errors.ts';
import type { Stretch, TileLayer } from '../raster/tile-request.ts';
import { computeContentKey, requireGrid } from './scenes.ts';

const YEAR_SECONDS = 31_536_000;
const TILE_PIXELS = 256;
/** Raised when tiles of the same content look different than before, so that browsers fetch them anew. */
const DRAWING = 1;

export interface TileAddress {
  z: number;
  x: number;
  y: number;
}

/** What a tile will show, and under which tag a browser may keep it; nothing is drawn yet. */
export interface PlannedTile {
  etag: string;
  cacheControl: string;
  draw: (signal: AbortSignal) => Promise<Uint8Array>;
}

/** @throws NotFound for a tile that does not exist */
export function checkTileAddress({ z, x, y }: TileAddress): void {
  if (x >= 2 ** z || y >= 2 ** z) throw new NotFound('There is no such tile.');
}

/** A tag of what a tile is made of, and how long it may be kept: for good when the address names the content. */
export function describeCaching(contentKey: string, named: string | undefined, parts: readonly unknown[]) {
  const digest = createHash('sha256')
    .update(JSON.stringify([DRAWING, contentKey, ...parts]))
    .digest('base64url');
  const keeps = named === contentKey;
  return {
    // Weak: the picture is the same, the bytes depend on the encoder's version.
    etag: `W/"${digest.slice(0, 27)}"`,
    cacheControl: keeps ? `private, max-age=${YEAR_SECONDS}, immutable` : 'private, no-cache',
  };
}

let emptyTile: Promise<Uint8Array> | null = null;

/** A tile that shows nothing. */
export function drawEmptyTile(): Promise<Uint8Array> {
  const [width, height] = [TILE_PIXELS, TILE_PIXELS];
  emptyTile ??= sharp({ create: { width, height, channels: 4, background: { r: 0, g: 0, b: 0, alpha: 0 } } })
    .webp({ lossless: true })
    .toBuffer();
  return emptyTile;
}

/** The bands shown when none are named: natural colour, else the first composite whose roles are there, else the first three or one. */
function chooseDefaultBands(bands: readonly Band[]): Band[] {
  for (const { roles } of COMPOSITES) {
    const found = roles.flatMap((role) => bands.find((band) => band.role === role) ?? []);
    if (found.length === roles.length) return found;
  }
  return bands.length >= 3 ? bands.slice(0, 3) : bands.slice(0, 1);
}

function chooseBands(scene: Scene, named: string | undefined): Band[] {
  if (named === undefined) return chooseDefaultBands(scene.bands);
  return named.split(',').map((text) => {
    const band = scene.bands.find(({ number }) => number === Number(text));
    if (band) return band;
    throw new InvalidInput('The scene has no such band.', {
      found: `band ${text}`,
      wanted: `a number from 1 to ${scene.bands.length}`,
      errors: [{ path: 'bands', message: `There is no band ${text}.` }],
    });
  });
}

function readStretch(bands: readonly Band[], named: string | undefined): Stretch[] {
  if (named === undefined) return bands.map(({ statistics }): Stretch => [statistics.p2, statistics.p98]);
  const pairs = named.split(',').map((pair) => pair.split(':').map(Number));
  const isUsable = pairs.length === bands.length && pairs.flat().every(Number.isFinite);
  if (!isUsable) {
    throw new InvalidInput('The stretch does not fit the bands.', {
      found: named,
      wanted: `low:high for each of ${bands.length === 1 ? 'one band' : `${bands.length} bands`}`,
      errors: [{ path: 'stretch', message: 'Give a low and a high value for each band.' }],
    });
  }
  return pairs.map(([low = 0, high = 0]): Stretch => [low, high]);
}

/** Plans a Web Mercator tile of a scene: 256 pixels, WebP, transparent where a shown band has no data. */
export function planSceneTile(app: App, scene: Scene, address: TileAddress, query: TileQuery): PlannedTile {
  checkTileAddress(address);
  const { grid, crs } = requireGrid(scene);
  const bands = chooseBands(scene, query.bands);
  const stretch = readStretch(bands, query.stretch);
  const gamma = query.gamma ?? 1;
  const numbers = bands.map(({ number }) => number);
  return {
    ...describeCaching(computeContentKey(scene.bands), query.v, [address, numbers, stretch, gamma]),
    async draw(signal) {
      const paths = await Promise.all(bands.map(({ fileKey }) => app.files.localPath(fileKey)));
      const layer = layerOf(paths, stretch);
      const tile = await app.workers.tiles.run({ ...address, crs, grid, layer, gamma }, { signal });
      return tile ?? drawEmptyTile();
    },
  };
}

function layerOf(paths: readonly string[], stretch: readonly Stretch[]): TileLayer {
  const [first, second, third] = paths;
  const [low, middle, high] = stretch;
  if (first && second && third && low && middle && high) {
    return { kind: 'composite', bands: [first, second, third], stretch: [low, middle, high] };
  }
  if (first && low) return { kind: 'single', band: first, stretch: low };
  throw new RangeError('a tile shows one band or three');
}
