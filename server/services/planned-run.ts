import type { App } from '../app-context.ts';
import type { Run } from '../entities/run.ts';
import { InvalidInput } from '../errors.ts';
import { requireResult } from './accuracy.ts';
import { findRun } from './runs.ts';

/** The finished run a plan is for. @throws InvalidInput when it is not of the project, NotFound without a class map */
export async function findPlannedRun(app: App, projectId: string, runId: string): Promise<Run> {
  const run = await findRun(app, runId);
  if (run?.projectId !== projectId) {
    throw new InvalidInput('There is no such run in this project.', {
      errors: [{ path: 'runId', message: 'There is no such run in this project.' }],
    });
  }
  requireResult(run);
  return run;
}
