import { describe, expect, it } from 'vitest';
import { runStages } from '../../../../client/src/features/runs/run-steps.ts';

const states = (state: 'queued' | 'running', step: string) => runStages({ state, step }).map((stage) => stage.state);

describe('the stages of a run', () => {
  it.each([
    ['Reading training pixels', ['part', 'empty', 'empty', 'empty']],
    ['Training trees', ['done', 'part', 'empty', 'empty']],
    ['Arranging training pixels', ['done', 'part', 'empty', 'empty']],
    ['Mapping strips', ['done', 'done', 'part', 'empty']],
    ['Counting classes', ['done', 'done', 'done', 'part']],
    ['Writing the class map', ['done', 'done', 'done', 'part']],
  ])('follow the step “%s”', (step, expected) => {
    expect(states('running', step)).toEqual(expected);
  });

  it('have not begun while the run waits', () => {
    expect(states('queued', 'Waiting')).toEqual(['empty', 'empty', 'empty', 'empty']);
  });

  it('claim nothing of a step they do not know', () => {
    expect(states('running', 'Something new')).toEqual(['empty', 'empty', 'empty', 'empty']);
  });
});
