import { setTimeout as sleep } from 'node:timers/promises';
import { DataSource, type EntityManager } from 'typeorm';

/** What MariaDB answers to the one of two transactions that it ended so that the other can go on. */
const WORTH_ANOTHER_TRY = new Set(['ER_LOCK_DEADLOCK', 'ER_CHECKREAD']);
const MAX_TRIES = 5;
const LONGEST_PAUSE_MS = 50;

type Work<T> = (manager: EntityManager) => Promise<T>;

/**
 * A data source whose transactions begin anew when MariaDB ended them because of a deadlock, which is no fault of anyone's. So the
 * work of a transaction must do nothing but read and write the database.
 */
export class RetryingDataSource extends DataSource {
  override async transaction<T>(...args: Parameters<DataSource['transaction']> | [Work<T>]): Promise<T> {
    for (let tries = 1; ; tries++) {
      try {
        return (await super.transaction(...(args as [Work<T>]))) as T;
      } catch (error) {
        const { code } = error as { code?: string };
        if (tries >= MAX_TRIES || code === undefined || !WORTH_ANOTHER_TRY.has(code)) throw error;
        await sleep(Math.random() * LONGEST_PAUSE_MS);
      }
    }
  }
}
