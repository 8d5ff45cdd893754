import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { BandStore } from '../../server/raster/band-store.ts';
import { getCrsTransform } from '../../server/raster/crs-transform.ts';
import { ingestBands } from '../../server/raster/ingest-bands.ts';
import { inspectSource } from '../../server/raster/inspect-source.ts';
import { probePixel } from '../../server/raster/probe.ts';
import { fillBand, makeGrid, makeRaster, runTool, useTempFolder } from './make-raster.ts';

const folder = useTempFolder();
const store = new BandStore({ decode: 'async' });
afterAll(() => store.close());

describe('probePixel', async () => {
  const grid = makeGrid({ width: 100, height: 80, originX: 420000, originY: 5800000 });
  const values = fillBand(new Uint16Array(8000), 100, (col, row) => (col === 0 ? 0 : col * 100 + row));
  const { width, height } = grid;
  const source = makeRaster(join(folder, 'source.tif'), {
    ...{ bands: [values], dtype: 'uint16', width, height, grid, srs: 'EPSG:32628', nodata: '0' },
  });
  const coarseSource = makeRaster(join(folder, 'coarse.tif'), {
    bands: [fillBand(new Uint16Array(30 * 26), 30, (col, row) => col * 100 + row)],
    dtype: 'uint16',
    width: 30,
    height: 26,
    grid: { ...grid, width: 30, height: 26, pixelWidth: 90, pixelHeight: 90 },
    srs: 'EPSG:32628',
  });
  const info = await inspectSource(source);
  await ingestBands(source, info, join(folder, 'scene'));
  await ingestBands(coarseSource, await inspectSource(coarseSource), join(folder, 'scene'), { firstFileNumber: 2 });
  const bands = [
    { path: join(folder, 'scene', 'band-01.tif'), scale: 0.0001, offset: -0.1 },
    { path: join(folder, 'scene', 'band-02.tif'), scale: 1, offset: 0 },
  ];
  const probe = (lon: number, lat: number) => probePixel({ crs: info.crs.proj4, grid, bands, lon, lat }, store);

  it('gives the pixel, its DN and its physical value in every band', async () => {
    // GDAL says where the centre of pixel (41, 22) is.
    const [x, y] = [420000 + 41.5 * 30, 5800000 - 22.5 * 30];
    const [lon, lat] = runTool('sh', ['-c', `echo ${x} ${y} | gdaltransform -s_srs EPSG:32628 -t_srs EPSG:4326`])
      .split(' ')
      .map(Number);
    const found = (await probe(lon, lat))!;
    expect(found).toMatchObject({ col: 41, row: 22, x, y });
    expect(found.values[0].dn).toBe(4122);
    expect(found.values[0].scaled).toBeCloseTo(0.3122, 12);
    // 41.5 / 3 = 13.8 and 22.5 / 3 = 7.5 on the coarse grid.
    expect(found.values[1]).toEqual({ dn: 1307, scaled: 1307 });
    expect(runTool('gdallocationinfo', ['-valonly', '-wgs84', bands[0].path, String(lon), String(lat)]).trim()).toBe(
      '4122',
    );
  });

  it('gives null where a band has no data or does not reach', async () => {
    const { toLonLat } = getCrsTransform(info.crs.proj4);
    const west = (await probe(...toLonLat(420000 + 0.5 * 30, 5800000 - 40.5 * 30)))!;
    expect(west).toMatchObject({ col: 0, row: 40 });
    expect(west.values[0]).toEqual({ dn: null, scaled: null });
    const east = (await probe(...toLonLat(420000 + 95.5 * 30, 5800000 - 40.5 * 30)))!;
    expect(east).toMatchObject({ col: 95, row: 40 });
    expect(east.values[0].dn).not.toBeNull();
    expect(east.values[1].dn).toBeNull();
  });

  it('gives null outside the scene and for impossible positions', async () => {
    expect(await probe(info.bounds.west - 0.01, info.bounds.south)).toBeNull();
    expect(await probe(100, 0)).toBeNull();
    expect(await probe(NaN, 52)).toBeNull();
  });
});
