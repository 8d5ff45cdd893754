import { LessThan, MoreThan, type DataSource } from 'typeorm';
import type { Logger } from 'pino';
import type { ProjectEvent } from '../../shared/contracts/job.ts';
import { EventEntry } from '../entities/event-entry.ts';

const POLL_MS = 400;
const KEEP_MS = 24 * 3_600_000;
const SWEEP_MS = 600_000;
/** Transactions may commit out of the order of their ids; this many ids back are looked at again. */
const LOOK_BACK = 100;

export interface NumberedEvent {
  id: number;
  event: ProjectEvent;
}
type Listener = (event: NumberedEvent) => void;

/** What happened, through the database: browsers hear of it whichever server process made it. */
export class EventLog {
  private readonly listeners = new Map<string, Set<Listener>>();
  private readonly seen = new Set<number>();
  private newest = 0;
  private timer: NodeJS.Timeout | null = null;
  private sweeper: NodeJS.Timeout | null = null;
  private polling: Promise<void> | null = null;

  constructor(
    private readonly db: DataSource,
    private readonly log: Logger,
  ) {}

  private get rows() {
    return this.db.getRepository(EventEntry);
  }

  /** Starts polling; only what happens from now on is sent unless a listener asks for more. */
  async start(): Promise<void> {
    const last = await this.rows.find({ order: { id: 'DESC' }, take: LOOK_BACK, select: { id: true } });
    for (const row of last) this.seen.add(Number(row.id));
    this.newest = Number(last[0]?.id ?? 0);
    this.timer = setInterval(() => void this.poll(), POLL_MS);
    this.sweeper = setInterval(() => void this.sweep(), SWEEP_MS);
  }

  async stop(): Promise<void> {
    if (this.timer) clearInterval(this.timer);
    if (this.sweeper) clearInterval(this.sweeper);
    await this.polling;
  }

  async publish(projectId: string, event: ProjectEvent): Promise<void> {
    await this.rows.insert({ projectId, event: event as never });
    void this.poll();
  }

  /** Calls back on each event of the project; `afterId` first replays what a reconnecting browser missed. */
  async subscribe(projectId: string, afterId: number | null, listener: Listener): Promise<() => void> {
    const group = this.listeners.get(projectId) ?? new Set<Listener>();
    this.listeners.set(projectId, group.add(listener));
    const unsubscribe = () => {
      group.delete(listener);
      // A group that was let go of may have been followed by another one.
      if (group.size === 0 && this.listeners.get(projectId) === group) this.listeners.delete(projectId);
    };
    if (afterId === null) return unsubscribe;
    try {
      const missed = await this.rows.find({
        where: { projectId, id: MoreThan(String(afterId)) },
        order: { id: 'ASC' },
        take: 1000,
      });
      for (const row of missed) listener({ id: Number(row.id), event: row.event });
    } catch (error) {
      unsubscribe();
      throw error;
    }
    return unsubscribe;
  }

  private poll(): Promise<void> {
    if (this.listeners.size === 0 || !this.db.isInitialized) return Promise.resolve();
    this.polling ??= this.readNew()
      .catch((error: unknown) => this.log.error({ err: error }, 'reading events failed'))
      .finally(() => (this.polling = null));
    return this.polling;
  }

  private async readNew(): Promise<void> {
    const rows = await this.rows.find({
      where: { id: MoreThan(String(Math.max(0, this.newest - LOOK_BACK))) },
      order: { id: 'ASC' },
      take: 2000,
    });
    for (const row of rows) {
      const id = Number(row.id);
      if (this.seen.has(id)) continue;
      this.seen.add(id);
      this.newest = Math.max(this.newest, id);
      for (const listener of this.listeners.get(row.projectId) ?? []) listener({ id, event: row.event });
    }
    for (const id of this.seen) if (id < this.newest - 2 * LOOK_BACK) this.seen.delete(id);
  }

  private async sweep(): Promise<void> {
    try {
      await this.rows.delete({ createdAt: LessThan(new Date(Date.now() - KEEP_MS)) });
    } catch (error) {
      this.log.error({ err: error }, 'sweeping events failed');
    }
  }
}
