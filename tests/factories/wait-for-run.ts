import type { Run } from '../../shared/contracts/run.ts';
import type { Agent } from './test-app.ts';

const ENDED = ['finished', 'failed', 'cancelled'];

/** Asks for a run until `isReached`, by default until it has ended. @throws Error when that takes too long */
export async function waitForRun(
  agent: Agent,
  runId: string,
  isReached = (run: Run) => ENDED.includes(run.job.state),
  timeoutMs = 50_000,
): Promise<Run> {
  const until = Date.now() + timeoutMs;
  for (;;) {
    const { body } = await agent.get(`/api/v1/runs/${runId}`).expect(200);
    const run = body as Run;
    if (isReached(run)) return run;
    if (Date.now() > until) throw new Error(`the run is still ${run.job.state} (${run.job.step})`);
    await new Promise((resolve) => setTimeout(resolve, 60));
  }
}
