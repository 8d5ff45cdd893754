import { Store, type SessionData } from 'express-session';
import { LessThan, type DataSource } from 'typeorm';
import { Session } from '../entities/session.ts';

const TOUCH_AFTER_MS = 60_000;

declare module 'express-session' {
  interface SessionData {
    passport?: { user?: string };
    userAgent?: string;
    address?: string;
  }
}

/** Keeps express-session's rows in MariaDB, with the account beside them so that all of a person's can be ended at once. */
export class SessionStore extends Store {
  constructor(
    private readonly db: DataSource,
    private readonly lifetimeMs: number,
  ) {
    super();
  }

  private get rows() {
    return this.db.getRepository(Session);
  }

  override get(id: string, done: (error: unknown, session?: SessionData | null) => void): void {
    this.rows
      .findOneBy({ id })
      .then((row) => done(null, row && row.expiresAt > new Date() ? (JSON.parse(row.data) as SessionData) : null))
      .catch(done);
  }

  override set(id: string, session: SessionData, done?: (error?: unknown) => void): void {
    const now = new Date();
    this.rows
      .upsert(
        {
          id,
          userId: session.passport?.user ?? null,
          data: JSON.stringify(session),
          userAgent: (session.userAgent ?? '').slice(0, 400),
          address: (session.address ?? '').slice(0, 64),
          lastSeenAt: now,
          expiresAt: new Date(now.getTime() + this.lifetimeMs),
        },
        ['id'],
      )
      .then(() => done?.())
      .catch((error: unknown) => done?.(error));
  }

  /** Moves the end on, at most once a minute: a map page asks for hundreds of tiles. */
  override touch(id: string, _session: SessionData, done?: (error?: unknown) => void): void {
    const now = Date.now();
    this.rows
      .update(
        { id, lastSeenAt: LessThan(new Date(now - TOUCH_AFTER_MS)) },
        { lastSeenAt: new Date(now), expiresAt: new Date(now + this.lifetimeMs) },
      )
      .then(() => done?.())
      .catch((error: unknown) => done?.(error));
  }

  override destroy(id: string, done?: (error?: unknown) => void): void {
    this.rows
      .delete({ id })
      .then(() => done?.())
      .catch((error: unknown) => done?.(error));
  }
}
