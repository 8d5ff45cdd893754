import { execFileSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { basename, join } from 'node:path';
import { afterAll } from 'vitest';
import {
  getGdalType,
  getSampleBytes,
  viewBandArray,
  type BandArray,
  type BandDtype,
} from '../../server/raster/band-dtype.ts';
import type { LonLatBounds } from '../../server/raster/scene-extent.ts';
import type { RasterGrid } from '../../server/raster/raster-grid.ts';

/** A temporary folder that is removed after the file's tests. */
export function useTempFolder(): string {
  const folder = mkdtempSync(join(tmpdir(), 'raster-'));
  afterAll(() => rmSync(folder, { recursive: true, force: true }));
  return folder;
}

export interface RasterSpec {
  bands: readonly BandArray[];
  dtype: BandDtype;
  width: number;
  height: number;
  grid?: RasterGrid;
  /** Written as a whole, in place of `grid`. */
  geoTransform?: readonly number[];
  srs?: string;
  nodata?: string;
  /** GDAL colour interpretation of each band. */
  colorInterp?: readonly string[];
  format?: string;
  args?: readonly string[];
}

/** Writes a raster with GDAL's own tools, independently of the code under test. */
export function makeRaster(path: string, spec: RasterSpec): string {
  const { bands, dtype, width, height, grid, srs, nodata } = spec;
  const sampleBytes = getSampleBytes(dtype);
  const geoTransform =
    spec.geoTransform ?? (grid && [grid.originX, grid.pixelWidth, 0, grid.originY, 0, -grid.pixelHeight]);
  const bandXml = bands.map((values, index) => {
    const rawPath = `${path}.${index}.raw`;
    writeFileSync(rawPath, values);
    return `<VRTRasterBand dataType="${getGdalType(dtype)}" band="${index + 1}" subClass="VRTRawRasterBand">
      ${dtype === 'int8' ? '<Metadata domain="IMAGE_STRUCTURE"><MDI key="PIXELTYPE">SIGNEDBYTE</MDI></Metadata>' : ''}
      ${nodata === undefined ? '' : `<NoDataValue>${nodata}</NoDataValue>`}
      ${spec.colorInterp === undefined ? '' : `<ColorInterp>${spec.colorInterp[index]}</ColorInterp>`}
      <SourceFilename relativetoVRT="1">${basename(rawPath)}</SourceFilename>
      <PixelOffset>${sampleBytes}</PixelOffset><LineOffset>${sampleBytes * width}</LineOffset><ByteOrder>LSB</ByteOrder>
    </VRTRasterBand>`;
  });
  const vrtPath = `${path}.vrt`;
  writeFileSync(
    vrtPath,
    `<VRTDataset rasterXSize="${width}" rasterYSize="${height}">
      ${srs === undefined ? '' : `<SRS>${srs}</SRS>`}
      ${geoTransform === undefined ? '' : `<GeoTransform>${geoTransform.join(', ')}</GeoTransform>`}
      ${bandXml.join('\n')}</VRTDataset>`,
  );
  runTool('gdal_translate', ['-q', '-of', spec.format ?? 'GTiff', ...(spec.args ?? []), vrtPath, path]);
  for (const index of bands.keys()) rmSync(`${path}.${index}.raw`);
  rmSync(vrtPath);
  return path;
}

export function runTool(tool: string, args: readonly string[]): string {
  return execFileSync(tool, args, { encoding: 'utf8', stdio: ['ignore', 'pipe', 'pipe'] });
}

/** A grid in the middle of nowhere in particular; override what matters. */
export function makeGrid(overrides: Partial<RasterGrid> = {}): RasterGrid {
  return { width: 60, height: 40, originX: 500000, originY: 5000000, pixelWidth: 30, pixelHeight: 30, ...overrides };
}

/** Values `f(col, row)`, row-major. */
export function fillBand<Values extends BandArray>(
  values: Values,
  width: number,
  f: (col: number, row: number) => number,
): Values {
  for (let i = 0; i < values.length; i++) values[i] = f(i % width, Math.floor(i / width));
  return values;
}

/** Pixel values of the first band of any raster, through GDAL and not through the reader under test. */
export function readWithGdal(path: string, dtype: BandDtype): BandArray {
  const rawPath = `${path}.read.raw`;
  runTool('gdal_translate', ['-q', '-of', 'ENVI', '-b', '1', path, rawPath]);
  const bytes = readFileSync(rawPath);
  return viewBandArray(dtype, bytes.buffer.slice(bytes.byteOffset, bytes.byteOffset + bytes.byteLength));
}

/** The Web Mercator tile that holds the middle of WGS84 bounds, which may lie across the antimeridian. */
export function middleTile({ west, south, east, north }: LonLatBounds, z: number): { z: number; x: number; y: number } {
  const n = 2 ** z;
  const lon = (west + (east < west ? east + 360 : east)) / 2;
  const phi = (((south + north) / 2) * Math.PI) / 180;
  return {
    z,
    x: Math.floor(((lon + 180) / 360) * n) % n,
    y: Math.floor(((1 - Math.asinh(Math.tan(phi)) / Math.PI) / 2) * n),
  };
}
