import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { existsSync, mkdtempSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { createServer, type AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { pathToFileURL } from 'node:url';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { claimDataDir, prepareDataDir, readOrCreateSecret } from '../../server/bin/setup/data-folder.mjs';
import { listMissingPackages } from '../../server/bin/setup/debian-packages.mjs';
import { checkPortFree, findFreePort } from '../../server/bin/setup/ports.mjs';
import { identifyProcess, waitForProcessEnd } from '../../server/bin/setup/process-identity.mjs';
import { countChecks, countVitestReport, describeCounts } from '../../server/bin/setup/test-counts.mjs';

const setupDir = resolve(import.meta.dirname, '../../server/bin/setup');
let dir: string;

beforeEach(() => {
  dir = mkdtempSync(join(tmpdir(), 'groundsel-start-up-'));
});

afterEach(() => {
  rmSync(dir, { recursive: true, force: true });
});

describe('the data folder', () => {
  it('is made where it is missing, and closed to other users', () => {
    const made = prepareDataDir(join(dir, 'a/b'));
    expect(statSync(made).mode & 0o066).toBe(0);
  });

  it('is refused in words when it cannot be made', () => {
    writeFileSync(join(dir, 'file'), '');
    expect(() => prepareDataDir(join(dir, 'file/data'))).toThrow(/GROUNDSEL_DATA_DIR: .*cannot be written \(ENOTDIR/);
  });

  it('is held by one process at a time', () => {
    const claim = claimDataDir(dir);
    expect(claim.tookOver).toBe(false);
    expect(() => claimDataDir(dir)).toThrow(`already runs on ${dir} (process ${process.pid})`);
    claim.release();
    claimDataDir(dir).release();
  });

  it.each([
    ['a process that is gone', 'another-boot 999999999 17'],
    ['an earlier process of the same number', `another-boot ${process.pid} 17`],
    ['half a line', 'x'],
  ])('is taken over from %s', (_who, claimText) => {
    writeFileSync(join(dir, 'running'), claimText);
    const claim = claimDataDir(dir);
    expect(claim.tookOver).toBe(true);
    claim.release();
    expect(existsSync(join(dir, 'running'))).toBe(false);
  });

  it('keeps a secret that only its owner can read', () => {
    const path = join(dir, 'secret');
    const secret = readOrCreateSecret(path);
    expect(secret).toMatch(/^[0-9a-f]{64}$/);
    expect(readOrCreateSecret(path)).toBe(secret);
    expect(statSync(path).mode & 0o777).toBe(0o600);
    writeFileSync(path, 'something else');
    expect(() => readOrCreateSecret(path)).toThrow(/delete it to have a new one made/);
  });
});

describe('the port', () => {
  it('is refused in words when another program listens there, and accepted once it is free', async () => {
    const other = createServer().listen(0, '127.0.0.1');
    await once(other, 'listening');
    const { port } = other.address() as AddressInfo;
    await expect(checkPortFree(port, '127.0.0.1')).rejects.toThrow(
      new RegExp(`Port ${port} on 127.0.0.1 is taken.*GROUNDSEL_PORT=\\d+ npm start`),
    );
    const patient = checkPortFree(port, '127.0.0.1', 5000);
    other.close();
    await patient;
  });

  it('is refused in words on an address of another machine', async () => {
    // 192.0.2.0/24 is set aside for documentation (RFC 5737).
    await expect(checkPortFree(await findFreePort(), '192.0.2.1')).rejects.toThrow(/no address of this machine/);
  });
});

describe('the server under its launcher', () => {
  /** A launcher that supervises one program, which says so once it runs and marks its clean end in a file. */
  async function launch(body: string) {
    const program = join(dir, 'program.mjs');
    writeFileSync(program, body);
    const supervise = pathToFileURL(join(setupDir, 'supervise.mjs')).href;
    const script = `
      import { supervise, waitForStop } from ${JSON.stringify(supervise)};
      process.exitCode = await supervise([{ args: [${JSON.stringify(program)}], env: process.env }], waitForStop());`;
    const launcher = spawn(process.execPath, ['--input-type=module', '-e', script], {
      env: { ...process.env, npm_lifecycle_event: undefined },
    });
    const [said] = (await once(launcher.stdout, 'data')) as [Buffer];
    return { launcher, programPid: Number(/\d+/.exec(String(said))?.[0]) };
  }

  const marksItsEnd = () => `
    import { writeFileSync } from 'node:fs';
    process.once('SIGTERM', () => { writeFileSync(${JSON.stringify(join(dir, 'closed'))}, 'cleanly'); process.exit(0); });
    setInterval(() => undefined, 1000);
    console.log(process.pid);`;

  it('is told to close by the signal the launcher gets', async () => {
    const { launcher } = await launch(marksItsEnd());
    launcher.kill('SIGINT');
    expect(await once(launcher, 'exit')).toEqual([0, null]);
    expect(readFileSync(join(dir, 'closed'), 'utf8')).toBe('cleanly');
  });

  it('closes by itself when the launcher is killed', async () => {
    const { launcher, programPid } = await launch(marksItsEnd());
    expect(identifyProcess(programPid)).not.toBeNull();
    launcher.kill('SIGKILL');
    expect(await waitForProcessEnd(programPid, 10_000)).toBe(true);
    expect(readFileSync(join(dir, 'closed'), 'utf8')).toBe('cleanly');
  });

  it('passes its exit code on when it ends by itself', async () => {
    const { launcher } = await launch('console.log(process.pid); setTimeout(() => process.exit(7), 200);');
    expect(await once(launcher, 'exit')).toEqual([7, null]);
  });
});

describe('the count of a test run', () => {
  function report(testResults: unknown): string {
    const path = join(dir, 'report.json');
    writeFileSync(path, JSON.stringify({ testResults }));
    return path;
  }

  const file = (status: string, ...statuses: string[]) => ({
    name: 'a.test.ts',
    status,
    assertionResults: statuses.map((each) => ({ status: each })),
  });

  it('sums the tests of all files', () => {
    const path = report([file('passed', 'passed', 'skipped', 'todo'), file('failed', 'passed', 'failed')]);
    expect(countVitestReport(path, 1)).toEqual({ passed: 2, failed: 1, skipped: 2 });
  });

  it('counts a file that could not be loaded as a failure', () => {
    expect(countVitestReport(report([file('passed', 'passed'), file('failed')]), 1)).toMatchObject({ failed: 1 });
  });

  it('never calls a run good in which nothing ran, nothing was reported, or vitest itself failed', () => {
    expect(countVitestReport(report([]), 0).failed).toBe(1);
    expect(countVitestReport(report([file('passed', 'skipped')]), 0).failed).toBe(1);
    expect(countVitestReport(join(dir, 'absent.json'), 0).failed).toBe(1);
    expect(countVitestReport(report([file('passed', 'passed')]), 1).failed).toBe(1);
  });

  it('counts each check by its exit code', () => {
    expect(countChecks({ types: 0, lint: 1, build: 2 })).toEqual({ passed: 1, failed: 2, skipped: 0 });
  });

  it('closes with one line', () => {
    expect(describeCounts({ passed: 12, failed: 0, skipped: 0 })).toBe('12 passed, 0 failed');
    expect(describeCounts({ passed: 12, failed: 1, skipped: 2 })).toBe('12 passed, 1 failed, 2 skipped');
  });
});

describe('Debian packages', () => {
  it('are all there when the tests run, and an unknown name is a mistake of ours', () => {
    expect(listMissingPackages(['mariadb-server', 'gdal-bin', 'chromium'])).toEqual([]);
    expect(() => listMissingPackages(['no-such-package'])).toThrow(/no-such-package/);
  });
});
