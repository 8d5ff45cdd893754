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
export type Position = z.infer<typeof positionSchema>;
export type Polygon = z.infer<typeof polygonSchema>;
export type MultiPolygon = z.infer<typeof multiPolygonSchema>;
export type ArealGeometry = z.infer<typeof arealGeometrySchema>;

/** West, south, east, north in degrees on WGS84. */
export const boundsSchema = z.tuple([z.number(), z.number(), z.number(), z.number()]);
export type Bounds = z.infer<typeof boundsSchema>;
