import { describe, expect, it } from 'vitest';
import { join } from 'node:path';
import { createProgressReader, GdalProcessError, requireLocalPath, runGdal } from '../../server/raster/gdal-process.ts';
import { makeGrid, makeRaster, useTempFolder } from './make-raster.ts';

const folder = useTempFolder();
const small = makeRaster(join(folder, 'small.tif'), {
  bands: [new Uint8Array(2400)],
  dtype: 'uint8',
  width: 60,
  height: 40,
  grid: makeGrid(),
  srs: 'EPSG:32628',
});
const large = makeRaster(join(folder, 'large.tif'), {
  bands: [new Uint8Array(4_000_000)],
  dtype: 'uint8',
  width: 2000,
  height: 2000,
});

async function failureOf(run: Promise<unknown>): Promise<GdalProcessError> {
  const outcome = await run.then(
    () => null,
    (error: unknown) => error,
  );
  expect(outcome).toBeInstanceOf(GdalProcessError);
  return outcome as GdalProcessError;
}

describe('runGdal', () => {
  it('returns what the tool prints', async () => {
    const { stdout } = await runGdal('gdalinfo', ['-json', small], { origin: 'upload' });
    expect(JSON.parse(stdout)).toMatchObject({ size: [60, 40] });
  });

  it('keeps what the tool said when it fails', async () => {
    const error = await failureOf(runGdal('gdalinfo', [join(folder, 'missing.tif')], { origin: 'own' }));
    expect(error.reason).toBe('failed');
    expect(error.exitCode).toBe(1);
    expect(error.stderr).toContain('No such file');
  });

  it('stops a tool that takes too long', async () => {
    const growing = ['-outsize', '40000', '40000', large, join(folder, 'never.tif')];
    const began = performance.now();
    const error = await failureOf(runGdal('gdal_translate', growing, { origin: 'own', timeoutMs: 300 }));
    expect(error.reason).toBe('timeout');
    expect(performance.now() - began).toBeLessThan(3000);
  });

  it('stops a tool when the signal is aborted, before or during the run', async () => {
    const controller = new AbortController();
    const growing = ['-outsize', '40000', '40000', large, join(folder, 'never.tif')];
    const run = runGdal('gdal_translate', growing, { origin: 'own', signal: controller.signal });
    setTimeout(() => controller.abort(), 200);
    expect((await failureOf(run)).reason).toBe('aborted');
    const late = runGdal('gdalinfo', [small], { origin: 'own', signal: controller.signal });
    expect((await failureOf(late)).reason).toBe('aborted');
  });

  it('gives the tool no more memory than allowed', async () => {
    await runGdal('gdalinfo', [small], { origin: 'own', memoryBytes: 1024 ** 3 });
    const error = await failureOf(runGdal('gdalinfo', [small], { origin: 'own', memoryBytes: 16 * 1024 ** 2 }));
    expect(error.reason).not.toBe('timeout');
  });

  it('stops a tool that prints too much', async () => {
    const error = await failureOf(runGdal('gdalinfo', ['-json', small], { origin: 'own', maxOutputBytes: 100 }));
    expect(error.reason).toBe('too-much-output');
  });

  it('refuses virtual file systems in any argument', () => {
    expect(() => runGdal('gdalinfo', ['/vsicurl/http://127.0.0.1/a.tif'], { origin: 'own' })).toThrow(RangeError);
    expect(() => requireLocalPath('/vsizip/a.zip')).toThrow(RangeError);
    expect(() => requireLocalPath('relative.tif')).toThrow(RangeError);
  });

  it('reports rising progress that ends at 1', async () => {
    const fractions: number[] = [];
    await runGdal('gdal_translate', ['-outsize', '4000', '4000', large, join(folder, 'copy.tif')], {
      origin: 'upload',
      onProgress: (fraction) => fractions.push(fraction),
    });
    expect(fractions.at(-1)).toBe(1);
    expect(fractions).toEqual([...fractions].sort((a, b) => a - b));
  });
});

describe('createProgressReader', () => {
  it('counts dots whatever the pieces they come in', () => {
    const whole = 'Input file size is 20, 20\n0...10...20...30...40...50...60...70...80...90...100 - done.\n';
    for (const pieceLength of [1, 3, 7, whole.length]) {
      const seen: number[] = [];
      const read = createProgressReader((fraction) => seen.push(fraction));
      for (let at = 0; at < whole.length; at += pieceLength) read(whole.slice(at, at + pieceLength));
      expect(seen.at(-1)).toBe(1);
    }
    const half: number[] = [];
    createProgressReader((fraction) => half.push(fraction))('0...10...20...30...40...5');
    expect(half.at(-1)).toBeCloseTo(0.5, 10);
  });
});
