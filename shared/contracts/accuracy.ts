import { z } from 'zod';
import { idSchema } from './common.ts';

/** A figure with its interval; null where the figure is undefined, never 0 or NaN. */
export const estimateSchema = z.object({
  value: z.number().nullable(),
  low: z.number().nullable(),
  high: z.number().nullable(),
});
export type Estimate = z.infer<typeof estimateSchema>;

export const accuracyUnitSchema = z.enum(['pixel', 'polygon']);
export type AccuracyUnit = z.infer<typeof accuracyUnitSchema>;
export const accuracyQuerySchema = z.object({ unit: accuracyUnitSchema.default('pixel') });

export const accuracySchema = z.object({
  runId: idSchema,
  unit: accuracyUnitSchema,
  /** Classes in matrix order. */
  classes: z.array(z.object({ id: idSchema, code: z.number().int(), name: z.string(), colour: z.string() })),
  /** matrix[mapped][reference]: rows are the mapped class, columns the reference class. */
  matrix: z.array(z.array(z.number().int())),
  /** Reference units the map left unclassified or without data, by reference class; they count as wrong in no figure and are said. */
  unmapped: z.array(z.number().int()),
  total: z.number().int(),
  polygonCount: z.number().int(),
  overall: estimateSchema.extend({ method: z.string() }),
  kappa: z.object({
    value: z.number().nullable(),
    standardError: z.number().nullable(),
    low: z.number().nullable(),
    high: z.number().nullable(),
    caution: z.string(),
  }),
  quantityDisagreement: z.number().nullable(),
  allocationDisagreement: z.number().nullable(),
  perClass: z.array(
    z.object({
      classId: idSchema,
      mappedCount: z.number().int(),
      referenceCount: z.number().int(),
      correctCount: z.number().int(),
      heldOutPolygons: z.number().int(),
      users: estimateSchema,
      producers: estimateSchema,
      f1: z.number().nullable(),
      /** Said when the count is too small to rely on. */
      warning: z.string().nullable(),
    }),
  ),
  cautions: z.array(z.string()),
});
export type Accuracy = z.infer<typeof accuracySchema>;

export const cellQuerySchema = z.object({ mapped: idSchema, reference: idSchema });
/** The held-out samples behind a cell of the matrix, most pixels first. */
export const cellSamplesSchema = z.object({
  samples: z.array(
    z.object({
      sampleId: idSchema,
      number: z.number().int(),
      pixels: z.number().int(),
      pixelsOfSample: z.number().int(),
      stillThere: z.boolean(),
    }),
  ),
});
export type CellSamples = z.infer<typeof cellSamplesSchema>;
