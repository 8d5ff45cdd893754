import type { EntityManager } from 'typeorm';
import type { JobLogLevel } from '../../shared/contracts/queue.ts';
import type { Job } from '../entities/job.ts';

export interface JobRequest {
  kind: Job['kind'];
  projectId: string;
  sceneId?: string;
  runId?: string;
  /** The reproduction or tuning it works for. */
  subjectId?: string;
}

/** Where background work is asked for. Whoever takes it up may be another process. */
export interface JobQueue {
  /** Adds a job within the caller's transaction, so that a job exists exactly when its row of work does. */
  enqueue(manager: EntityManager, request: JobRequest): Promise<Job>;
  /** Ends a queued job at once and asks a running one to stop; nothing happens to an ended one. */
  cancel(jobId: string): Promise<void>;
  /** Puts an ended job back into the queue, within the caller's transaction. */
  enqueueAgain(manager: EntityManager, jobId: string): Promise<void>;
}

/** What a job's work is given. */
export interface JobContext {
  job: Job;
  /** Aborted when the job is cancelled or the server shuts down. */
  signal: AbortSignal;
  /** Says how far the work is: step in plain words, counts of that step, and the share 0..1 of the whole job. */
  report(step: string, done: number, total: number, share: number): void;
  /** Adds a line to the job's log, in words for whoever asked for the work. */
  note(text: string, level?: JobLogLevel): void;
}

/** Does a job's work; rejects to fail it. An error with `permanent` says that trying again cannot help. */
export type JobHandler = (context: JobContext) => Promise<void>;
