import { getCrsTransform } from './crs-transform.ts';
import { runGdal } from './gdal-process.ts';
import { pixelToMap, type RasterGrid } from './raster-grid.ts';
import { SourceRefusal } from './source-refusal.ts';

type CrsUnit = 'metre' | 'degree' | 'foot' | 'us-survey-foot' | 'other';

export interface SourceCrs {
  /** WKT 2 as GDAL prints it. */
  wkt: string;
  /** Proj string that brings WGS84 onto this CRS within a tenth of a pixel over the scene, datum shift included. */
  proj4: string;
  epsg: number | null;
  name: string;
  unit: CrsUnit;
}

interface MapPoint {
  x: number;
  y: number;
  lon: number;
  lat: number;
}

const maxErrorPixels = 0.1;
const probesPerSide = 5;

/**
 * Resolves a WKT to a proj string that is right over the given grid.
 * A proj string can't name a datum-shift grid, so where it disagrees with GDAL, which can, the three-parameter geocentric
 * shift that fits GDAL over this grid is added (IOGP Guidance Note 7-2, geocentric translations, EPSG method 9603).
 * @throws {SourceRefusal} `unsupported-crs` when no proj string comes within a tenth of a pixel of GDAL.
 */
export async function resolveCrs(wkt: string, grid: RasterGrid, signal?: AbortSignal): Promise<SourceCrs> {
  const name = /^\w+\["((?:[^"]|"")*)"/.exec(wkt)?.[1].replaceAll('""', '"') ?? 'unnamed';
  const { stdout } = await runGdal('gdalsrsinfo', ['-o', 'proj4', wkt], { origin: 'own', signal });
  const plain = stdout.trim();
  const refuse = (found: string): SourceRefusal =>
    new SourceRefusal(
      'unsupported-crs',
      found,
      'a coordinate reference system that can be written as a proj string',
      'Reproject the file, for example with gdalwarp -t_srs to the UTM zone of the area, and upload the result.',
    );
  if (!plain.startsWith('+proj=')) throw refuse(`the coordinate reference system "${name}"`);

  const points = await locateProbes(wkt, grid, signal);
  if (points.length === 0) throw refuse(`positions outside the domain of "${name}"`);
  if (!isComputable(plain)) throw refuse(`"${name}", whose projection can't be computed here`);
  let errorPixels = Infinity;
  for (const buildProjString of [() => plain, () => fitDatumShift(plain, points)]) {
    const projString = buildProjString();
    errorPixels = measureError(projString, points, grid);
    if (errorPixels <= maxErrorPixels) {
      return { wkt, proj4: projString, epsg: readEpsgCode(wkt), name, unit: readUnit(projString) };
    }
  }
  throw refuse(`"${name}", which its proj string places ${errorPixels.toFixed(1)} pixels off`);
}

function isComputable(projString: string): boolean {
  try {
    getCrsTransform(projString);
    return true;
  } catch {
    // The only way proj4 has to say that it knows no such projection.
    return false;
  }
}

/** The EPSG code that stands for the whole CRS: the last identifier of its WKT 2. */
function readEpsgCode(wkt: string): number | null {
  const match = /ID\["EPSG",(\d+)\]\]\s*$/.exec(wkt);
  return match === null ? null : Number(match[1]);
}

function readUnit(projString: string): CrsUnit {
  if (getCrsTransform(projString).isGeographic) return 'degree';
  const unit = /\+units=(\S+)/.exec(projString)?.[1];
  if (unit === 'm') return 'metre';
  if (unit === 'ft') return 'foot';
  if (unit === 'us-ft') return 'us-survey-foot';
  return 'other';
}

/** GDAL's WGS84 position of a lattice of points over the grid; points GDAL can't place are left out. */
async function locateProbes(wkt: string, grid: RasterGrid, signal: AbortSignal | undefined): Promise<MapPoint[]> {
  const positions: [number, number][] = [];
  for (let i = 0; i < probesPerSide; i++) {
    for (let j = 0; j < probesPerSide; j++) {
      // Just inside the edge: a global grid's edge is where longitude turns over.
      const t = (k: number): number => 0.001 + (0.998 * k) / (probesPerSide - 1);
      positions.push(pixelToMap(grid, grid.width * t(j), grid.height * t(i)));
    }
  }
  const { stdout } = await runGdal('gdaltransform', ['-s_srs', wkt, '-t_srs', 'EPSG:4326', '-output_xy'], {
    origin: 'own',
    signal,
    stdin: positions.map(([x, y]) => `${x} ${y}`).join('\n') + '\n',
  });
  const lines = stdout.trim().split('\n');
  return positions
    .map(([x, y], index) => {
      const [lon, lat] = (lines[index] ?? '').trim().split(/\s+/).map(Number);
      return { x, y, lon, lat };
    })
    .filter((point) => Number.isFinite(point.lon) && Number.isFinite(point.lat) && Math.abs(point.lat) <= 90);
}

/** Largest distance, in pixels of the grid, between where the proj string and GDAL put the same point. */
function measureError(projString: string, points: readonly MapPoint[], grid: RasterGrid): number {
  const transform = getCrsTransform(projString);
  let worst = 0;
  for (const { x, y, lon, lat } of points) {
    const [atX, atY] = transform.fromLonLat(lon, lat);
    let dx = Math.abs(atX - x);
    if (transform.isGeographic) dx = Math.min(dx, Math.abs(dx - 360));
    const error = Math.max(dx / grid.pixelWidth, Math.abs(atY - y) / grid.pixelHeight);
    if (Number.isNaN(error)) return Infinity;
    worst = Math.max(worst, error);
  }
  return worst;
}

/**
 * Adds the `+towgs84=dx,dy,dz` that brings the proj string's own datum onto GDAL's WGS84 positions (least squares,
 * which for a translation is the mean difference of geocentric coordinates).
 */
function fitDatumShift(projString: string, points: readonly MapPoint[]): string {
  const withoutDatum = projString.replace(/\+(towgs84|nadgrids|datum)=\S+\s*/g, (all, key: string) =>
    key === 'datum' ? ellipsoidOfDatum(all) : '',
  );
  const ellipsoid = readEllipsoid(withoutDatum);
  if (ellipsoid === null) return projString;
  const sums = [0, 0, 0];
  let n = 0;
  const ownDatum = getOwnDatumInverse(withoutDatum);
  for (const { x, y, lon, lat } of points) {
    const [ownLon, ownLat] = ownDatum(x, y);
    if (Number.isNaN(ownLon)) continue;
    const wanted = toGeocentric(lon, lat, 6378137, 1 / 298.257223563);
    const own = toGeocentric(ownLon, ownLat, ellipsoid.a, ellipsoid.f);
    for (let axis = 0; axis < 3; axis++) sums[axis] += wanted[axis] - own[axis];
    n++;
  }
  if (n === 0) return projString;
  return `${withoutDatum} +towgs84=${sums.map((sum) => (sum / n).toFixed(4)).join(',')}`.replace(/\s+/g, ' ');
}

function ellipsoidOfDatum(term: string): string {
  return /NAD27/.test(term) ? '+ellps=clrk66 ' : /NAD83/.test(term) ? '+ellps=GRS80 ' : '+ellps=WGS84 ';
}

/** Inverse projection without any datum shift: the CRS's own longitude and latitude. */
function getOwnDatumInverse(projString: string): (x: number, y: number) => [number, number] {
  // A proj string without a datum is taken by proj4 as already on WGS84, so its inverse is the plain projection.
  const transform = getCrsTransform(projString);
  return (x, y) => (transform.isGeographic ? [x, y] : transform.toLonLat(x, y));
}

const ellipsoids: Record<string, { a: number; f: number }> = {
  WGS84: { a: 6378137, f: 1 / 298.257223563 },
  GRS80: { a: 6378137, f: 1 / 298.257222101 },
  airy: { a: 6377563.396, f: 1 / 299.3249646 },
  mod_airy: { a: 6377340.189, f: 1 / 299.3249646 },
  bessel: { a: 6377397.155, f: 1 / 299.1528128 },
  bess_nam: { a: 6377483.865, f: 1 / 299.1528128 },
  clrk66: { a: 6378206.4, f: 1 / 294.978698213898 },
  clrk80: { a: 6378249.145, f: 1 / 293.4663 },
  clrk80ign: { a: 6378249.2, f: 1 / 293.4660212936269 },
  intl: { a: 6378388, f: 1 / 297 },
  krass: { a: 6378245, f: 1 / 298.3 },
  aust_SA: { a: 6378160, f: 1 / 298.25 },
  GRS67: { a: 6378160, f: 1 / 298.247167427 },
  evrst30: { a: 6377276.345, f: 1 / 300.8017 },
  helmert: { a: 6378200, f: 1 / 298.3 },
  WGS72: { a: 6378135, f: 1 / 298.26 },
};

function readEllipsoid(projString: string): { a: number; f: number } | null {
  const ellps = /\+ellps=(\S+)/.exec(projString)?.[1];
  if (ellps !== undefined) return ellipsoids[ellps] ?? null;
  const a = Number(/\+a=(\S+)/.exec(projString)?.[1]);
  const b = Number(/\+b=(\S+)/.exec(projString)?.[1]);
  const rf = Number(/\+rf=(\S+)/.exec(projString)?.[1]);
  if (!Number.isFinite(a)) return null;
  if (Number.isFinite(rf)) return { a, f: 1 / rf };
  return Number.isFinite(b) ? { a, f: (a - b) / a } : null;
}

/** Geocentric X, Y, Z in metres of a point on the ellipsoid (IOGP Guidance Note 7-2, EPSG method 9602, height 0). */
function toGeocentric(lon: number, lat: number, a: number, f: number): [number, number, number] {
  const lambda = (lon * Math.PI) / 180;
  const phi = (lat * Math.PI) / 180;
  const eSquared = f * (2 - f);
  const nu = a / Math.sqrt(1 - eSquared * Math.sin(phi) ** 2);
  return [
    nu * Math.cos(phi) * Math.cos(lambda),
    nu * Math.cos(phi) * Math.sin(lambda),
    nu * (1 - eSquared) * Math.sin(phi),
  ];
}
