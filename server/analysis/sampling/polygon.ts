/** A position: x to the right and y downwards in pixel coordinates, or longitude and latitude in degrees. */
export type Position = readonly [number, number];

/** A closed ring: the last position repeats the first. */
export type Ring = readonly Position[];

/** Outer ring first, then holes. */
export type Polygon = readonly Ring[];

/** Polygons that belong together (the coordinates of a GeoJSON MultiPolygon). */
export type MultiPolygon = readonly Polygon[];
