import { describe, expect, it } from 'vitest';
import {
  figureParts,
  figurePhrase,
  halfWidth,
  quotedInterval,
} from '../../../../client/src/features/estimates/figure-text.ts';
import type { DesignFigure } from '../../../../shared/contracts/reference.ts';

const figure = (overrides: Partial<DesignFigure> = {}): DesignFigure => ({
  ...{ value: 0.912, standardError: 0.011, low: 0.889, high: 0.931, n: 640, isFragile: false },
  ...{ cautious: { low: 0.7, high: 0.95 }, how: { formula: 'O', source: 'invented', inputs: [] } },
  ...overrides,
});
const nothing = figure({ value: null, standardError: null, low: null, high: null, cautious: null, n: 0 });

describe('what is written of a figure', () => {
  it('is "undefined" where nothing can be computed, never 0 or NaN', () => {
    expect(figureParts(nothing, true)).toEqual({ value: 'undefined', interval: null });
    expect(figurePhrase(nothing)).toBe('undefined');
    expect(quotedInterval(nothing)).toBeNull();
    expect(halfWidth(nothing)).toBeNull();
  });

  it('is a figure of 0 where it is 0', () => {
    expect(figureParts(figure({ value: 0, low: 0, high: 0.02 }), true)).toEqual({
      value: '0.0 %',
      interval: '0.0 to 2.0',
    });
  });

  it('quotes the cautious interval only where points are few and there is one', () => {
    expect(quotedInterval(figure())).toEqual({ low: 0.889, high: 0.931 });
    expect(quotedInterval(figure({ isFragile: true }))).toEqual({ low: 0.7, high: 0.95 });
    expect(quotedInterval(figure({ isFragile: true, cautious: null }))).toEqual({ low: 0.889, high: 0.931 });
  });

  it('says that there is no interval', () => {
    expect(figureParts(figure({ low: null, high: null }), true)).toEqual({ value: '91.2 %', interval: 'no interval' });
  });
});
