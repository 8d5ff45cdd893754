import { mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { checkGdalInfo, defaultSourceLimits, inspectSource } from '../../server/raster/inspect-source.ts';
import type { GdalInfo, SourceInfo } from '../../server/raster/inspect-source.ts';
import { SourceRefusal } from '../../server/raster/source-refusal.ts';
import { makeGrid, makeRaster, runTool, useTempFolder, type RasterSpec } from './make-raster.ts';

const folder = useTempFolder();
let count = 0;

function make(overrides: Partial<RasterSpec>): string {
  const grid = overrides.grid ?? makeGrid();

  const extension = overrides.format === 'JP2OpenJPEG' ? 'jp2' : 'tif';
  return makeRaster(join(folder, `source-${count++}.${extension}`), {
    bands: [new Uint8Array(grid.width * grid.height).fill(7)],
    dtype: 'uint8',
    width: grid.width,
    height: grid.height,
    grid,
    srs: 'EPSG:32628',
    ...overrides,
  });
}

async function refusalOf(inspection: Promise<SourceInfo>): Promise<SourceRefusal> {
  const outcome = await inspection.then(
    () => null,
    (error: unknown) => error,
  );
  expect(outcome).toBeInstanceOf(SourceRefusal);
  const refusal = outcome as SourceRefusal;
  for (const text of [refusal.found, refusal.wanted, refusal.advice]) expect(text.length).toBeGreaterThan(3);
  expect(refusal.message).not.toContain(folder);
  return refusal;
}

describe('inspectSource', () => {
  it('describes grid, CRS and bands of a UTM raster', async () => {
    const path = make({
      bands: [new Uint16Array(2400), new Uint16Array(2400)],
      dtype: 'uint16',
      nodata: '0',
      args: ['-a_scale', '0.0001', '-a_offset', '-0.1'],
    });
    const info = await inspectSource(path);
    expect(info).toMatchObject({
      driver: 'GTiff',
      width: 60,
      height: 40,
      transform: { originX: 500000, originY: 5000000, pixelWidth: 30, pixelHeight: 30 },
      crs: { epsg: 32628, name: 'WGS 84 / UTM zone 28N', unit: 'metre' },
      maskKind: 'none',
    });
    expect(info.bands).toHaveLength(2);
    expect(info.bands[1]).toMatchObject({ index: 2, dtype: 'uint16', nodata: 0, scale: 0.0001, offset: -0.1 });
  });

  it('puts the corners of tile T32TQR where its published metadata has them', async () => {
    // GDAL SENTINEL2 driver page, gdalinfo of tile T32TQR: corners in degrees, minutes and seconds to 0.01″.
    const path = make({
      srs: 'EPSG:32632',
      grid: makeGrid({ width: 61, height: 61, originX: 699960, originY: 5100060, pixelWidth: 1800, pixelHeight: 1800 }),
    });
    const { footprint, bounds } = await inspectSource(path);
    const ring = footprint.coordinates[0] as [number, number][];
    const published = [
      [11.583573987, 46.024904544],
      [11.538730738, 45.037573984],
      [12.930070283, 44.998126456],
      [12.999359414, 45.984083912],
    ];
    published.forEach(([lon, lat], corner) => {
      expect(ring[corner * 20][0]).toBeCloseTo(lon, 7);
      expect(ring[corner * 20][1]).toBeCloseTo(lat, 7);
    });
    expect(ring).toHaveLength(81);
    expect(ring[0]).toEqual(ring[80]);
    // The southern edge sags below its corners' straight line, so only the dense outline bounds it.
    expect(bounds.north).toBeCloseTo(46.0249, 3);
    expect(bounds.west).toBeCloseTo(11.5387, 3);
  });

  it('reads southern UTM, geographic, polar, feet and JPEG 2000 rasters', async () => {
    const south = await inspectSource(make({ srs: 'EPSG:32733', grid: makeGrid({ originY: 6250000 }) }));
    expect(south.bounds.north).toBeLessThan(0);
    const degrees = { originX: -15.5, originY: 52.5, pixelWidth: 0.001, pixelHeight: 0.001 };
    const geographic = await inspectSource(make({ srs: 'EPSG:4326', grid: makeGrid(degrees) }));
    expect(geographic.crs).toMatchObject({ unit: 'degree', epsg: 4326 });
    expect(geographic.bounds).toEqual({ west: -15.5, south: 52.46, east: -15.44, north: 52.5 });
    const polar = await inspectSource(make({ srs: 'EPSG:3031', grid: makeGrid({ originX: 1e6, originY: 1e6 }) }));
    expect(polar.bounds.south).toBeGreaterThan(-90);
    expect(polar.bounds.north).toBeLessThan(-70);
    const feet = await inspectSource(make({ srs: 'EPSG:2264', grid: makeGrid({ originX: 2e6, originY: 5e5 }) }));
    expect(feet.crs.unit).toBe('us-survey-foot');
    const jp2 = await inspectSource(
      make({ format: 'JP2OpenJPEG', args: ['-co', 'REVERSIBLE=YES', '-co', 'QUALITY=100'] }),
    );
    expect(jp2).toMatchObject({ driver: 'JP2OpenJPEG', crs: { epsg: 32628 } });
  });

  it('finds the datum shift that a plain proj string of the British grid lacks', async () => {
    const path = make({ srs: 'EPSG:27700', grid: makeGrid({ originX: 400000, originY: 400000 }) });
    const { crs, bounds } = await inspectSource(path);
    expect(crs.proj4).toContain('+towgs84=');
    // The reference is GDAL's own transform of the corner; without a shift it would be about 100 m, 0.001°, away.
    const corner = runTool('sh', ['-c', 'echo 400000 400000 | gdaltransform -s_srs EPSG:27700 -t_srs EPSG:4326']);
    const [lon, lat] = corner.split(' ').map(Number);
    expect(bounds.west).toBeCloseTo(lon, 5);
    expect(bounds.north).toBeCloseTo(lat, 5);
  });

  it('cuts the footprint of a scene across the antimeridian', async () => {
    const path = make({
      srs: 'EPSG:32660',
      grid: makeGrid({ originX: 800000, originY: 500000, pixelWidth: 3000, pixelHeight: 3000 }),
    });
    const { footprint, bounds } = await inspectSource(path);
    expect(footprint.type).toBe('MultiPolygon');
    expect(bounds.west).toBeGreaterThan(178);
    expect(bounds.east).toBeLessThan(-177);
    for (const [lon] of footprint.coordinates.flat(2) as unknown as [number, number][]) {
      expect(Math.abs(lon)).toBeLessThanOrEqual(180);
    }
  });

  it('bounds a scene over a pole by the whole parallel', async () => {
    const grid = makeGrid({ originX: -1e6, originY: 1e6, pixelWidth: 40000, pixelHeight: 50000 });
    const { bounds } = await inspectSource(make({ srs: 'EPSG:3413', grid }));
    expect(bounds).toMatchObject({ west: -180, east: 180, north: 90 });
  });

  it('keeps NaN and drops a nodata value the type can not have', async () => {
    const float = make({ bands: [new Float32Array(2400)], dtype: 'float32', nodata: 'nan' });
    expect((await inspectSource(float)).bands[0].nodata).toBeNaN();
    const described: GdalInfo = {
      size: [2, 2],
      coordinateSystem: { wkt: 'PROJCRS["any"]' },
      geoTransform: [0, 1, 0, 0, 0, -1],
      bands: [
        { band: 1, type: 'Byte', noDataValue: -9999 },
        { band: 2, type: 'Byte', noDataValue: 0 },
      ],
    };
    const { bands } = checkGdalInfo(described, defaultSourceLimits);
    expect(bands.map((band) => band.nodata)).toEqual([null, 0]);
    const signed = await inspectSource(
      make({ bands: [new Int8Array(2400)], dtype: 'int8', args: ['-co', 'PIXELTYPE=SIGNEDBYTE'] }),
    );
    expect(signed.bands[0].dtype).toBe('int8');
  });

  it('names an alpha band as a mask and leaves it out of the bands', async () => {
    const info = await inspectSource(
      make({ bands: [new Uint8Array(2400), new Uint8Array(2400)], colorInterp: ['Gray', 'Alpha'] }),
    );
    expect(info.maskKind).toBe('alpha');
    expect(info.bands.map((band) => band.index)).toEqual([1]);
  });
});

describe('inspectSource refuses', () => {
  it('text, a cut-off file, a VRT and an image of another format as not a raster', async () => {
    const text = join(folder, 'notes.tif');
    writeFileSync(text, 'not an image');
    expect((await refusalOf(inspectSource(text))).code).toBe('not-a-raster');
    const cut = join(folder, 'cut.tif');
    writeFileSync(cut, Buffer.from([0x49, 0x49, 42, 0, 8, 0, 0, 0, 200]));
    expect((await refusalOf(inspectSource(cut))).code).toBe('not-a-raster');
    const vrt = join(folder, 'linked.tif');
    runTool('gdal_translate', ['-q', '-of', 'VRT', make({}), vrt]);
    expect((await refusalOf(inspectSource(vrt))).code).toBe('not-a-raster');
    const png = join(folder, 'picture.png');
    runTool('gdal_translate', ['-q', '-of', 'PNG', make({}), png]);
    expect((await refusalOf(inspectSource(png))).code).toBe('not-a-raster');
    mkdirSync(join(folder, 'folder.tif'));
    expect((await refusalOf(inspectSource(join(folder, 'folder.tif')))).code).toBe('not-a-raster');
  });

  it('a raster without CRS, and does not take one from a sidecar file', async () => {
    const path = make({ srs: undefined });
    writeFileSync(`${path}.aux.xml`, '<PAMDataset><SRS>EPSG:32628</SRS></PAMDataset>');
    expect((await refusalOf(inspectSource(path))).code).toBe('no-crs');
    const local = make({ srs: 'LOCAL_CS[&quot;site&quot;,UNIT[&quot;metre&quot;,1]]' });
    expect((await refusalOf(inspectSource(local))).code).toBe('no-crs');
  });

  it('a raster without transform, and does not take one from a world file', async () => {
    const path = make({ grid: undefined, width: 60, height: 40 });
    writeFileSync(path.replace(/tif$/, 'tfw'), '30\n0\n0\n-30\n500015\n4999985\n');
    expect((await refusalOf(inspectSource(path))).code).toBe('no-transform');
    const points = [
      '-gcp',
      '0',
      '0',
      '500000',
      '5000000',
      '-gcp',
      '60',
      '0',
      '501800',
      '5000000',
      '-gcp',
      '0',
      '40',
      '500000',
      '4998800',
    ];
    const withPoints = make({ grid: undefined, width: 60, height: 40, args: points });
    expect(await refusalOf(inspectSource(withPoints))).toMatchObject({
      code: 'no-transform',
      found: 'ground control points instead of a transform',
    });
  });

  it('a rotated raster and one with rows from south to north', async () => {
    const rotated = make({ geoTransform: [500000, 30, 1, 5000000, 1, -30] });
    expect((await refusalOf(inspectSource(rotated))).code).toBe('rotated');
    const upsideDown = make({ geoTransform: [500000, 30, 0, 5000000, 0, 30] });
    expect((await refusalOf(inspectSource(upsideDown))).code).toBe('rotated');
  });

  it('complex and 64-bit integer samples', async () => {
    for (const [type, code] of [
      ['CFloat32', 'complex'],
      ['CInt16', 'complex'],
      ['Int64', 'unsupported-type'],
    ]) {
      expect((await refusalOf(inspectSource(make({ args: ['-ot', type] })))).code).toBe(code);
    }
  });

  it('more than 64 bands, and more pixels than the limit', async () => {
    const many = make({ bands: Array.from({ length: 65 }, () => new Uint8Array(2400)) });
    const tooMany = await refusalOf(inspectSource(many));
    expect(tooMany).toMatchObject({ code: 'too-many-bands', found: '65 bands' });
    const limits = { ...defaultSourceLimits, maxPixels: 2399 };
    expect((await refusalOf(inspectSource(make({}), { limits }))).code).toBe('too-many-pixels');
    const exactly = await inspectSource(make({}), { limits: { ...limits, maxPixels: 2400 } });
    expect(exactly.width * exactly.height).toBe(2400);
  });

  it('a grid whose numbers are none, and reads what says so in words', async () => {
    // The first number of the tag that holds the pixel's size, 30 m.
    const pixelSize = Buffer.alloc(16);
    pixelSize.writeDoubleLE(30, 0);
    pixelSize.writeDoubleLE(30, 8);
    for (const number of [NaN, Infinity]) {
      const path = make({});
      const bytes = readFileSync(path);
      const at = bytes.indexOf(pixelSize);
      expect(at).toBeGreaterThan(0);
      bytes.writeDoubleLE(number, at);
      writeFileSync(path, bytes);
      expect((await refusalOf(inspectSource(path))).code).toBe('no-transform');
    }
    const { bands } = await inspectSource(make({ args: ['-mo', 'NOTE=1, nan, inf', '-a_nodata', 'nan'] }));
    expect(bands).toHaveLength(1);
  });

  it('a container without bands', () => {
    const info: GdalInfo = { driverShortName: 'GTiff', size: [512, 512], bands: [] };
    expect(() => checkGdalInfo(info, defaultSourceLimits)).toThrowError(SourceRefusal);
    expect(() => checkGdalInfo(info, defaultSourceLimits)).toThrowError(/no bands/);
  });

  it('a projection that can not be computed here', async () => {
    const path = make({ srs: '+proj=igh +lon_0=0 +datum=WGS84 +units=m', grid: makeGrid({ originX: 0, originY: 0 }) });
    expect((await refusalOf(inspectSource(path))).code).toBe('unsupported-crs');
  });
});
