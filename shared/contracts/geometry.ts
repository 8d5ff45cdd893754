import { z } from 'zod';

/** [longitude, latitude] in degrees on WGS84, as RFC 7946 orders them. */
export const positionSchema = z.tuple([z.number().min(-180).max(180), z.number().min(-90).max(90)]);
export const ringSchema = z
  .array(positionSchema)
  .min(4, 'A ring has at least four positions, the last equal to the first.')
  .max(20_000);
export const polygonSchema = z.object({ type: z.literal('Polygon'), coordinates: z.array(ringSchema).min(1).max(200) });
export const multiPolygonSchema = z.object({
  type: z.literal('MultiPolygon'),
  coordinates: z.array(z.array(ringSchema).min(1).max(200)).min(1).max(2_000),
});
export const arealGeometrySchema = z.discriminatedUnion('type', [polygonSchema, multiPolygonSchema]);

function countPositions({ type, coordinates }: z.infer<typeof arealGeometrySchema>): number {
  const rings = type === 'Polygon' ? coordinates : coordinates.flat();
  return rings.reduce((sum, ring) => sum + ring.length, 0);
}

const MAX_DRAWING_POSITIONS = 10_000;
/** A polygon that somebody draws; its checks take time that grows faster than its corners. */
export const drawingSchema = polygonSchema.refine((polygon) => countPositions(polygon) <= MAX_DRAWING_POSITIONS, {
  error: `A drawing has at most ${MAX_DRAWING_POSITIONS} positions; simplify its outline.`,
});
const MAX_STUDY_AREA_POSITIONS = 50_000;
/** A study area: it goes to every browser that opens the project, and each drawing is held against it. */
export const studyAreaSchema = arealGeometrySchema.refine((area) => countPositions(area) <= MAX_STUDY_AREA_POSITIONS, {
  error: `A study area has at most ${MAX_STUDY_AREA_POSITIONS} positions; simplify its outline.`,
});
export type Position = z.infer<typeof positionSchema>;
export type Polygon = z.infer<typeof polygonSchema>;
export type MultiPolygon = z.infer<typeof multiPolygonSchema>;
export type ArealGeometry = z.infer<typeof arealGeometrySchema>;

/** West, south, east, north in degrees on WGS84. */
export const boundsSchema = z.tuple([z.number(), z.number(), z.number(), z.number()]);
export type Bounds = z.infer<typeof boundsSchema>;
