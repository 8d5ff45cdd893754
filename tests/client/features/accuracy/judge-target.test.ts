import { describe, expect, it } from 'vitest';
import { judgeTarget } from '../../../../client/src/features/accuracy/judge-target.ts';

describe('a figure against its target', () => {
  it.each([
    [{ value: 0.93, low: 0.91, high: 0.95 }, 'met'],
    [{ value: 0.93, low: 0.9, high: 0.96 }, 'met'],
    [{ value: 0.85, low: 0.8, high: 0.89 }, 'missed'],
    [{ value: 0.93, low: 0.88, high: 0.97 }, 'uncertain'],
    [{ value: 0.88, low: 0.8, high: 0.9 }, 'uncertain'],
    [{ value: 0.99, low: null, high: null }, 'uncertain'],
    [{ value: null, low: null, high: null }, 'undefined'],
  ] as const)('with %o against 90 %% it is %s', (estimate, verdict) => {
    expect(judgeTarget(estimate, 0.9)).toBe(verdict);
  });
});
