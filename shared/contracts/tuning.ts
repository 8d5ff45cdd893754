import { z } from 'zod';
import { idSchema, instantSchema, personSchema } from './common.ts';
import { jobSchema } from './job.ts';
import { classifierSchema, recipeSchema } from './run.ts';
import { lineSchema } from './text.ts';

export const MAX_TRIALS = 60;
/** Values a setting of the classifier is to take; null stands for the setting's own "automatic". */
export const tuningRangeSchema = z
  .object({
    parameter: z.string().regex(/^[a-zA-Z]{1,40}$/, 'Name a setting of the classifier.'),
    values: z
      .array(z.union([z.number(), z.string().max(40), z.boolean(), z.null()]))
      .min(1, 'Give at least one value.')
      .max(20, 'At most 20 values.'),
  })
  .strict();

export const tuningPlanSchema = z
  .object({
    /** All combinations, or so many of them drawn by the seed. */
    method: z.enum(['grid', 'random']).default('grid'),
    /** Combinations drawn; only for `random`. */
    nTrials: z.number().int().min(2, 'At least two trials.').max(MAX_TRIALS).default(20),
    folds: z.number().int().min(2, 'At least two folds.').max(10, 'At most ten folds.').default(5),
    /** Side of the spatial blocks that stay together in one fold, metres on the ground. */
    blockMeters: z.number().min(1, 'At least 1 m.').max(1_000_000).default(1_000),
    seed: z.number().int().min(0).max(4_294_967_295).default(1),
    ranges: z.array(tuningRangeSchema).min(1, 'Choose at least one setting to vary.').max(6),
  })
  .strict();
export type TuningPlan = z.infer<typeof tuningPlanSchema>;
export const startTuningSchema = z
  .object({ name: lineSchema(120).default(''), recipe: recipeSchema, plan: tuningPlanSchema })
  .strict();
export type StartTuning = z.input<typeof startTuningSchema>;

export const tuningTrialSchema = z.object({
  number: z.number().int(),
  classifier: classifierSchema,
  /** Values of the settings that were varied, in the order of the plan's ranges. */
  values: z.array(z.union([z.number(), z.string(), z.boolean(), z.null()])),
  /** Share of a fold's pixels given their class, one a fold; null where the fold could not be judged. */
  foldAccuracies: z.array(z.number().nullable()),
  meanAccuracy: z.number().nullable(),
  /** Standard deviation over the folds (n − 1). */
  spread: z.number().nullable(),
  /** Mean over the classes of the share of their pixels found, all folds together. */
  meanProducersAccuracy: z.number().nullable(),
  seconds: z.number(),
  error: z.string().nullable(),
});
export type TuningTrial = z.infer<typeof tuningTrialSchema>;
export const tuningSchema = z.object({
  id: idSchema,
  projectId: idSchema,
  name: z.string(),
  recipe: recipeSchema,
  plan: tuningPlanSchema,
  job: jobSchema.nullable(),
  trials: z.array(tuningTrialSchema),
  /** Number of the trial with the greatest mean accuracy; the first of equals. Null while there is none. */
  bestTrial: z.number().int().nullable(),
  nTrainingPolygons: z.number().int(),
  notes: z.array(z.string()),
  startedBy: personSchema.nullable(),
  createdAt: instantSchema,
  abilities: z.object({ cancel: z.boolean(), delete: z.boolean() }),
});
export type Tuning = z.infer<typeof tuningSchema>;
export const tuningListSchema = z.object({ tunings: z.array(tuningSchema) });
