import { describe, expect, it } from 'vitest';
import { forecastTurns, pickNext, type WaitingJob } from '../../server/jobs/fair-order.ts';

let queued = 0;
function makeJob(id: string, projectId: string, change: Partial<WaitingJob> = {}): WaitingJob {
  return { id, projectId, priority: 'normal', place: null, queuedAtMs: ++queued, ...change };
}

const nobody = { working: new Map<string, number>(), servedAtMs: new Map<string, number>(), perProject: 1 };

/** Ids in the order they would be served, one at a time, each for a second. */
function serve(waiting: readonly WaitingJob[], change: object = {}): string[] {
  return forecastTurns({ ...nobody, waiting, ...change }, [], 1, () => 1).map(({ id }) => id);
}

describe('the next job', () => {
  it('serves a project that asked last before a second job of one with a hundred', () => {
    const many = Array.from({ length: 100 }, (_, i) => makeJob(`a${i}`, 'a'));
    const order = serve([...many, makeJob('b0', 'b'), makeJob('b1', 'b')]);
    expect(order.slice(0, 5)).toEqual(['a0', 'b0', 'a1', 'b1', 'a2']);
    expect(order).toHaveLength(102);
  });

  it('prefers the project with the fewest jobs at work, then the one served longest ago', () => {
    const waiting = [makeJob('a', 'a'), makeJob('b', 'b'), makeJob('c', 'c')];
    const served = new Map([
      ['a', 10],
      ['b', 30],
      ['c', 20],
    ]);
    const state = { ...nobody, waiting, servedAtMs: served, perProject: 2 };
    expect(pickNext({ ...state, working: new Map([['a', 1]]) })?.id).toBe('c');
    expect(pickNext(state)?.id).toBe('a');
  });

  it('lets priority decide within a project, never between projects', () => {
    const waiting = [
      makeJob('a-normal', 'a'),
      makeJob('a-low', 'a', { priority: 'low' }),
      makeJob('b-normal', 'b'),
      makeJob('a-high', 'a', { priority: 'high' }),
      makeJob('a-high-2', 'a', { priority: 'high' }),
    ];
    expect(serve(waiting)).toEqual(['a-high', 'b-normal', 'a-high-2', 'a-normal', 'a-low']);
  });

  it('passes over a project at its limit, whatever its priority or place', () => {
    const waiting = [makeJob('a', 'a', { priority: 'high', place: 1 }), makeJob('b', 'b', { priority: 'low' })];
    expect(pickNext({ ...nobody, waiting, working: new Map([['a', 1]]) })?.id).toBe('b');
    expect(pickNext({ ...nobody, waiting: waiting.slice(0, 1), working: new Map([['a', 1]]) })).toBeNull();
  });

  it('takes what an administrator placed first, in that order', () => {
    const waiting = [
      makeJob('fair', 'a', { priority: 'high' }),
      makeJob('second', 'b', { place: 2 }),
      makeJob('first', 'c', { place: 1, priority: 'low' }),
    ];
    expect(serve(waiting)).toEqual(['first', 'second', 'fair']);
  });
});

describe('the forecast', () => {
  it('adds up what works and what goes before', () => {
    const waiting = [makeJob('a', 'a'), makeJob('b', 'b')];
    const turns = forecastTurns({ ...nobody, waiting }, [{ projectId: 'x', endsInSeconds: 30 }], 1, () => 100);
    expect(turns).toEqual([
      { id: 'a', position: 1, startsInSeconds: 30 },
      { id: 'b', position: 2, startsInSeconds: 130 },
    ]);
  });

  it('says nothing of a start that hangs on work of unknown length', () => {
    const waiting = [makeJob('a', 'a'), makeJob('b', 'b')];
    const turns = forecastTurns({ ...nobody, waiting }, [], 1, (id) => (id === 'a' ? null : 5));
    expect(turns.map(({ startsInSeconds }) => startsInSeconds)).toEqual([0, null]);
  });

  it('fills several places, as far as a project’s limit lets it', () => {
    const waiting = [makeJob('a0', 'a'), makeJob('a1', 'a'), makeJob('b0', 'b')];
    const turns = forecastTurns({ ...nobody, waiting }, [], 2, (id) => (id === 'a0' ? 50 : 10));
    expect(turns).toEqual([
      { id: 'a0', position: 1, startsInSeconds: 0 },
      { id: 'b0', position: 2, startsInSeconds: 0 },
      { id: 'a1', position: 3, startsInSeconds: 50 },
    ]);
  });
});
