/** Measures how band files should be compressed: file size, time to write, time to decode a block. Run: npx tsx tests/bench/block-compression.ts */
import { mkdtemp, rm, stat, writeFile } from 'node:fs/promises';
import { cpus, tmpdir } from 'node:os';
import { join } from 'node:path';
import { addDecoder, fromFile, getDecoder } from 'geotiff';
import type { BandDtype } from '../../server/raster/band-dtype.ts';
import type { BlockCompression } from '../../server/raster/band-file-format.ts';
import { registerZlibDecoder } from '../../server/raster/block-decoder.ts';
import { writeGeoTiffFromRaw } from '../../server/raster/raw-to-geotiff.ts';
import { makeSyntheticBand } from './synthetic-band.ts';

const size = 2048;
const repeats = 3;
const wkt = 'EPSG:32628';
const grid = { width: size, height: size, originX: 400000, originY: 5000000, pixelWidth: 30, pixelHeight: 30 };

interface Alternative {
  label: string;
  compression: (dtype: BandDtype) => BlockCompression;
  decoder: 'zlib' | 'geotiff';
}
const predictorOf = (dtype: BandDtype): 2 | 3 => (dtype.startsWith('float') ? 3 : 2);
const alternatives: Alternative[] = [
  { label: 'none', compression: () => ({ method: 'NONE', predictor: 1 }), decoder: 'geotiff' },
  {
    label: "DEFLATE 6, geotiff's decoder",
    compression: () => ({ method: 'DEFLATE', level: 6, predictor: 1 }),
    decoder: 'geotiff',
  },
  { label: 'DEFLATE 1, zlib', compression: () => ({ method: 'DEFLATE', level: 1, predictor: 1 }), decoder: 'zlib' },
  { label: 'DEFLATE 6, zlib', compression: () => ({ method: 'DEFLATE', level: 6, predictor: 1 }), decoder: 'zlib' },
  {
    label: 'DEFLATE 1 + predictor, zlib',
    compression: (d) => ({ method: 'DEFLATE', level: 1, predictor: predictorOf(d) }),
    decoder: 'zlib',
  },
  {
    label: 'DEFLATE 6 + predictor, zlib',
    compression: (d) => ({ method: 'DEFLATE', level: 6, predictor: predictorOf(d) }),
    decoder: 'zlib',
  },
  { label: 'ZSTD 9', compression: () => ({ method: 'ZSTD', level: 9, predictor: 1 }), decoder: 'geotiff' },
  {
    label: 'ZSTD 9 + predictor',
    compression: (d) => ({ method: 'ZSTD', level: 9, predictor: predictorOf(d) }),
    decoder: 'geotiff',
  },
  { label: 'LZW + predictor', compression: (d) => ({ method: 'LZW', predictor: predictorOf(d) }), decoder: 'geotiff' },
];

async function main(): Promise<void> {
  const geotiffDeflate = (
    await getDecoder(8, {
      tileWidth: 1,
      tileHeight: 1,
      predictor: 1,
      bitsPerSample: 8,
      planarConfiguration: 1,
    })
  ).constructor as Parameters<typeof addDecoder>[1] extends () => Promise<infer D> ? D : never;
  const folder = await mkdtemp(join(tmpdir(), 'block-compression-'));
  console.log(
    `Node ${process.version}, ${cpus().length} × ${cpus()[0].model}; ${size} × ${size} pixels, 256-pixel blocks`,
  );
  try {
    for (const dtype of ['uint16', 'float32', 'uint8'] as const) {
      const rawPath = join(folder, `${dtype}.raw`);
      const samples = makeSyntheticBand(size, size, dtype, 7);
      await writeFile(rawPath, samples);
      console.log(`\n| ${dtype} | size MB | write s | decode ms a block |\n|---|---|---|---|`);
      for (const alternative of alternatives) {
        if (alternative.decoder === 'zlib') registerZlibDecoder('blocking');
        else addDecoder([8, 32946], () => Promise.resolve(geotiffDeflate));
        const path = join(folder, 'out.tif');
        const began = performance.now();
        await writeGeoTiffFromRaw({ rawPath, dtype, grid, wkt, nodata: null }, path, {
          overviews: 'none',
          compression: alternative.compression(dtype),
        });
        const writeSeconds = (performance.now() - began) / 1000;
        const { size: bytes } = await stat(path);
        const decodeMs = await measureDecode(path);
        console.log(
          `| ${alternative.label} | ${(bytes / 1e6).toFixed(2)} | ${writeSeconds.toFixed(2)} | ${decodeMs.toFixed(2)} |`,
        );
      }
    }
  } finally {
    await rm(folder, { recursive: true });
  }
}

/** Median over all blocks of the best of several passes, fetch included (the file is in the page cache). */
async function measureDecode(path: string): Promise<number> {
  const tiff = await fromFile(path);
  const image = await tiff.getImage(0);
  const directory = image.fileDirectory;
  await directory.loadValue('TileOffsets');
  await directory.loadValue('TileByteCounts');
  const decoder = await getDecoder((await directory.loadValue('Compression')) ?? 1, {
    tileWidth: image.getTileWidth(),
    tileHeight: image.getTileHeight(),
    predictor: (await directory.loadValue('Predictor')) ?? 1,
    bitsPerSample: image.getBitsPerSample(),
    planarConfiguration: 1,
  });
  const nBlocks = Math.ceil(size / 256);
  const best = new Float64Array(nBlocks * nBlocks).fill(Infinity);
  for (let pass = 0; pass < repeats; pass++) {
    for (let block = 0; block < best.length; block++) {
      const began = performance.now();
      await image.getTileOrStrip(block % nBlocks, Math.floor(block / nBlocks), 0, decoder);
      best[block] = Math.min(best[block], performance.now() - began);
    }
  }
  await tiff.close();
  return best.sort()[best.length >> 1];
}

await main();
