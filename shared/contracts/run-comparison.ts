import { z } from 'zod';
import { idSchema } from './common.ts';

export const runComparisonQuerySchema = z.object({ first: idSchema, second: idSchema });

/** McNemar's test on units both maps were judged by; null figures where the maps are right at the same units. */
const mcNemarSchema = z.object({
  n: z.number().int(),
  bothRight: z.number().int(),
  onlyFirstRight: z.number().int(),
  onlySecondRight: z.number().int(),
  bothWrong: z.number().int(),
  chiSquare: z.number().nullable(),
  /** The p to quote: exact under 25 discordant units, from chi-square above. */
  pValue: z.number().nullable(),
  quoted: z.enum(['exact', 'chi-square']).nullable(),
});
export type RunMcNemar = z.infer<typeof mcNemarSchema>;

const comparedRunSchema = z.object({
  id: idSchema,
  number: z.number().int(),
  name: z.string(),
  sceneName: z.string(),
  acquiredOn: z.string().nullable(),
});

export const runComparisonSchema = z.object({
  first: comparedRunSchema,
  second: comparedRunSchema,
  /** Maps of one scene differ by their making; maps of different scenes also by what changed on the ground. */
  isOneScene: z.boolean(),
  /** Classes of either run, those of the first in its order; null stands for what a map leaves out. */
  classes: z.array(z.object({ id: idSchema, name: z.string(), colour: z.string() })),
  /** Only pairs that occur, most pixels first. */
  transitions: z.array(
    z.object({
      fromClassId: idSchema.nullable(),
      toClassId: idSchema.nullable(),
      pixels: z.number().int(),
      areaHa: z.number(),
    }),
  ),
  /** Share of the area mapped by both that has one class on both; null where nothing is. */
  agreeingShare: z.number().nullable(),
  /** On samples held out from both runs; null where there are none. */
  heldOut: z.object({ polygons: z.number().int(), byPixel: mcNemarSchema, byPolygon: mcNemarSchema }).nullable(),
  cautions: z.array(z.string()),
});
export type RunComparison = z.infer<typeof runComparisonSchema>;
