import type { Job, JobState } from '../../../../shared/contracts/job.ts';
import { StateTag, type TagTone } from '../../components/ui/state-tag.tsx';

const STATE: Record<JobState, { tone: TagTone; text: string }> = {
  queued: { tone: 'plain', text: 'Waiting' },
  running: { tone: 'working', text: 'Running' },
  finished: { tone: 'ok', text: 'Finished' },
  failed: { tone: 'danger', text: 'Failed' },
  cancelled: { tone: 'plain', text: 'Cancelled' },
};

/** The state of a run in a word. */
export function RunStateTag({ job }: { job: Pick<Job, 'state'> }) {
  const { tone, text } = STATE[job.state];
  return <StateTag tone={tone}>{text}</StateTag>;
}

export function runStateText(state: JobState): string {
  return STATE[state].text;
}

/** Waiting or working: it can be cancelled and its bar moves. */
export function isUnderWay(job: Pick<Job, 'state'>): boolean {
  return job.state === 'queued' || job.state === 'running';
}
