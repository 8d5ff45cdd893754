import { describe, expect, it } from 'vitest';
import { forEachLimited } from '../../server/jobs/for-each-limited.ts';

const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));
const never = new AbortController().signal;

describe('work for each item, a few at a time', () => {
  it('does every item once and never more at a time than allowed', async () => {
    let atOnce = 0;
    let most = 0;
    const done: number[] = [];
    await forEachLimited([1, 2, 3, 4, 5, 6, 7], 3, never, async (item) => {
      most = Math.max(most, ++atOnce);
      await pause(5);
      atOnce--;
      done.push(item);
    });
    expect(done.sort()).toEqual([1, 2, 3, 4, 5, 6, 7]);
    expect(most).toBe(3);
  });

  it('stops the others at the first failure, waits for them, and throws it', async () => {
    const ended: string[] = [];
    const work = forEachLimited([1, 2, 3, 4], 2, never, async (item, signal) => {
      if (item === 1) throw new Error('the first');
      await pause(10);
      ended.push(signal.aborted ? 'told to stop' : 'left alone');
    });
    await expect(work).rejects.toThrow('the first');
    expect(ended).toEqual(['told to stop']);
  });

  it('throws the reason when stopped from outside', async () => {
    const stop = new AbortController();
    const work = forEachLimited([1, 2, 3], 1, stop.signal, async () => {
      stop.abort('cancelled');
      await pause(1);
    });
    await expect(work).rejects.toBe('cancelled');
  });
});
