import type { ClientRateLimitInfo, Store } from 'express-rate-limit';
import type { DataSource } from 'typeorm';
import { RateCounter } from '../entities/rate-counter.ts';

/** express-rate-limit's counters in MariaDB: a restart forgives nobody, and several processes count together. */
export class RateStore implements Store {
  readonly localKeys = false;

  constructor(
    private readonly db: DataSource,
    readonly prefix: string,
    private readonly windowMs: number,
  ) {}

  private idOf(key: string): string {
    return `${this.prefix}:${key}`.slice(0, 191);
  }

  async increment(key: string): Promise<ClientRateLimitInfo> {
    const id = this.idOf(key);
    const now = new Date();
    const resetAt = new Date(now.getTime() + this.windowMs);
    await this.db.query(
      `INSERT INTO rate_counters (\`key\`, hits, resetAt) VALUES (?, 1, ?)
       ON DUPLICATE KEY UPDATE hits = IF(resetAt <= ?, 1, hits + 1), resetAt = IF(resetAt <= ?, ?, resetAt)`,
      [id, resetAt, now, now, resetAt],
    );
    const row = await this.db.getRepository(RateCounter).findOneByOrFail({ key: id });
    return { totalHits: row.hits, resetTime: row.resetAt };
  }

  async decrement(key: string): Promise<void> {
    await this.db.query('UPDATE rate_counters SET hits = GREATEST(hits, 1) - 1 WHERE `key` = ?', [this.idOf(key)]);
  }

  async resetKey(key: string): Promise<void> {
    await this.db.getRepository(RateCounter).delete({ key: this.idOf(key) });
  }
}
