import { randomUUID } from 'node:crypto';
import { ConfigError, readConfig } from './config.ts';
import { Project } from './entities/project.ts';
import { Run } from './entities/run.ts';
import type { App } from './app-context.ts';
import { insertReproduction } from './services/reproductions.ts';
import { reproduce } from './services/reproduction-execution.ts';
import { createLogger, openApp } from './start-server.ts';

const SAME = 0;
const DIFFERENT = 2;
const IMPOSSIBLE = 3;

const WANTED = 'wanted the id of a run, or a project’s id or name and the run’s number, such as "Isle of Vennory/3"';

/** The run somebody means. @throws Error saying what was found and wanted */
async function findWantedRun(app: App, wanted: string): Promise<Run> {
  const runs = app.db.getRepository(Run);
  if (/^[0-9a-f-]{36}$/i.test(wanted)) {
    const run = await runs.findOneBy({ id: wanted });
    if (run) return run;
    throw new Error(`There is no run ${wanted}; ${WANTED}.`);
  }
  const [, projectWords = '', number = ''] = /^(.+)\/(\d+)$/.exec(wanted) ?? [];
  if (!projectWords) throw new Error(`Found "${wanted}"; ${WANTED}.`);
  const where = /^[0-9a-f-]{36}$/i.test(projectWords) ? { id: projectWords } : { name: projectWords };
  const projects = await app.db.getRepository(Project).findBy(where);
  if (projects.length > 1) throw new Error(`${projects.length} projects are called "${projectWords}"; give its id.`);
  const [project] = projects;
  if (!project) throw new Error(`There is no project "${projectWords}"; ${WANTED}.`);
  const run = await runs.findOneBy({ projectId: project.id, number: Number(number) });
  if (run) return run;
  throw new Error(`${project.name} has no run ${number}; ${WANTED}.`);
}

/** Started by `npm run reproduce`: makes a run once more in this process and prints whether the bytes are the same. */
async function main(): Promise<number> {
  const config = readConfig(process.env);
  const stop = new AbortController();
  for (const signal of ['SIGINT', 'SIGTERM'] as const)
    process.once(signal, () => stop.abort(new Error('It was stopped.')));
  const { app, close } = await openApp(config, createLogger({ logLevel: 'warn' }), { takesJobs: false });
  try {
    const run = await findWantedRun(app, process.argv[2] ?? '');
    if (!run.result) throw new Error(`Run ${run.number} is not finished, so there is nothing to compare with.`);
    const id = randomUUID();
    await insertReproduction(app, app.db.manager, { id, runId: run.id, jobId: null, askedById: null });
    let said = '';
    const report = (step: string, done: number, total: number): void => {
      const percent = total > 0 ? Math.floor((done / total) * 10) * 10 : 0;
      const line = `${step}, ${percent} %`;
      if (line !== said) console.log((said = line));
    };
    console.log(`Making run ${run.number} once more with ${app.workers.compute.threads} threads`);
    const { verdict, seconds } = await reproduce(app, id, {
      signal: stop.signal,
      report,
      note: (text) => console.log(text),
    });
    const took = `after ${(seconds ?? 0).toFixed(1)} s`;
    if (verdict === 'same') console.log(`The same bytes, ${took}`);
    else console.log(verdict === 'different' ? `A different map came out, ${took}` : 'It cannot be made again.');
    return verdict === 'same' ? SAME : verdict === 'different' ? DIFFERENT : IMPOSSIBLE;
  } finally {
    await close();
  }
}

main().then(
  (code) => process.exit(code),
  (error: unknown) => {
    console.error(error instanceof ConfigError || error instanceof Error ? error.message : error);
    process.exit(1);
  },
);
