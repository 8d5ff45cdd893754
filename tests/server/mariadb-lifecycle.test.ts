import { spawn, spawnSync } from 'node:child_process';
import { once } from 'node:events';
import {
  chmodSync,
  chownSync,
  cpSync,
  existsSync,
  mkdirSync,
  mkdtempSync,
  realpathSync,
  rmSync,
  statSync,
} from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { pathToFileURL } from 'node:url';
import { createConnection, type RowDataPacket } from 'mysql2/promise';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { startMariadb } from '../../server/bin/setup/mariadb.mjs';
import { identifyProcess } from '../../server/bin/setup/process-identity.mjs';

type Mariadb = Awaited<ReturnType<typeof startMariadb>>;

const setupDir = resolve(import.meta.dirname, '../../server/bin/setup');
const isRoot = process.getuid?.() === 0;
const nobody = { uid: 65_534, gid: 65_534 };
const asNobody = ['--reuid', String(nobody.uid), '--regid', String(nobody.gid), '--clear-groups', process.execPath];
/** Root can try what an ordinary user meets, if such a user may run this very Node. */
const canActAsNobody = isRoot && spawnSync('setpriv', [...asNobody, '--version']).status === 0;

let topDir: string;
let dataDir: string;
let running: Mariadb[];

beforeEach(() => {
  topDir = realpathSync(mkdtempSync(join(tmpdir(), 'groundsel-lifecycle-')));
  if (isRoot) chmodSync(topDir, 0o711);
  // A path with a blank, and longer than a socket's may be.
  dataDir = join(topDir, 'commissions and maps', 'x'.repeat(100));
  mkdirSync(dataDir, { recursive: true });
  running = [];
});

afterEach(async () => {
  for (const database of running) await database.stop();
  rmSync(topDir, { recursive: true, force: true });
});

async function start(): Promise<Mariadb> {
  const database = await startMariadb({ dataDir, durable: false });
  running.push(database);
  return database;
}

async function query(database: Mariadb, sql: string): Promise<RowDataPacket[]> {
  const { host, port, user, password, name } = database;
  const connection = await createConnection({ host, port, user, password, database: name });
  try {
    const [rows] = await connection.query<RowDataPacket[]>(sql);
    return rows;
  } finally {
    await connection.end();
  }
}

async function writePlot(database: Mariadb): Promise<void> {
  await query(database, 'CREATE TABLE plot (name VARCHAR(20)) ENGINE=InnoDB');
  await query(database, "INSERT INTO plot VALUES ('heath')");
}

/** Runs a launcher that starts MariaDB, says its process number and waits; resolves with both process numbers. */
async function spawnLauncher(command: string, args: string[], module: string) {
  const script = `
    import { startMariadb } from ${JSON.stringify(pathToFileURL(module).href)};
    const database = await startMariadb({ dataDir: ${JSON.stringify(dataDir)}, durable: false });
    process.once('SIGTERM', async () => { await database.stop(); process.exit(0); });
    console.log('MariaDB ' + database.pid);
    setInterval(() => undefined, 1000);`;
  const launcher = spawn(command, [...args, '--input-type=module', '-e', script]);
  let output = '';
  launcher.stderr.on('data', (chunk) => (output += String(chunk)));
  const pid = await new Promise<number>((found, failed) => {
    launcher.stdout.on('data', (chunk) => {
      output += String(chunk);
      const match = /MariaDB (\d+)/.exec(output);
      if (match) found(Number(match[1]));
    });
    launcher.once('exit', () => failed(new Error(`the launcher ended: ${output}`)));
  });
  return { launcher, pid };
}

describe('MariaDB in the data folder', () => {
  it('keeps what was written over a stop and a start, and leaves nothing behind', async () => {
    const first = await start();
    await writePlot(first);
    await first.stop();
    expect(identifyProcess(first.pid)).toBeNull();
    expect(existsSync(first.socket)).toBe(false);

    const second = await start();
    expect(second.password).toBe(first.password);
    expect(await query(second, 'SELECT name FROM plot')).toEqual([{ name: 'heath' }]);
  });

  it('comes back with its data after it was killed', async () => {
    const first = await start();
    await writePlot(first);
    process.kill(first.pid, 'SIGKILL');
    await first.ended;

    expect(await query(await start(), 'SELECT name FROM plot')).toEqual([{ name: 'heath' }]);
  });

  it('shuts down the one a killed launcher left running before it starts another', async () => {
    const { launcher, pid } = await spawnLauncher(process.execPath, [], join(setupDir, 'mariadb.mjs'));
    launcher.kill('SIGKILL');
    await once(launcher, 'exit');
    expect(identifyProcess(pid)).not.toBeNull();

    const database = await start();
    expect(identifyProcess(pid)).toBeNull();
    expect(database.pid).not.toBe(pid);
    expect(await query(database, 'SELECT 1 AS one')).toEqual([{ one: 1 }]);
  });

  it('is closed to other users of the machine and to whoever has no password', async () => {
    const database = await start();
    expect(statSync(join(dataDir, 'db')).mode & 0o077).toBe(0);
    expect(statSync(join(dataDir, 'db-password')).mode & 0o077).toBe(0);
    expect(statSync(resolve(database.socket, '..')).mode & 0o077).toBe(0);
    expect(existsSync(join(dataDir, 'db/init.sql'))).toBe(false);
    expect(Buffer.byteLength(database.socket)).toBeLessThan(108);
    for (const user of ['root', 'groundsel', '']) {
      const attempt = createConnection({ host: database.host, port: database.port, user, password: '' });
      await expect(attempt).rejects.toThrow(/denied/);
    }
    const [bind] = await query(database, 'SELECT @@bind_address AS address, @@innodb_flush_log_at_trx_commit AS flush');
    expect(bind).toEqual({ address: '127.0.0.1', flush: 2 });
  });

  it('gives the server rights on its own database only, and tests on those they make', async () => {
    const plain = await start();
    await expect(query(plain, 'CREATE DATABASE another')).rejects.toThrow(/denied/);
    await plain.stop();
    const open = await startMariadb({ dataDir, durable: true, mayCreateDatabases: true });
    running.push(open);
    await query(open, 'CREATE DATABASE another');
    expect(await query(open, 'SELECT @@innodb_flush_log_at_trx_commit AS flush')).toEqual([{ flush: 1 }]);
  });

  it('says why when MariaDB cannot come up', async () => {
    const database = await start();
    await database.stop();
    rmSync(join(dataDir, 'db/data/ibdata1'));
    mkdirSync(join(dataDir, 'db/data/ibdata1'));
    await expect(start()).rejects.toThrow(/MariaDB did not start: it ended.*mariadb\.log:\n.*ibdata1/s);
  });

  it.runIf(canActAsNobody)('works for an ordinary user, and then for root without taking the folder over', async () => {
    chownSync(dataDir, nobody.uid, nobody.gid);
    // The checkout may lie where nobody else can look; what runs before npm ci needs nothing but itself.
    const copy = join(topDir, 'server/bin/setup');
    cpSync(setupDir, copy, { recursive: true });
    const { launcher, pid } = await spawnLauncher('setpriv', asNobody, join(copy, 'mariadb.mjs'));
    expect(statSync(`/proc/${pid}`).uid).toBe(nobody.uid);
    launcher.kill('SIGTERM');
    await once(launcher, 'exit');
    expect(identifyProcess(pid)).toBeNull();

    const database = await start();
    expect(statSync(`/proc/${database.pid}`).uid).toBe(nobody.uid);
    expect(await query(database, 'SELECT 1 AS one')).toEqual([{ one: 1 }]);
  });

  it.runIf(isRoot)('run by root, works as a user other than root where that one can reach the folder', async () => {
    const open = await start();
    expect(statSync(`/proc/${open.pid}`).uid).not.toBe(0);
    await open.stop();
    rmSync(join(dataDir, 'db'), { recursive: true });
    chmodSync(topDir, 0o700);
    const closed = await start();
    expect(statSync(`/proc/${closed.pid}`).uid).toBe(0);
  });
});
