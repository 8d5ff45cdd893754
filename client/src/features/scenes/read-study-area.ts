import {
  type ArealGeometry,
  type MultiPolygon,
  type Position,
  studyAreaSchema,
} from '../../../../shared/contracts/geometry.ts';

/** Why a file is no study area: what was found, what is wanted, what to do. */
export interface StudyAreaRefusal {
  found: string;
  wanted: string;
  advice: string;
}

export type StudyAreaReading =
  { geometry: ArealGeometry; refusal: null } | { geometry: null; refusal: StudyAreaRefusal };

class Refused extends Error {
  constructor(readonly refusal: StudyAreaRefusal) {
    super(refusal.found);
  }
}

type Json = Record<string, unknown>;
const WANTED = 'GeoJSON with polygons: a Feature, a FeatureCollection, or a Polygon or MultiPolygon geometry';
/** Names of longitude and latitude on WGS84 in the `crs` member that GeoJSON had before RFC 7946. */
const WGS84_NAMES = /^(urn:ogc:def:crs:(ogc:[\d.]*:crs84|epsg:[\d.]*:4326)|epsg:4326|ogc:crs84|crs84)$/i;

/**
 * Reads a study area out of a GeoJSON text (RFC 7946): all polygons of it together. Heights are dropped. Whether rings
 * cross themselves is for the server to say.
 */
export function readStudyArea(text: string): StudyAreaReading {
  try {
    return { geometry: readDocument(text), refusal: null };
  } catch (error) {
    if (error instanceof Refused) return { geometry: null, refusal: error.refusal };
    throw error;
  }
}

function readDocument(text: string): ArealGeometry {
  const root = parseObject(text);
  checkCrs(root['crs']);
  const polygons = readPolygons(root, 'the file');
  const geometry: ArealGeometry =
    polygons.length === 1
      ? { type: 'Polygon', coordinates: polygons[0] ?? [] }
      : { type: 'MultiPolygon', coordinates: polygons };
  const parsed = studyAreaSchema.safeParse(geometry);
  if (parsed.success) return parsed.data;
  throw new Refused({
    found: `a polygon that cannot be taken: ${parsed.error.issues[0]?.message ?? 'it does not fit'}`,
    wanted: 'rings of four to 20 000 positions, at most 50 000 in all',
    advice: 'Simplify the outline and choose the file again.',
  });
}

function parseObject(text: string): Json {
  let value: unknown;
  try {
    value = JSON.parse(text.replace(/^\uFEFF/, ''));
  } catch {
    throw new Refused({
      found: text.trim() === '' ? 'an empty file' : `no JSON: it begins with “${text.trim().slice(0, 40)}”`,
      wanted: WANTED,
      advice: 'Save the area as GeoJSON and choose that file.',
    });
  }
  if (isObject(value)) return value;
  throw new Refused({ found: 'JSON that is no object', wanted: WANTED, advice: 'Save the area as GeoJSON.' });
}

function checkCrs(crs: unknown): void {
  if (crs === undefined || crs === null) return;
  const name = isObject(crs) && isObject(crs['properties']) ? crs['properties']['name'] : undefined;
  if (typeof name === 'string' && WGS84_NAMES.test(name)) return;
  throw new Refused({
    found: `the reference system ${typeof name === 'string' ? name : JSON.stringify(crs).slice(0, 60)}`,
    wanted: 'longitude and latitude on WGS84, as RFC 7946 has it',
    advice: 'Reproject it: ogr2ogr -t_srs EPSG:4326 area.geojson your-file.',
  });
}

function readPolygons(value: Json, where: string): MultiPolygon['coordinates'] {
  const { type } = value;
  if (type === 'Polygon') return [readRings(value['coordinates'], where)];
  if (type === 'MultiPolygon') {
    return readArray(value['coordinates'], where).map((rings, i) => readRings(rings, `polygon ${i + 1} of ${where}`));
  }
  if (type === 'Feature') {
    const geometry = value['geometry'];
    if (!isObject(geometry)) throw refuseType(`a Feature without a geometry (${where})`);
    return readPolygons(geometry, where);
  }
  if (type === 'FeatureCollection' || type === 'GeometryCollection') {
    const list = readArray(value[type === 'FeatureCollection' ? 'features' : 'geometries'], where);
    if (list.length === 0) throw refuseType(`a ${type} with nothing in it`);
    const noun = type === 'FeatureCollection' ? 'feature' : 'geometry';
    return list.flatMap((one, i) => {
      if (!isObject(one)) throw refuseType(`${noun} ${i + 1} that is no object`);
      return readPolygons(one, `${noun} ${i + 1}`);
    });
  }
  if (typeof type === 'string' && /Point|LineString/.test(type)) throw refuseType(`a ${type}, in ${where}`);
  throw refuseType(
    typeof type === 'string' ? `the type “${type}”, in ${where}` : `an object without a type, in ${where}`,
  );
}

function refuseType(found: string): Refused {
  return new Refused({ found, wanted: WANTED, advice: 'Leave out what is no polygon and choose the file again.' });
}

function readRings(value: unknown, where: string): Position[][] {
  return readArray(value, where).map((ring, i) => {
    const place = i === 0 ? `the outline of ${where}` : `hole ${i} of ${where}`;
    const positions = readArray(ring, place).map((position) => readPosition(position, place));
    const [first, last] = [positions[0], positions.at(-1)];
    if (positions.length < 4 || first?.[0] !== last?.[0] || first?.[1] !== last?.[1]) {
      throw new Refused({
        found: `a ring that is not closed: ${place}`,
        wanted: 'rings of at least four positions, the last equal to the first',
        advice: 'Repeat the first position at the end of the ring.',
      });
    }
    return positions;
  });
}

function readPosition(value: unknown, place: string): Position {
  const [lon, lat] = Array.isArray(value) ? (value as unknown[]) : [];
  if (typeof lon !== 'number' || typeof lat !== 'number') {
    throw new Refused({
      found: `a position that is no pair of numbers, in ${place}`,
      wanted: '[longitude, latitude]',
      advice: 'Save the area as GeoJSON again.',
    });
  }
  if (Math.abs(lon) <= 180 && Math.abs(lat) <= 90) return [lon, lat];
  throw new Refused({
    found: `the position ${lon}, ${lat} in ${place}, which is no longitude and latitude`,
    wanted: 'longitude and latitude on WGS84 in degrees, as RFC 7946 has it',
    advice:
      'The file is probably in a projected system. Reproject it: ogr2ogr -t_srs EPSG:4326 area.geojson your-file.',
  });
}

function readArray(value: unknown, where: string): unknown[] {
  if (Array.isArray(value)) return value as unknown[];
  throw refuseType(`no list of coordinates, in ${where}`);
}

function isObject(value: unknown): value is Json {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}
