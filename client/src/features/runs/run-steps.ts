import type { Job } from '../../../../shared/contracts/job.ts';

/** The stages of a run in their order; a job's step begins with one of a stage's words. */
const STAGES = [
  { name: 'Reading training pixels', steps: ['Reading training pixels'] },
  { name: 'Training', steps: ['Training trees', 'Arranging training pixels'] },
  { name: 'Mapping the scene', steps: ['Mapping'] },
  { name: 'Counting and writing the map', steps: ['Counting', 'Writing'] },
] as const;

export interface RunStage {
  name: string;
  state: 'empty' | 'part' | 'done';
}

/** How far a run has come, stage by stage; null while the job says a step of no stage (it waits). */
export function runStages(job: Pick<Job, 'state' | 'step'>): RunStage[] {
  const current = STAGES.findIndex(({ steps }) => steps.some((step) => job.step.startsWith(step)));
  return STAGES.map(({ name }, index) => ({
    name,
    state: job.state !== 'running' || current < index ? 'empty' : current === index ? 'part' : 'done',
  }));
}
