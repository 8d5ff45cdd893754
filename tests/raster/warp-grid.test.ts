import proj4 from 'proj4';
import { describe, expect, it } from 'vitest';
import { getCrsTransform, wrapLongitude } from '../../server/raster/crs-transform.ts';
import {
  getSceneGeometry,
  getTileBounds,
  intersectBounds,
  validateTileAddress,
} from '../../server/raster/tile-geometry.ts';
import { buildWarpGrid } from '../../server/raster/warp-grid.ts';
import type { RasterGrid } from '../../server/raster/raster-grid.ts';
import { makeGrid } from './make-raster.ts';

const utm = (zone: number, south = false): string =>
  `+proj=utm +zone=${zone}${south ? ' +south' : ''} +datum=WGS84 +units=m +no_defs`;

describe('getCrsTransform', () => {
  it('agrees with published and independently computed UTM positions', () => {
    // PROJ 9.1.1; the third also GeographicLib; the northing of 6°E the same from both neighbouring zones.
    const cases: [number, boolean, number, number, number, number][] = [
      [33, false, 15, 52, 500000, 5761038.2126],
      [33, false, 12.5, 41.9, 292624.8753, 4641695.8779],
      [18, false, -73.5, 40.5, 627103.0873, 4484335.4017],
      [34, true, 18.4, -33.9, 259583.2217, 6245888.0454],
      [60, true, 174.7, -36.9, 295071.8648, 5913750.4673],
      [31, false, 5.999999, 60, 667294.7654, 6655205.4811],
      [32, false, 6.000001, 60, 332705.2346, 6655205.4811],
    ];
    for (const [zone, south, lon, lat, easting, northing] of cases) {
      const transform = getCrsTransform(utm(zone, south));
      const [x, y] = transform.fromLonLat(lon, lat);
      expect(Math.abs(x - easting)).toBeLessThan(0.001);
      expect(Math.abs(y - northing)).toBeLessThan(0.001);
      const [backLon, backLat] = transform.toLonLat(easting, northing);
      expect(backLon).toBeCloseTo(lon, 8);
      expect(backLat).toBeCloseTo(lat, 8);
    }
  });

  it('reproduces the worked examples on other ellipsoids', () => {
    // IOGP Guidance Note 7-2, EPSG method 9807: the OSGB example, without datum shift.
    const british = proj4(
      '+proj=longlat +ellps=airy',
      '+proj=tmerc +lat_0=49 +lon_0=-2 +k=0.9996012717 +x_0=400000 +y_0=-100000 +ellps=airy',
    );
    const [e, n] = british.forward([0.5, 50.5]);
    expect(Math.abs(e - 577274.99)).toBeLessThan(0.01);
    expect(Math.abs(n - 69740.5)).toBeLessThan(0.01);
    // Snyder 1987, USGS PP 1395, numerical example: Clarke 1866, 40°30′N 73°30′W.
    const [x, y] = proj4('+proj=longlat +ellps=clrk66', '+proj=utm +zone=18 +ellps=clrk66').forward([-73.5, 40.5]);
    expect(Math.abs(x - 627106.5)).toBeLessThan(0.05);
    expect(Math.abs(y - 4484124.4)).toBeLessThan(0.05);
  });

  it('answers NaN for a point the projection can not take, and throws for an unknown projection', () => {
    expect(getCrsTransform(utm(28)).fromLonLat(75, 0)).toEqual([NaN, NaN]);
    expect(getCrsTransform(utm(28)).fromLonLat(NaN, 0)).toEqual([NaN, NaN]);
    expect(() => getCrsTransform('+proj=nosuch')).toThrow(/nosuch/);
    expect([190, -190, 180, -180, 540].map(wrapLongitude)).toEqual([-170, 170, 180, -180, -180]);
  });
});

describe('tile geometry', () => {
  it('gives tile z10 x486 y332 its documented bounds', () => {
    // Documentation of the general-purpose library mercantile; recomputed.
    const bounds = getTileBounds({ z: 10, x: 486, y: 332 });
    expect(bounds.west).toBe(-9.140625);
    expect(bounds.east).toBe(-8.7890625);
    expect(bounds.south).toBeCloseTo(53.120405283106564, 12);
    expect(bounds.north).toBeCloseTo(53.33087298301705, 12);
  });

  it('ends at the latitude where the Web Mercator square does', () => {
    // OGC Two Dimensional Tile Matrix Set, WebMercatorQuad.
    expect(getTileBounds({ z: 0, x: 0, y: 0 })).toMatchObject({ west: -180, east: 180 });
    expect(getTileBounds({ z: 0, x: 0, y: 0 }).north).toBeCloseTo(85.0511287798066, 10);
  });

  it('refuses tiles that do not exist', () => {
    expect(() => validateTileAddress({ z: 3, x: 7, y: 7, size: 256 })).not.toThrow();
    for (const bad of [{ x: 8 }, { y: -1 }, { z: 25 }, { x: 0.5 }, { size: 300 }]) {
      expect(() => validateTileAddress({ z: 3, x: 7, y: 7, size: 256, ...bad })).toThrow(RangeError);
    }
  });

  it('intersects boxes with bounds across the antimeridian', () => {
    const across = { west: 178, south: -10, east: -179, north: 10 };
    const box = { south: -5, north: 5 };
    expect(intersectBounds({ west: -180, east: -170, ...box }, across)).toMatchObject({ west: -180, east: -179 });
    expect(intersectBounds({ west: 170, east: 180, ...box }, across)).toMatchObject({ west: 178, east: 180 });
    expect(intersectBounds({ west: -10, east: 10, ...box }, across)).toBeNull();
    expect(intersectBounds({ west: 170, east: 180, south: 11, north: 12 }, across)).toBeNull();
  });
});

interface Scene {
  name: string;
  crs: string;
  grid: RasterGrid;
  lon: number;
  lat: number;
}
const big = { width: 7600, height: 7800 };
const scenes: Scene[] = [
  {
    name: 'UTM north',
    crs: utm(28),
    grid: makeGrid({ ...big, originX: 400000, originY: 5900000 }),
    lon: -14.8,
    lat: 52.1,
  },
  {
    name: 'UTM south',
    crs: utm(34, true),
    grid: makeGrid({ ...big, originX: 250000, originY: 6300000 }),
    lon: 19,
    lat: -34.2,
  },
  {
    name: 'UTM at 75° N',
    crs: utm(33),
    grid: makeGrid({ ...big, originX: 400000, originY: 8450000 }),
    lon: 15,
    lat: 75,
  },
  {
    name: 'degrees',
    crs: '+proj=longlat +datum=WGS84 +no_defs',
    grid: makeGrid({ ...big, originX: 5, originY: 62, pixelWidth: 0.0003, pixelHeight: 0.0003 }),
    lon: 6,
    lat: 61,
  },
  {
    name: 'degrees across the antimeridian',
    crs: '+proj=longlat +datum=WGS84 +no_defs',
    grid: makeGrid({ ...big, originX: 179, originY: 1, pixelWidth: 0.0003, pixelHeight: 0.0003 }),
    lon: -179.7,
    lat: 0.2,
  },
  {
    name: 'polar stereographic over the pole',
    crs: '+proj=stere +lat_0=-90 +lat_ts=-71 +lon_0=0 +x_0=0 +y_0=0 +datum=WGS84 +units=m +no_defs',
    grid: makeGrid({ ...big, originX: -1500000, originY: 1500000, pixelWidth: 400, pixelHeight: 400 }),
    lon: 100,
    lat: -82,
  },
  {
    name: 'Lambert conic',
    crs: '+proj=lcc +lat_0=46.5 +lon_0=3 +lat_1=49 +lat_2=44 +x_0=700000 +y_0=6600000 +ellps=GRS80 +towgs84=0,0,0 +units=m',
    grid: makeGrid({ ...big, originX: 600000, originY: 6900000 }),
    lon: 3,
    lat: 48.5,
  },
];

function tileAt(lon: number, lat: number, z: number): { z: number; x: number; y: number; size: number } {
  const n = 2 ** z;
  const phi = (lat * Math.PI) / 180;
  const y = Math.floor(((1 - Math.asinh(Math.tan(phi)) / Math.PI) / 2) * n);
  return { z, x: Math.floor(((lon + 180) / 360) * n), y, size: 256 };
}

describe('buildWarpGrid', () => {
  it.each(scenes)('stays within a third of a pixel of the exact transform: $name', ({ crs, grid, lon, lat }) => {
    const geometry = getSceneGeometry(grid, crs);
    let nCompared = 0;
    for (let z = 0; z <= 16; z += 2) {
      const tile = tileAt(lon, lat, z);
      const warp = buildWarpGrid(tile, geometry);
      if (warp === null) throw new Error(`the scene is not on tile ${z}/${tile.x}/${tile.y}`);
      // Of the scene's own pixels, or of the tile's where a tile pixel spans several.
      const unit = Math.max(1, warp.pixelsPerTilePixel);
      const n = 2 ** z;
      let worst = 0;
      for (let i = 0; i < 65536; i += 7) {
        const u = (tile.x + ((i % 256) + 0.5) / 256) / n;
        const v = (tile.y + (Math.floor(i / 256) + 0.5) / 256) / n;
        const exactLat = (Math.atan(Math.sinh(Math.PI * (1 - 2 * v))) * 180) / Math.PI;
        const [col, row] = geometry.toPixel(u * 360 - 180, exactLat);
        if (!(col >= 0 && col < grid.width && row >= 0 && row < grid.height)) {
          // A pixel that is not on the scene must not be drawn as if it were, beyond the error allowed at the edge.
          const isDrawn =
            warp.cols[i] >= unit &&
            warp.cols[i] < grid.width - unit &&
            warp.rows[i] >= unit &&
            warp.rows[i] < grid.height - unit;
          expect(isDrawn).toBe(false);
          continue;
        }
        worst = Math.max(worst, Math.hypot(warp.cols[i] - col, warp.rows[i] - row) / unit);
        nCompared++;
        if (Number.isNaN(warp.cols[i]))
          throw new Error(`pixel ${i} of ${z}/${tile.x}/${tile.y} is on the scene but left out`);
      }
      expect(worst).toBeLessThan(1 / 3);
    }
    expect(nCompared).toBeGreaterThan(20000);
  });

  it('needs far fewer exact projections than pixels at working zooms', () => {
    const { crs, grid, lon, lat } = scenes[0];
    for (const z of [8, 10, 12, 14]) {
      expect(buildWarpGrid(tileAt(lon, lat, z), getSceneGeometry(grid, crs))!.nExact).toBeLessThan(2000);
    }
  });

  it('measures how many scene pixels a tile pixel spans', () => {
    const { crs, grid, lon, lat } = scenes[0];
    const warp = buildWarpGrid(tileAt(lon, lat, 12), getSceneGeometry(grid, crs))!;
    // 38.2185 m at the equator (OGC, z12), times cos 52.1°, over 30 m; UTM's scale factor is within 0.1 %.
    expect(warp.pixelsPerTilePixel).toBeCloseTo((38.2185 * Math.cos((52.1 * Math.PI) / 180)) / 30, 2);
  });

  it('misses tiles that miss the scene', () => {
    const geometry = getSceneGeometry(scenes[0].grid, scenes[0].crs);
    expect(buildWarpGrid(tileAt(20, 52, 8), geometry)).toBeNull();
    expect(buildWarpGrid(tileAt(-14.8, -52, 4), geometry)).toBeNull();
  });
});
