import { describe, expect, it } from 'vitest';
import type { Job } from '../../../shared/contracts/job.ts';
import { patchJob } from '../../../client/src/lib/project/patch-job.ts';

const job = { id: 'j', step: 'Training trees', done: 40, total: 100 } as Job;

describe('a job’s progress in the cache', () => {
  it('reaches the run it works for in a list, and no other', () => {
    const list = {
      runs: [
        { id: 'a', job: null },
        { id: 'b', job: null },
      ],
    };
    expect(patchJob(list, 'b', job)).toEqual({
      runs: [
        { id: 'a', job: null },
        { id: 'b', job },
      ],
    });
  });

  it('reaches a scene that is held alone', () => {
    expect(patchJob({ id: 's', name: 'Spring', job: null }, 's', job)).toEqual({ id: 's', name: 'Spring', job });
  });

  it('keeps the very same object when the subject is not in it, so that nothing draws again', () => {
    const list = { scenes: [{ id: 's', job: null }] };
    expect(patchJob(list, 'other', job)).toBe(list);
  });

  it('leaves answers of other shapes alone', () => {
    expect(patchJob(undefined, 's', job)).toBeUndefined();
    const probe = { id: 's', value: 3 };
    expect(patchJob(probe, 's', job)).toBe(probe);
  });
});
