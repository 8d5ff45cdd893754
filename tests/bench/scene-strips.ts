/** Times ingest and the reading of a whole scene in strips, as mapping does. Run: npx tsx tests/bench/scene-strips.ts [--width=7600 --height=7800 --bands=6] */
import { execFileSync } from 'node:child_process';
import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { cpus, tmpdir } from 'node:os';
import { join } from 'node:path';
import { BandStore } from '../../server/raster/band-store.ts';
import { ingestBands } from '../../server/raster/ingest-bands.ts';
import { inspectSource } from '../../server/raster/inspect-source.ts';
import { writeGeoTiffFromRaw } from '../../server/raster/raw-to-geotiff.ts';
import { readSceneStrips } from '../../server/raster/scene-reader.ts';
import { makeSyntheticBand } from './synthetic-band.ts';

function readOption(name: string, fallback: number): number {
  const given = process.argv.find((argument) => argument.startsWith(`--${name}=`));
  return given === undefined ? fallback : Number(given.split('=')[1]);
}
const width = readOption('width', 7600);
const height = readOption('height', 7800);
const nBands = readOption('bands', 6);
const grid = { width, height, originX: 400000, originY: 5900000, pixelWidth: 30, pixelHeight: 30 };

async function main(): Promise<void> {
  const folder = await mkdtemp(join(tmpdir(), 'bench-strips-'));
  try {
    const parts: string[] = [];
    for (let number = 1; number <= nBands; number++) {
      const rawPath = join(folder, `${number}.raw`);
      const path = join(folder, `${number}.tif`);
      await writeFile(rawPath, makeSyntheticBand(width, height, 'uint16', number));
      const raw = { rawPath, dtype: 'uint16' as const, grid, wkt: 'EPSG:32628', nodata: null };
      await writeGeoTiffFromRaw(raw, path, {
        overviews: 'none',
        compression: { method: 'DEFLATE', level: 1, predictor: 1 },
      });
      await rm(rawPath);
      parts.push(path);
    }
    const source = join(folder, 'source.tif');
    execFileSync('gdalbuildvrt', ['-q', '-separate', join(folder, 'all.vrt'), ...parts]);
    execFileSync('gdal_translate', [
      '-q',
      '-co',
      'TILED=YES',
      '-co',
      'COMPRESS=DEFLATE',
      join(folder, 'all.vrt'),
      source,
    ]);
    await Promise.all(parts.map((path) => rm(path)));
    console.log(
      `${cpus().length} × ${cpus()[0].model}, Node ${process.version}; ${width} × ${height}, ${nBands} bands of uint16`,
    );

    let began = performance.now();
    const info = await inspectSource(source);
    console.log(`inspect: ${((performance.now() - began) / 1000).toFixed(2)} s`);
    began = performance.now();
    const bands = await ingestBands(source, info, join(folder, 'scene'));
    console.log(`ingest: ${((performance.now() - began) / 1000).toFixed(1)} s`);

    const store = new BandStore({ cacheMb: 32 });
    const files = await Promise.all(bands.map(({ fileName }) => store.open(join(folder, 'scene', fileName))));
    began = performance.now();
    let sum = 0;
    let peakBytes = 0;
    for await (const strip of readSceneStrips(grid, files)) {
      for (const values of strip.bands) sum += values[values.length >> 1];
      peakBytes = Math.max(peakBytes, process.memoryUsage.rss());
    }
    const seconds = (performance.now() - began) / 1000;
    const megaSamples = (width * height * nBands) / 1e6;
    console.log(
      `strips, one thread: ${seconds.toFixed(1)} s (${(megaSamples / seconds).toFixed(0)} million samples a second), process at most ${(peakBytes / 1e6).toFixed(0)} MB; check ${sum}`,
    );
    await store.close();
  } finally {
    await rm(folder, { recursive: true });
  }
}

await main();
