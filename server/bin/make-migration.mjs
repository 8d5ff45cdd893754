import { chmodSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { prepareDataDir } from './setup/data-folder.mjs';
import { ensureDebianPackages } from './setup/debian-packages.mjs';
import { startMariadb } from './setup/mariadb.mjs';
import { checkNodeVersion, ensureNodeModules } from './setup/node-modules.mjs';
import { findTool, projectDir } from './setup/paths.mjs';
import { runCommand } from './setup/run-command.mjs';
import { describeFailure, SetupError } from './setup/setup-error.mjs';

/**
 * `npm run migration -- add-plots`: writes the migration that takes the tables from where the present migrations
 * leave them to what the entities say, worked out against an empty MariaDB made for the purpose.
 */
async function makeMigration() {
  const name = process.argv[2] ?? '';
  if (!/^[a-z][a-z0-9-]*$/.test(name)) {
    throw new SetupError(
      `The migration's name: found "${name}", wanted lower-case words joined by hyphens, such as add-plots.`,
    );
  }
  checkNodeVersion();
  await ensureDebianPackages(['mariadb-server']);
  await ensureNodeModules();
  const dir = mkdtempSync(join(tmpdir(), 'groundsel-migration-'));
  if (process.getuid?.() === 0) chmodSync(dir, 0o711);
  try {
    const database = await startMariadb({ dataDir: prepareDataDir(dir), durable: false });
    try {
      const env = {
        PATH: process.env['PATH'],
        NODE_ENV: 'development',
        GROUNDSEL_DB_HOST: database.host,
        GROUNDSEL_DB_PORT: String(database.port),
        GROUNDSEL_DB_USER: database.user,
        GROUNDSEL_DB_PASSWORD: database.password,
        GROUNDSEL_DB_NAME: database.name,
        GROUNDSEL_SESSION_SECRET: 'no sessions are made by this command',
      };
      const source = join(projectDir, 'server/bin/migration-source.ts');
      const typeorm = [
        ...[findTool('tsx'), '--tsconfig', join(projectDir, 'server/tsconfig.json')],
        join(projectDir, 'node_modules/typeorm/cli.js'),
      ];
      const ran = await runCommand(process.execPath, [...typeorm, 'migration:run', '-d', source], { env, quiet: true });
      if (ran !== 0) throw new SetupError('The present migrations do not run; the messages stand above.');
      const target = join(projectDir, 'server/migrations', name);
      return await runCommand(process.execPath, [...typeorm, 'migration:generate', '-p', '-d', source, target], {
        env,
      });
    } finally {
      await database.stop();
    }
  } finally {
    rmSync(dir, { recursive: true, force: true });
  }
}

try {
  process.exitCode = await makeMigration();
} catch (error) {
  console.error(describeFailure(error));
  process.exitCode = 1;
}
