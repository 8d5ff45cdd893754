import { z } from 'zod';
import { idSchema, instantSchema, personSchema } from './common.ts';
import { jobSchema } from './job.ts';

/** `same`: every map compared is equal to the byte; `impossible`: an input is gone or changed. */
export const reproductionVerdictSchema = z.enum(['same', 'different', 'impossible']);
export type ReproductionVerdict = z.infer<typeof reproductionVerdictSchema>;
export const reproductionCheckSchema = z.object({
  /** Which map: "Class map of the classifier". */
  what: z.string(),
  expectedSha256: z.string(),
  foundSha256: z.string(),
});
export type ReproductionCheck = z.infer<typeof reproductionCheckSchema>;
export const reproductionSchema = z.object({
  id: idSchema,
  runId: idSchema,
  /** Null when it was made by a command on the server. */
  job: jobSchema.nullable(),
  verdict: reproductionVerdictSchema.nullable(),
  checks: z.array(reproductionCheckSchema),
  missing: z.array(z.string()),
  /** Threads that made it. */
  threads: z.number().int(),
  seconds: z.number().nullable(),
  askedBy: personSchema.nullable(),
  createdAt: instantSchema,
});
export type Reproduction = z.infer<typeof reproductionSchema>;
export const reproductionListSchema = z.object({
  reproductions: z.array(reproductionSchema),
  abilities: z.object({ reproduce: z.boolean() }),
});
