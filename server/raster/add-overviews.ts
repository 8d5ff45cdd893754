import { blockSize, listOverviewFactors, type BlockCompression } from './band-file-format.ts';
import { runGdal } from './gdal-process.ts';

/**
 * Builds the overviews inside a GeoTIFF this server wrote; nodata takes no part in an average.
 * @throws {GdalProcessError}
 */
export async function addOverviews(
  path: string,
  size: { width: number; height: number },
  method: 'average' | 'nearest',
  options: {
    compression: BlockCompression;
    signal?: AbortSignal | undefined;
    onProgress?: ((fraction: number) => void) | undefined;
    timeoutMs?: number;
  },
): Promise<void> {
  const factors = listOverviewFactors(size.width, size.height);
  if (factors.length === 0) return;
  const { compression, signal, onProgress, timeoutMs = 600_000 } = options;
  await runGdal('gdaladdo', ['-r', method, path, ...factors.map(String)], {
    origin: 'own',
    signal,
    onProgress,
    timeoutMs,
    config: {
      GDAL_TIFF_OVR_BLOCKSIZE: String(blockSize),
      COMPRESS_OVERVIEW: compression.method,
      PREDICTOR_OVERVIEW: String(compression.predictor),
      ...(compression.method === 'DEFLATE' && compression.level !== undefined
        ? { ZLEVEL_OVERVIEW: String(compression.level) }
        : {}),
    },
  });
}
