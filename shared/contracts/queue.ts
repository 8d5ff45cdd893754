import { z } from 'zod';
import { idSchema, instantSchema } from './common.ts';
import { jobKindSchema, jobPrioritySchema } from './job.ts';

export const jobLogLevelSchema = z.enum(['info', 'warning', 'error']);
export type JobLogLevel = z.infer<typeof jobLogLevelSchema>;
export const jobLogSchema = z.object({
  entries: z.array(z.object({ at: instantSchema, level: jobLogLevelSchema, text: z.string() })),
});
export type JobLog = z.infer<typeof jobLogSchema>;

export const setPrioritySchema = z.object({ priority: jobPrioritySchema }).strict();

/** A job that works or waits. Of another project's work only that it is there is told. */
export const queueEntrySchema = z.object({
  /** Null for another project's work. */
  jobId: idSchema.nullable(),
  /** "Run 4 (spring bands)"; "Work of another project". */
  title: z.string(),
  kind: jobKindSchema,
  /** What waits for each other: long work, short work, uploads. */
  lane: z.enum(['long', 'short', 'intake']),
  runId: idSchema.nullable(),
  projectName: z.string().nullable(),
  state: z.enum(['running', 'queued']),
  priority: jobPrioritySchema,
  /** Whether a site administrator gave it its place. */
  isPlaced: z.boolean(),
  /** 1 is next in its lane; null while it works. */
  position: z.number().int().nullable(),
  step: z.string(),
  share: z.number(),
  secondsLeft: z.number().nullable(),
  /** Expected seconds until it starts, from what works and how long such work took before; null where unknown. */
  startsInSeconds: z.number().nullable(),
  queuedAt: instantSchema,
});
export type QueueEntry = z.infer<typeof queueEntrySchema>;
export const queueSchema = z.object({
  entries: z.array(queueEntrySchema),
  /** Long jobs of one project that may work at the same time. */
  projectLimit: z.number().int(),
  abilities: z.object({ prioritise: z.boolean(), cancel: z.boolean() }),
});
export type Queue = z.infer<typeof queueSchema>;
export const orderQueueSchema = z.object({ jobIds: z.array(idSchema).max(500) }).strict();
