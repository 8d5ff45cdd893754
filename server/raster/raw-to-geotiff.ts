import { rm, stat, writeFile } from 'node:fs/promises';
import { basename } from 'node:path';
import { getGdalType, getSampleBytes, type BandDtype } from './band-dtype.ts';
import { addOverviews } from './add-overviews.ts';
import { chooseCompression, listCreationOptions, type BlockCompression } from './band-file-format.ts';
import { runGdal } from './gdal-process.ts';
import type { RasterGrid } from './raster-grid.ts';

export type Rgba = [number, number, number, number];

/** One band of samples in a file of this server's own: row-major, no header, little-endian. */
export interface RawRaster {
  rawPath: string;
  dtype: BandDtype;
  grid: RasterGrid;
  wkt: string;
  nodata: number | null;
  description?: string;
  /** Entry i is the colour of value i. */
  colorTable?: readonly Rgba[];
  metadata?: Record<string, string>;
  bandMetadata?: Record<string, string>;
}

/**
 * Turns raw samples into a tiled GeoTIFF with overviews; memory stays bounded whatever the size.
 * A VRT is written beside the raw file, which must stand in a private folder, and removed again.
 * @throws {RangeError} when the raw file has not exactly width × height samples.
 * @throws {GdalProcessError}
 */
export async function writeGeoTiffFromRaw(
  raw: RawRaster,
  outPath: string,
  options: {
    overviews: 'average' | 'nearest' | 'none';
    compression?: BlockCompression;
    signal?: AbortSignal | undefined;
    onProgress?: ((fraction: number) => void) | undefined;
  },
): Promise<void> {
  const { width, height } = raw.grid;
  const wantedBytes = width * height * getSampleBytes(raw.dtype);
  const { size: foundBytes } = await stat(raw.rawPath);
  if (foundBytes !== wantedBytes) {
    throw new RangeError(`raw file has ${foundBytes} bytes, wanted ${wantedBytes} (${width} × ${height} ${raw.dtype})`);
  }
  const compression = options.compression ?? chooseCompression(raw.dtype);
  const vrtPath = `${raw.rawPath}.vrt`;
  try {
    await writeFile(vrtPath, describeRawAsVrt(raw));
    await runGdal(
      'gdal_translate',
      ['-if', 'VRT', '-of', 'GTiff', ...listCreationOptions(raw.dtype, compression), vrtPath, outPath],
      {
        origin: 'own',
        timeoutMs: 1_800_000,
        signal: options.signal,
        onProgress: (fraction) => options.onProgress?.(fraction * 0.7),
      },
    );
    if (options.overviews !== 'none') {
      await addOverviews(outPath, raw.grid, options.overviews, {
        compression,
        signal: options.signal,
        onProgress: (fraction) => options.onProgress?.(0.7 + fraction * 0.3),
      });
    }
    options.onProgress?.(1);
  } finally {
    await rm(vrtPath, { force: true });
  }
}

function describeRawAsVrt(raw: RawRaster): string {
  const { width, height, originX, originY, pixelWidth, pixelHeight } = raw.grid;
  const sampleBytes = getSampleBytes(raw.dtype);
  const colorTable =
    raw.colorTable === undefined
      ? ''
      : `<ColorInterp>Palette</ColorInterp><ColorTable>${raw.colorTable
          .map(([r, g, b, a]) => `<Entry c1="${r}" c2="${g}" c3="${b}" c4="${a}"/>`)
          .join('')}</ColorTable>`;
  return [
    `<VRTDataset rasterXSize="${width}" rasterYSize="${height}">`,
    `<SRS>${escapeXml(raw.wkt)}</SRS>`,
    `<GeoTransform>${[originX, pixelWidth, 0, originY, 0, -pixelHeight].join(', ')}</GeoTransform>`,
    describeMetadata(raw.metadata),
    `<VRTRasterBand dataType="${getGdalType(raw.dtype)}" band="1" subClass="VRTRawRasterBand">`,
    describeMetadata(raw.bandMetadata),
    raw.dtype === 'int8' ? '<Metadata domain="IMAGE_STRUCTURE"><MDI key="PIXELTYPE">SIGNEDBYTE</MDI></Metadata>' : '',
    raw.description === undefined ? '' : `<Description>${escapeXml(raw.description)}</Description>`,
    raw.nodata === null ? '' : `<NoDataValue>${Number.isNaN(raw.nodata) ? 'nan' : raw.nodata}</NoDataValue>`,
    colorTable,
    `<SourceFilename relativetoVRT="1">${escapeXml(basename(raw.rawPath))}</SourceFilename>`,
    `<ImageOffset>0</ImageOffset><PixelOffset>${sampleBytes}</PixelOffset><LineOffset>${sampleBytes * width}</LineOffset>`,
    '<ByteOrder>LSB</ByteOrder>',
    '</VRTRasterBand>',
    '</VRTDataset>',
  ].join('\n');
}

function describeMetadata(metadata: Record<string, string> | undefined): string {
  if (metadata === undefined) return '';
  const items = Object.entries(metadata).map(
    ([key, value]) => `<MDI key="${escapeXml(key)}">${escapeXml(value)}</MDI>`,
  );
  return `<Metadata>${items.join('')}</Metadata>`;
}

/** Text made safe for XML element content and attributes; characters XML 1.0 can't hold are dropped. */
export function escapeXml(text: string): string {
  return text
    .replace(/[^\t\n\r\u0020-\uD7FF\uE000-\uFFFD\u{10000}-\u{10FFFF}]/gu, '')
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;');
}
