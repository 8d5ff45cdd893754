import { chmodSync, mkdtempSync, realpathSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { DataSource } from 'typeorm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startMariadb } from '../../server/bin/setup/mariadb.mjs';
import { createDataSource } from '../../server/data-source.ts';
import { migrations } from '../../server/migrations/index.ts';

let dir: string;
let database: Awaited<ReturnType<typeof startMariadb>>;
let db: DataSource;

beforeAll(async () => {
  dir = realpathSync(mkdtempSync(join(tmpdir(), 'groundsel-migrations-')));
  if (process.getuid?.() === 0) chmodSync(dir, 0o711);
  database = await startMariadb({ dataDir: dir, durable: false });
  db = createDataSource(database);
  await db.initialize();
  await db.runMigrations({ transaction: 'each' });
}, 60_000);

afterAll(async () => {
  await db.destroy();
  await database.stop();
  rmSync(dir, { recursive: true, force: true });
});

describe('migrations', () => {
  it('leave the tables as the entities say', async () => {
    const { upQueries } = await db.driver.createSchemaBuilder().log();
    expect(upQueries.map(({ query }) => query)).toEqual([]);
  });

  // MariaDB cannot take back a change of tables: a server killed between two statements starts the migration anew.
  it.each(migrations.map((Migration) => ({ name: Migration.name, Migration })))(
    'can be run again after an interruption: $name',
    async ({ Migration }) => {
      const runner = db.createQueryRunner();
      try {
        await new Migration().up(runner);
      } finally {
        await runner.release();
      }
      const { upQueries } = await db.driver.createSchemaBuilder().log();
      expect(upQueries).toEqual([]);
    },
  );

  it('can be undone, newest first', async () => {
    for (let i = 0; i < migrations.length; i++) await db.undoLastMigration();
    const tables = await db.query<{ name: string }[]>(
      'SELECT table_name AS name FROM information_schema.tables WHERE table_schema = DATABASE()',
    );
    expect(tables.map(({ name }) => name)).toEqual(['migrations']);
  });
});
