import { LessThan } from 'typeorm';
import type { App } from '../app-context.ts';
import { AccountToken } from '../entities/account-token.ts';
import { RateCounter } from '../entities/rate-counter.ts';
import { Session } from '../entities/session.ts';

const EVERY_MS = 3_600_000;

/** Removes what has run out, once an hour: sessions, links, counters. */
export function sweepSessions(app: App): { stop(): void } {
  const sweep = async () => {
    const now = new Date();
    await app.db.getRepository(Session).delete({ expiresAt: LessThan(now) });
    await app.db.getRepository(AccountToken).delete({ expiresAt: LessThan(now) });
    await app.db.getRepository(RateCounter).delete({ resetAt: LessThan(now) });
  };
  const timer = setInterval(() => {
    sweep().catch((error: unknown) => app.log.error({ err: error }, 'sweeping sessions failed'));
  }, EVERY_MS);
  return { stop: () => clearInterval(timer) };
}
