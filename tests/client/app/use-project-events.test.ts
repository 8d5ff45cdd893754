import { QueryClient } from '@tanstack/react-query';
import { describe, expect, it } from 'vitest';
import type { Job, ProjectEvent } from '../../../shared/contracts/job.ts';
import { receiveProjectEvent } from '../../../client/src/app/use-project-events.ts';

const job: Job = {
  id: 'a3f0a3a4-6f5c-4f10-9d3b-7f2a4c1f9a01',
  kind: 'run',
  state: 'running',
  priority: 'normal',
  step: 'Training trees',
  done: 40,
  total: 100,
  share: 0.4,
  secondsLeft: 12,
  error: null,
  queuedAt: '2025-09-04T10:00:00Z',
  startedAt: '2025-09-04T10:00:01Z',
  endedAt: null,
};

describe('an event of the project', () => {
  it('moves the bar of a run without asking the server again', () => {
    const client = new QueryClient();
    client.setQueryData(['project', 'p', 'runs'], { runs: [{ id: 'r', job: null }] });
    client.setQueryData(['project', 'other', 'runs'], { runs: [{ id: 'r', job: null }] });
    const topics = receiveProjectEvent(client, 'p', { type: 'job', sceneId: null, runId: 'r', job } as ProjectEvent);
    expect(topics).toEqual([]);
    expect(client.getQueryData(['project', 'p', 'runs'])).toEqual({ runs: [{ id: 'r', job }] });
    expect(client.getQueryData(['project', 'other', 'runs'])).toEqual({ runs: [{ id: 'r', job: null }] });
  });

  it('asks again for the runs and their accuracy once a run has ended', () => {
    const ended: ProjectEvent = { type: 'job', sceneId: null, runId: job.id, job: { ...job, state: 'finished' } };
    expect(receiveProjectEvent(new QueryClient(), 'p', ended)).toEqual(
      expect.arrayContaining(['runs', 'accuracy', 'project', 'overview']),
    );
  });

  it('asks for the counts of the rail again whatever changed', () => {
    for (const what of ['project', 'scenes', 'classes', 'samples', 'runs', 'members'] as const) {
      const topics = receiveProjectEvent(new QueryClient(), 'p', { type: 'changed', what, id: null, by: null });
      expect(topics).toEqual(expect.arrayContaining([what, 'project']));
    }
  });
});
