import { describe, expect, it } from 'vitest';
import { readStudyArea } from '../../../../client/src/features/scenes/read-study-area.ts';

const ring = [
  [-16.6, 59.3],
  [-16.3, 59.3],
  [-16.3, 59.5],
  [-16.6, 59.3],
];
const polygon = { type: 'Polygon', coordinates: [ring] };
const feature = (geometry: unknown) => ({ type: 'Feature', properties: {}, geometry });
const read = (value: unknown) => readStudyArea(JSON.stringify(value));

describe('a study area out of GeoJSON', () => {
  it('may be a geometry, a Feature, a FeatureCollection or a GeometryCollection', () => {
    for (const value of [
      polygon,
      feature(polygon),
      { type: 'FeatureCollection', features: [feature(polygon)] },
      { type: 'GeometryCollection', geometries: [polygon] },
    ]) {
      expect(read(value)).toEqual({ geometry: polygon, refusal: null });
    }
  });

  it('joins all polygons into one area', () => {
    const { geometry } = read({
      type: 'FeatureCollection',
      features: [feature(polygon), feature({ type: 'MultiPolygon', coordinates: [[ring], [ring]] })],
    });
    expect(geometry).toEqual({ type: 'MultiPolygon', coordinates: [[ring], [ring], [ring]] });
  });

  it('drops heights and takes a byte-order mark', () => {
    const high = { type: 'Polygon', coordinates: [ring.map(([lon, lat]) => [lon, lat, 120])] };
    expect(readStudyArea(`\uFEFF${JSON.stringify(high)}`).geometry).toEqual(polygon);
  });

  it('takes the old crs member where it names longitude and latitude on WGS84, and refuses any other', () => {
    const withCrs = (name: string) => read({ ...polygon, crs: { type: 'name', properties: { name } } });
    expect(withCrs('urn:ogc:def:crs:OGC:1.3:CRS84').geometry).toEqual(polygon);
    expect(withCrs('EPSG:4326').geometry).toEqual(polygon);
    expect(withCrs('urn:ogc:def:crs:EPSG::32628').refusal?.found).toBe(
      'the reference system urn:ogc:def:crs:EPSG::32628',
    );
    expect(read({ ...polygon, crs: { type: 'link' } }).refusal).not.toBeNull();
  });

  it('refuses coordinates that are no degrees, and says where', () => {
    const corners = [
      [400_000, 6_500_000],
      [410_000, 6_500_000],
      [410_000, 6_510_000],
      [400_000, 6_500_000],
    ];
    const { refusal } = read(feature({ type: 'Polygon', coordinates: [corners] }));
    expect(refusal?.found).toMatch(/^the position 400000, 6500000 in the outline of the file/);
    expect(refusal?.advice).toContain('Reproject');
  });

  it('refuses what has no area, naming it', () => {
    const line = feature({ type: 'LineString', coordinates: ring });
    expect(read({ type: 'FeatureCollection', features: [feature(polygon), line] }).refusal?.found).toBe(
      'a LineString, in feature 2',
    );
    expect(read({ type: 'FeatureCollection', features: [] }).refusal?.found).toBe(
      'a FeatureCollection with nothing in it',
    );
    expect(read(feature(null)).refusal?.found).toContain('without a geometry');
    expect(read({ type: 'Topology' }).refusal?.found).toContain('“Topology”');
  });

  it('refuses rings that are not closed or are too short', () => {
    expect(read({ type: 'Polygon', coordinates: [ring.slice(0, 3)] }).refusal?.found).toContain('not closed');
    expect(read({ type: 'Polygon', coordinates: [[ring[0], ring[1], ring[0]]] }).refusal?.found).toContain(
      'not closed',
    );
  });

  it('refuses text that is no GeoJSON, and shows how it begins', () => {
    expect(readStudyArea('').refusal?.found).toBe('an empty file');
    expect(readStudyArea('<kml>').refusal?.found).toBe('no JSON: it begins with “<kml>”');
    expect(readStudyArea('[1]').refusal?.found).toBe('JSON that is no object');
    expect(read({ type: 'Polygon', coordinates: [[['a', 1]]] }).refusal?.found).toContain('no pair of numbers');
  });
});
