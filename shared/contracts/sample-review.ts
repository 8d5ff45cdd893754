import { z } from 'zod';
import { idSchema, instantSchema, personSchema } from './common.ts';
import { sampleSchema } from './sample.ts';
import { textSchema } from './text.ts';

const MAX_AT_ONCE = 2_000;
/** Samples as the viewer saw them: those changed since are left alone and named. */
const seenSamplesSchema = z
  .array(z.object({ id: idSchema, version: z.number().int() }).strict())
  .min(1, 'Choose at least one sample.')
  .max(MAX_AT_ONCE, `Choose at most ${MAX_AT_ONCE} samples at once.`);
const commentSchema = textSchema(2_000);

/** Hands drafts and returned samples to the lead, or takes submitted ones back. */
export const submitSamplesSchema = z
  .object({ act: z.enum(['submit', 'withdraw']), samples: seenSamplesSchema })
  .strict();
export type SubmitSamples = z.infer<typeof submitSamplesSchema>;

/** Accepts samples, returns them with a comment, or makes either undone. */
export const reviewSamplesSchema = z
  .object({
    act: z.enum(['accept', 'return', 'reopen']),
    samples: seenSamplesSchema,
    comment: commentSchema.default(''),
  })
  .strict()
  .refine(({ act, comment }) => act !== 'return' || comment !== '', {
    path: ['comment'],
    error: 'Say what is to be done: a sample is returned with a comment.',
  });

export const reviewOutcomeSchema = z.object({
  samples: z.array(sampleSchema),
  refused: z.array(
    z.object({
      id: idSchema,
      number: z.number().int().nullable(),
      reason: z.enum(['gone', 'changed', 'state', 'not-yours']),
    }),
  ),
});
export type ReviewOutcome = z.infer<typeof reviewOutcomeSchema>;

export const remarkKindSchema = z.enum([
  'comment',
  'submitted',
  'withdrawn',
  'accepted',
  'returned',
  'reopened',
  'changed-after-acceptance',
  'settled',
]);
export type RemarkKind = z.infer<typeof remarkKindSchema>;

/** A line of a sample's thread: what somebody said, or a step of its review. */
export const sampleRemarkSchema = z.object({
  id: idSchema,
  sampleId: idSchema,
  kind: remarkKindSchema,
  text: z.string(),
  by: personSchema.nullable(),
  at: instantSchema,
  resolvedAt: instantSchema.nullable(),
  resolvedBy: personSchema.nullable(),
});
export type SampleRemark = z.infer<typeof sampleRemarkSchema>;
export const sampleThreadSchema = z.object({
  remarks: z.array(sampleRemarkSchema),
  abilities: z.object({ resolve: z.boolean() }),
});
export const addRemarkSchema = z.object({ text: commentSchema.min(1, 'Write the comment.') }).strict();
export const resolveRemarkSchema = z.object({ resolved: z.boolean() }).strict();
