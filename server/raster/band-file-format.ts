import type { BandDtype } from './band-dtype.ts';

/** Side of a block, pixels, in band files and class maps, overviews included. */
export const blockSize = 256;

/** How blocks are compressed: DEFLATE, level, and TIFF predictor (1 none, 2 horizontal differences, 3 floating point). */
export interface BlockCompression {
  method: 'NONE' | 'DEFLATE' | 'ZSTD' | 'LZW';
  level?: number;
  predictor: 1 | 2 | 3;
}

/**
 * The compression of a band file or class map: DEFLATE, with horizontal differences for 16- and 32-bit integers.
 * The measurement behind it is in docs/decisions/002-band-file-compression.md.
 */
export function chooseCompression(dtype: BandDtype): BlockCompression {
  const isWideInteger = /^u?int(16|32)$/.test(dtype);
  return { method: 'DEFLATE', level: 6, predictor: isWideInteger ? 2 : 1 };
}

/** GDAL creation options of a tiled, little-endian band file. */
export function listCreationOptions(
  dtype: BandDtype,
  compression: BlockCompression = chooseCompression(dtype),
): string[] {
  const options = [
    'TILED=YES',
    `BLOCKXSIZE=${blockSize}`,
    `BLOCKYSIZE=${blockSize}`,
    'BIGTIFF=IF_SAFER',
    'ENDIANNESS=LITTLE',
    `COMPRESS=${compression.method}`,
  ];
  if (compression.method !== 'NONE' && compression.predictor !== 1) options.push(`PREDICTOR=${compression.predictor}`);
  if (compression.level !== undefined) {
    if (compression.method === 'DEFLATE') options.push(`ZLEVEL=${compression.level}`);
    if (compression.method === 'ZSTD') options.push(`ZSTD_LEVEL=${compression.level}`);
  }
  if (dtype === 'int8') options.push('PIXELTYPE=SIGNEDBYTE');
  return options.flatMap((option) => ['-co', option]);
}

/** Overview factors 2, 4, 8… until the coarsest level fits one block. */
export function listOverviewFactors(width: number, height: number): number[] {
  const factors: number[] = [];
  for (let factor = 2; Math.max(width, height) > (factor / 2) * blockSize; factor *= 2) factors.push(factor);
  return factors;
}
