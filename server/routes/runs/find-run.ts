import { z } from 'zod';
import { idSchema } from '../../../shared/contracts/common.ts';
import type { App } from '../../app-context.ts';
import type { Run } from '../../entities/run.ts';
import { findRun } from '../../services/runs.ts';

export const runParams = z.object({ runId: idSchema });

/** Target of routes below a run: the run, and who started it. */
export async function findRunTarget(
  app: App,
  params: { runId: string },
): Promise<{ projectId: string; madeById: string | null; run: Run } | null> {
  const run = await findRun(app, params.runId);
  return run ? { projectId: run.projectId, madeById: run.startedById, run } : null;
}
