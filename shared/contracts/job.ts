import { z } from 'zod';
import { idSchema, instantSchema } from './common.ts';

export const jobStateSchema = z.enum(['queued', 'running', 'finished', 'failed', 'cancelled']);
export type JobState = z.infer<typeof jobStateSchema>;
/** What background work is about; `JOB_LANES` in server/jobs says which of them wait for each other. */
export const jobKindSchema = z.enum(['ingest', 'run', 'reproduce', 'tune', 'post-process']);
export type JobKind = z.infer<typeof jobKindSchema>;
/** Which of a project's own jobs go first; it moves nothing before the work of other projects. */
export const jobPrioritySchema = z.enum(['low', 'normal', 'high']);
export type JobPriority = z.infer<typeof jobPrioritySchema>;
export const jobSchema = z.object({
  id: idSchema,
  kind: jobKindSchema,
  state: jobStateSchema,
  priority: jobPrioritySchema,
  /** The step under way, in plain words: "Training trees". */
  step: z.string(),
  done: z.number(),
  total: z.number(),
  /** 0..1 over the whole job. */
  share: z.number().min(0).max(1),
  secondsLeft: z.number().nullable(),
  error: z.string().nullable(),
  queuedAt: instantSchema,
  startedAt: instantSchema.nullable(),
  endedAt: instantSchema.nullable(),
});
export type Job = z.infer<typeof jobSchema>;

/** What the server sends on a project's event stream; the client refetches or patches by it. */
export const projectEventSchema = z.discriminatedUnion('type', [
  z.object({ type: z.literal('job'), sceneId: idSchema.nullable(), runId: idSchema.nullable(), job: jobSchema }),
  z.object({
    type: z.literal('changed'),
    what: z.enum(['project', 'scenes', 'classes', 'samples', 'runs', 'members', 'designs', 'blocks', 'presence']),
    id: idSchema.nullable(),
    by: idSchema.nullable(),
  }),
]);
export type ProjectEvent = z.infer<typeof projectEventSchema>;
