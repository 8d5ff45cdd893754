import proj4, { type Converter } from 'proj4';

/** Coordinates in and out of a CRS; a point the projection can't take comes back as NaN, NaN. */
export interface CrsTransform {
  readonly isGeographic: boolean;
  /** WGS84 degrees to CRS units. */
  fromLonLat(lon: number, lat: number): [number, number];
  /** CRS units to WGS84 degrees, longitude within −180…180. */
  toLonLat(x: number, y: number): [number, number];
}

const wgs84 = '+proj=longlat +datum=WGS84 +no_defs';
const transforms = new Map<string, CrsTransform>();
const maxCachedTransforms = 64;
const unknownPoint: [number, number] = [NaN, NaN];

/**
 * The transform between WGS84 and the CRS of a proj string, built once and kept.
 * @throws {Error} when proj4 knows no such projection.
 */
export function getCrsTransform(projString: string): CrsTransform {
  let transform = transforms.get(projString);
  if (transform === undefined) {
    transform = createCrsTransform(projString);
    if (transforms.size >= maxCachedTransforms) transforms.clear();
    transforms.set(projString, transform);
  }
  return transform;
}

function createCrsTransform(projString: string): CrsTransform {
  const converter = createConverter(projString);
  const run = (direction: 'forward' | 'inverse', a: number, b: number): [number, number] => {
    if (!Number.isFinite(a) || !Number.isFinite(b)) return unknownPoint;
    let point: number[];
    try {
      point = converter[direction]([a, b]);
    } catch {
      // proj4 throws for a point outside a projection's domain; that is an answer here: there is no such point.
      return unknownPoint;
    }
    return Number.isFinite(point[0]) && Number.isFinite(point[1]) ? [point[0], point[1]] : unknownPoint;
  };
  return {
    isGeographic: /\+proj=(longlat|latlong|lonlat|latlon)\b/.test(projString),
    fromLonLat: (lon, lat) => run('forward', lon, lat),
    toLonLat: (x, y) => {
      const [lon, lat] = run('inverse', x, y);
      return [wrapLongitude(lon), lat];
    },
  };
}

function createConverter(projString: string): Converter {
  try {
    return proj4(wgs84, projString);
  } catch (error) {
    // proj4 throws bare strings.
    throw new Error(`proj4 can't compute "${projString}": ${error instanceof Error ? error.message : String(error)}`);
  }
}

/** Longitude brought into −180…180; exactly ±180 is kept as it is. */
export function wrapLongitude(lon: number): number {
  if (!(lon > 180 || lon < -180)) return lon;
  return ((((lon + 180) % 360) + 360) % 360) - 180;
}
