import { describe, expect, it } from 'vitest';
import { describeAccuracy, inHundred } from '../../../../client/src/features/accuracy/describe-accuracy.ts';
import { makeAccuracy } from '../../../fixtures/accuracy-of-run.ts';

const sentence = (
  overall: { value: number | null; low: number | null; high: number | null },
  unit = 'pixel' as const,
) => {
  const { before, figure, after } = describeAccuracy(makeAccuracy({ unit, overall: { ...overall, method: 'm' } }));
  return before + figure + after;
};

describe('the sentence of the accuracy page', () => {
  it('tells an even interval as give or take', () => {
    expect(sentence({ value: 0.873, low: 0.833, high: 0.913 })).toBe(
      'Of the held-out pixels, 87 in 100 carry the right class, give or take 4.',
    );
  });

  it('tells a lopsided interval by its ends', () => {
    expect(sentence({ value: 0.89, low: 0.728, high: 0.963 })).toContain(', somewhere between 73 and 96.');
  });

  it('says when there is no interval, and makes up none', () => {
    expect(sentence({ value: 0.9, low: null, high: null })).toMatch(/; too few polygons for an interval\.$/);
  });

  it('says undefined when there is nothing to measure by', () => {
    const text = sentence({ value: null, low: null, high: null });
    expect(text).toContain('undefined');
    expect(text).not.toMatch(/NaN|\d/);
  });

  it('never rounds some errors away, or some hits', () => {
    expect(inHundred(0.9996)).toBe('99.9');
    expect(inHundred(1)).toBe('100');
    expect(inHundred(0.0004)).toBe('0.1');
    expect(inHundred(0)).toBe('0');
  });
});

describe('the weak class', () => {
  it('is the one with the lowest user’s accuracy, with what it is mixed up with', () => {
    // 15 of 99 is 1 in 6.6.
    expect(describeAccuracy(makeAccuracy()).weak).toBe(
      'Arable is the weak class: about 1 pixel in 7 mapped as arable is really improved pasture.',
    );
  });

  it('is not named while it has too little behind it to tell', () => {
    const { perClass } = makeAccuracy();
    const few = perClass.map((row, index) => (index === 2 ? { ...row, warning: 'Too few to rely on.' } : row));
    expect(describeAccuracy(makeAccuracy({ perClass: few })).weak).toBeNull();
  });

  it('is not named when every class does well', () => {
    const { perClass } = makeAccuracy();
    const good = perClass.map((row) => ({ ...row, users: { value: 0.95, low: 0.9, high: 1 } }));
    expect(describeAccuracy(makeAccuracy({ perClass: good })).weak).toBeNull();
  });
});
