import { geojsonToWKT, wktToGeoJSON } from '@terraformer/wkt';
import type { ValueTransformer } from 'typeorm';

/**
 * Reads and writes GeoJSON through a geometry column, positions as [longitude, latitude] in degrees.
 * TypeORM hands MariaDB well-known text; a GeoJSON object given as it is would be stored as NULL without a word.
 */
export const geometryTransformer: ValueTransformer = {
  to: (value: Parameters<typeof geojsonToWKT>[0] | null | undefined) =>
    value === null || value === undefined ? value : geojsonToWKT(value),
  from: (value: string | null) => (value === null ? null : wktToGeoJSON(value)),
};
