import { z } from 'zod';
import { idSchema, instantSchema, personSchema } from './common.ts';
import { drawingSchema, polygonSchema } from './geometry.ts';
import { textSchema } from './text.ts';

export const confidenceSchema = z.enum(['low', 'medium', 'high']);
export type Confidence = z.infer<typeof confidenceSchema>;

/** Where a sample stands between whoever drew it and the lead. Nothing forces anybody to submit: runs use samples in every state. */
export const sampleStateSchema = z.enum(['draft', 'submitted', 'accepted', 'returned']);
export type SampleState = z.infer<typeof sampleStateSchema>;

export const sampleSchema = z.object({
  id: idSchema,
  projectId: idSchema,
  /** Number within the project, from 1, never used twice. */
  number: z.number().int(),
  sceneId: idSchema,
  classId: idSchema,
  geometry: polygonSchema,
  confidence: confidenceSchema,
  note: z.string(),
  /** Scene pixels whose centre lies inside and that hold data. */
  pixelCount: z.number().int(),
  areaHa: z.number(),
  version: z.number().int(),
  state: sampleStateSchema,
  /** The block its centre lies in, if any. */
  blockId: idSchema.nullable(),
  /** Remarks nobody has resolved yet. */
  openRemarks: z.number().int(),
  createdBy: personSchema.nullable(),
  createdAt: instantSchema,
  updatedAt: instantSchema,
  abilities: z.object({ edit: z.boolean(), review: z.boolean() }),
});
export type Sample = z.infer<typeof sampleSchema>;
export const sampleListSchema = z.object({ samples: z.array(sampleSchema) });
export const sampleListQuerySchema = z.object({
  bbox: z
    .string()
    .regex(/^-?\d+(\.\d+)?(e-?\d+)?(,-?\d+(\.\d+)?(e-?\d+)?){3}$/i, 'bbox is west,south,east,north in degrees.')
    .optional(),
});

const noteSchema = textSchema(2_000);
export const createSampleSchema = z
  .object({
    /** Made by the client, so that sending again after a lost answer makes no second sample. */
    id: idSchema,
    sceneId: idSchema,
    classId: idSchema,
    geometry: drawingSchema,
    confidence: confidenceSchema.default('medium'),
    note: noteSchema.default(''),
  })
  .strict();
export type CreateSample = z.input<typeof createSampleSchema>;
export const updateSampleSchema = z
  .object({
    version: z.number().int(),
    classId: idSchema.optional(),
    geometry: drawingSchema.optional(),
    confidence: confidenceSchema.optional(),
    note: noteSchema.optional(),
  })
  .strict();
export type UpdateSample = z.infer<typeof updateSampleSchema>;
export const deleteSampleSchema = z.object({ version: z.number().int() }).strict();
export const restoreSampleSchema = z.object({ versionNumber: z.number().int().min(1) }).strict();

/** Why a drawing is refused; `at` is the place on the map. */
export const drawingRefusalSchema = z.object({
  reason: z.enum([
    'not-closed',
    'too-few-positions',
    'self-crossing',
    'no-area',
    'outside-scene',
    'outside-study-area',
    'no-pixel',
    'too-large',
  ]),
  found: z.string(),
  wanted: z.string(),
  advice: z.string(),
  at: z.tuple([z.number(), z.number()]).nullable(),
});
export type DrawingRefusal = z.infer<typeof drawingRefusalSchema>;

/** What a drawing would hold, asked while it is drawn; nothing is stored. */
export const measureDrawingSchema = z.object({ sceneId: idSchema, geometry: drawingSchema }).strict();
export const drawingMeasureSchema = z.object({
  refusal: drawingRefusalSchema.nullable(),
  pixelCount: z.number().int(),
  nodataPixels: z.number().int(),
  areaHa: z.number(),
  spectrum: z.array(
    z.object({
      bandId: idSchema,
      number: z.number().int(),
      name: z.string(),
      centreWavelengthUm: z.number().nullable(),
      mean: z.number().nullable(),
      standardDeviation: z.number().nullable(),
      quantity: z.string(),
    }),
  ),
});
export type DrawingMeasure = z.infer<typeof drawingMeasureSchema>;

export const sampleVersionSchema = z.object({
  versionNumber: z.number().int(),
  change: z.enum(['created', 'edited', 'deleted', 'restored']),
  classId: idSchema,
  geometry: polygonSchema,
  confidence: confidenceSchema,
  note: z.string(),
  pixelCount: z.number().int(),
  by: personSchema.nullable(),
  at: instantSchema,
});
export type SampleVersion = z.infer<typeof sampleVersionSchema>;
export const sampleHistorySchema = z.object({ versions: z.array(sampleVersionSchema) });

/** Asks for the connected pixels about a place whose spectrum is like the pixel's there. */
export const growRegionSchema = z
  .object({
    sceneId: idSchema,
    lon: z.number().min(-180).max(180),
    lat: z.number().min(-90).max(90),
    /** Largest distance from the pixel's spectrum, in standard deviations of the scene's bands. */
    distance: z.number().min(0, 'A distance is 0 or more.').max(10, 'At most 10 standard deviations.'),
  })
  .strict();
export const grownRegionSchema = z.object({
  /** Just within the pixels' edges; null where nothing can be grown. */
  geometry: polygonSchema.nullable(),
  pixelCount: z.number().int(),
  /** The distance it was grown to: a smaller one than asked where that made no outline anyone could mend. */
  distance: z.number(),
  /** What stands in the way, or what was cut; null where nothing is amiss. */
  remark: z.string().nullable(),
});
export type GrownRegion = z.infer<typeof grownRegionSchema>;
