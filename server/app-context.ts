import type { Logger } from 'pino';
import type { DataSource } from 'typeorm';
import type { Config } from './config.ts';
import type { EventLog } from './jobs/event-log.ts';
import type { JobQueue } from './jobs/job-queue.ts';
import type { WorkerPools } from './jobs/worker-pools.ts';
import type { Mailer } from './mail/mailer.ts';
import type { BandStore } from './raster/band-store.ts';
import type { FileStore } from './storage/file-store.ts';

/** What every use case is given: the outside world behind contracts, none of it global. */
export interface App {
  config: Config;
  db: DataSource;
  log: Logger;
  files: FileStore;
  jobs: JobQueue;
  events: EventLog;
  mail: Mailer;
  workers: WorkerPools;
  /** Band files open in this thread, for the few pixels of a probe or a drawing; tiles and runs read in worker threads. */
  bands: BandStore;
}
