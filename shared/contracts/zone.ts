import { z } from 'zod';
import { idSchema, instantSchema, personSchema } from './common.ts';
import { designFigureSchema } from './reference-estimates.ts';

/** Zones of a project: administrative areas, catchments, management units. */
export const zoneLayerSchema = z.object({
  id: idSchema,
  projectId: idSchema,
  name: z.string(),
  /** In the file's order; the place is the zone's number. */
  zones: z.array(z.object({ name: z.string(), areaHa: z.number() })),
  createdBy: personSchema.nullable(),
  createdAt: instantSchema,
  abilities: z.object({ delete: z.boolean() }),
});
export type ZoneLayer = z.infer<typeof zoneLayerSchema>;
export const zoneLayerListSchema = z.object({
  layers: z.array(zoneLayerSchema),
  abilities: z.object({ add: z.boolean() }),
});

/** What reference points say of each zone. */
export const zoneEstimatesSchema = z.object({
  layerId: idSchema,
  layerName: z.string(),
  zones: z.array(
    z.object({
      name: z.string(),
      /** Points in it that have a class. */
      points: z.number().int(),
      overall: designFigureSchema,
      /** Share of the zone's mapped area that is of each class, in the order of `classes`. */
      classShares: z.array(designFigureSchema),
    }),
  ),
  classes: z.array(z.object({ id: idSchema, name: z.string(), colour: z.string() })),
  cautions: z.array(z.string()),
});
export type ZoneEstimates = z.infer<typeof zoneEstimatesSchema>;
export const zoneEstimatesQuerySchema = z.object({ layerId: idSchema });
