import { z } from 'zod';
import { idSchema, instantSchema, personSchema } from './common.ts';
import { drawingSchema } from './geometry.ts';
import { jobSchema } from './job.ts';
import { textSchema } from './text.ts';

/** What a pixel may be before a step: a class by its id, or unclassified. Pixels without data are never changed to a class. */
const mapValueSchema = z.union([z.literal('unclassified'), idSchema]);
const mapTargetSchema = z.union([z.literal('unclassified'), z.literal('nodata'), idSchema]);

const stepFields = {
  /** Made by whoever adds the step; the same over all revisions. */
  id: idSchema,
  isOn: z.boolean().default(true),
};

export const postProcessingStepSchema = z.discriminatedUnion('kind', [
  z
    .object({
      kind: z.literal('majority'),
      ...stepFields,
      windowPixels: z
        .number()
        .int()
        .min(3, 'A window has at least 3 pixels a side.')
        .max(25, 'A window has at most 25 pixels a side.')
        .refine((side) => side % 2 === 1, 'A window has an odd side, so that it has a centre.'),
      ties: z.enum(['keep-centre', 'lowest-code']).default('keep-centre'),
    })
    .strict(),
  z
    .object({
      kind: z.literal('sieve'),
      ...stepFields,
      minAreaHa: z.number().positive('A minimum is more than 0 ha.').max(100_000),
      neighbours: z.union([z.literal(4), z.literal(8)]).default(4),
    })
    .strict(),
  z
    .object({
      kind: z.literal('recode'),
      ...stepFields,
      pairs: z
        .array(z.object({ from: mapValueSchema, to: mapTargetSchema }).strict())
        .min(1, 'Choose at least one class to recode.')
        .max(255)
        .refine((pairs) => new Set(pairs.map(({ from }) => from)).size === pairs.length, 'A class is recoded once.'),
    })
    .strict(),
  z
    .object({
      kind: z.literal('fill'),
      ...stepFields,
      mask: z.union([
        z.object({ kind: z.literal('study-area') }).strict(),
        z.object({ kind: z.literal('zones'), layerId: idSchema }).strict(),
      ]),
      where: z.enum(['inside', 'outside']),
      to: mapTargetSchema,
    })
    .strict(),
  z
    .object({
      kind: z.literal('reclass'),
      ...stepFields,
      polygon: drawingSchema,
      from: z.union([z.literal('any'), mapValueSchema]),
      to: mapTargetSchema,
      reason: textSchema(500).refine((text) => text.length >= 3, 'Say why, so that a reader of the map can judge it.'),
      /** Set by the server for a new or changed edit. */
      by: z.string().max(200).default(''),
      at: z.string().max(40).default(''),
    })
    .strict(),
]);
export type PostProcessingStep = z.infer<typeof postProcessingStepSchema>;

export const postProcessingSchema = z
  .array(postProcessingStepSchema)
  .max(200, 'At most 200 steps.')
  .refine((steps) => new Set(steps.map(({ id }) => id)).size === steps.length, 'Each step has an id of its own.');

export const previewPostProcessingSchema = z.object({ steps: postProcessingSchema }).strict();
export const changePostProcessingSchema = z
  .object({
    steps: postProcessingSchema,
    /** Number of the newest revision the change was made from; 0 where there was none. */
    basedOn: z.number().int().min(0),
  })
  .strict();
export type ChangePostProcessing = z.infer<typeof changePostProcessingSchema>;

/** What a step did when the list was applied in order. */
export const stepEffectSchema = z.object({
  stepId: idSchema,
  changedPixels: z.number().int(),
  changedHa: z.number(),
  /** Patches merged, and those left without a neighbour; sieve only. */
  nMerged: z.number().int().nullable(),
  nLeft: z.number().int().nullable(),
});
export type StepEffect = z.infer<typeof stepEffectSchema>;

export const areaChangeSchema = z.object({
  code: z.number().int(),
  name: z.string(),
  colour: z.string(),
  beforeHa: z.number(),
  afterHa: z.number(),
});

export const postProcessingPreviewSchema = z.object({
  /** Names the preview's tiles. */
  previewId: z.string(),
  effects: z.array(stepEffectSchema),
  areas: z.array(areaChangeSchema),
});
export type PostProcessingPreview = z.infer<typeof postProcessingPreviewSchema>;

export const postProcessingRevisionSchema = z.object({
  number: z.number().int(),
  steps: z.array(postProcessingStepSchema),
  /** Null once it is part of a run's own work. */
  job: jobSchema.nullable(),
  isApplied: z.boolean(),
  effects: z.array(stepEffectSchema),
  madeBy: personSchema.nullable(),
  createdAt: instantSchema,
});
export type PostProcessingRevision = z.infer<typeof postProcessingRevisionSchema>;

const overallSchema = z.object({
  overallAccuracy: z.number().nullable(),
  overallLow: z.number().nullable(),
  overallHigh: z.number().nullable(),
});
export const runPostProcessingSchema = z.object({
  /** Newest first. */
  revisions: z.array(postProcessingRevisionSchema),
  /** The revision the map shows; null while it is the classifier's own. */
  applied: z.number().int().nullable(),
  areas: z.array(areaChangeSchema),
  /** Held-out accuracy of the classifier's map and of the map as it stands; null for those who may not read it. */
  before: overallSchema.nullable(),
  after: overallSchema.nullable(),
  /** Why the list cannot be changed now; null when it can. */
  refusal: z.string().nullable(),
  abilities: z.object({ change: z.boolean() }),
});
export type RunPostProcessing = z.infer<typeof runPostProcessingSchema>;
