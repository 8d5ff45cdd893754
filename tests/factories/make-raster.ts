import { execFile } from 'node:child_process';
import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';

const run = promisify(execFile);

export interface RasterSpec {
  width: number;
  height: number;
  /** Outer corner of the upper left pixel, metres in the reference system. */
  originX: number;
  originY: number;
  pixelSize: number;
  /** Empty for a file without one. */
  crs: string;
  /** Names of the bands; empty strings for bands without a description. */
  bandNames: string[];
  nodata: number | null;
  scale: number | null;
  offset: number | null;
  /** Stored value of a pixel; band from 0. */
  value: (band: number, column: number, row: number) => number;
}

/** Three covers side by side, a third of the width each, with a fixed pattern of small differences. */
export function threeCovers(width: number): RasterSpec['value'] {
  return (band, column, row) => {
    const cover = Math.min(2, Math.floor((column * 3) / width));
    const noise = (column * 7 + row * 13 + band * 5) % 40;
    return 1000 + cover * 2000 + band * 150 * (cover + 1) + noise;
  };
}

export const SIX_BANDS = ['Blue', 'Green', 'Red', 'Near infrared', 'SWIR 1', 'SWIR 2'];

/** Writes a small uint16 GeoTIFF through GDAL: by default 60 × 40 pixels of 30 m in UTM 28N, six bands, nodata 0. */
export async function makeRaster(path: string, overrides: Partial<RasterSpec> = {}): Promise<RasterSpec> {
  const width = overrides.width ?? 60;
  const spec: RasterSpec = {
    width,
    height: 40,
    originX: 500_000,
    originY: 6_700_000,
    pixelSize: 30,
    crs: 'EPSG:32628',
    bandNames: SIX_BANDS,
    nodata: 0,
    scale: null,
    offset: null,
    value: threeCovers(width),
    ...overrides,
  };
  const dir = await mkdtemp(join(tmpdir(), 'groundsel-raster-'));
  try {
    const { height, bandNames, originX, originY, pixelSize } = spec;
    const samples = new Uint16Array(width * height * bandNames.length);
    let at = 0;
    for (let band = 0; band < bandNames.length; band++) {
      for (let row = 0; row < height; row++) {
        for (let column = 0; column < width; column++) samples[at++] = spec.value(band, column, row);
      }
    }
    await writeFile(join(dir, 'raw'), samples);
    const named = bandNames.some((name) => name !== '') ? `band names = {${bandNames.join(', ')}}\n` : '';
    await writeFile(
      join(dir, 'raw.hdr'),
      `ENVI\nsamples = ${width}\nlines = ${height}\nbands = ${bandNames.length}\nheader offset = 0\nfile type = ENVI Standard\ndata type = 12\ninterleave = bsq\nbyte order = 0\n${named}`,
    );
    const ullr = [originX, originY, originX + width * pixelSize, originY - height * pixelSize].map(String);
    await run('gdal_translate', [
      ...['-q', '-of', 'GTiff', '-a_ullr', ...ullr],
      ...(spec.crs === '' ? [] : ['-a_srs', spec.crs]),
      ...(spec.nodata === null ? [] : ['-a_nodata', String(spec.nodata)]),
      ...(spec.scale === null ? [] : ['-a_scale', String(spec.scale)]),
      ...(spec.offset === null ? [] : ['-a_offset', String(spec.offset)]),
      join(dir, 'raw'),
      path,
    ]);
    return spec;
  } finally {
    await rm(dir, { recursive: true, force: true });
  }
}
