import { describe, expect, it } from 'vitest';
import { measureAccuracy, measureOverall, type HeldOutPolygon } from '../../server/services/accuracy-figures.ts';

const classes = [
  { id: 'a', code: 3, name: 'Open water', colour: '#2266aa' },
  { id: 'b', code: 7, name: 'Heath', colour: '#aa66cc' },
  { id: 'c', code: 9, name: 'Bare rock', colour: '#999999' },
];
const polygon = (classIndex: number, mappedPixels: Record<string, number>): HeldOutPolygon => ({
  id: String(Math.random()),
  classIndex,
  mappedPixels,
});

describe('accuracy figures', () => {
  it('leave a figure that cannot be computed undefined, never 0', () => {
    // Nothing is bare rock, on the map or in the reference.
    const { perClass } = measureAccuracy([polygon(0, { 3: 10 }), polygon(1, { 7: 4, 3: 6 })], classes, 'pixel');
    const none = { value: null, low: null, high: null };
    expect(perClass[2]).toMatchObject({ users: none, producers: none, f1: null, mappedCount: 0, referenceCount: 0 });
    const empty = measureAccuracy([polygon(0, { 255: 10 })], classes, 'pixel');
    expect(empty.overall).toMatchObject(none);
    expect(empty.kappa).toMatchObject({ value: null, standardError: null });
    expect(empty).toMatchObject({
      quantityDisagreement: null,
      allocationDisagreement: null,
      total: 0,
      unmapped: [10, 0, 0],
    });
  });

  it('say pixels that the map leaves out, and count them in no figure', () => {
    const { unmapped, total, overall } = measureAccuracy(
      [polygon(0, { 3: 8, 255: 2 }), polygon(0, { 3: 4, 7: 4, 0: 1 })],
      classes,
      'pixel',
    );
    expect(unmapped).toEqual([3, 0, 0]);
    expect(total).toBe(16);
    expect(overall.value).toBe(12 / 16);
  });

  it('give no interval to a single polygon, however many pixels it has', () => {
    expect(measureOverall([polygon(0, { 3: 900, 7: 100 })], classes, 'pixel')).toEqual({
      value: 0.9,
      low: null,
      high: null,
    });
  });

  it('do not take polygons that are all right for proof of a perfect map', () => {
    // Wilson 1927 for 4 of 4: low = 1 / (1 + z²/4) = 0.510109 with z = 1.959964, worked by hand.
    const all = [1, 2, 3, 4].map(() => polygon(0, { 3: 1000 }));
    const { value, low, high } = measureOverall(all, classes, 'pixel');
    expect(value).toBe(1);
    expect(low).toBeCloseTo(0.510109, 6);
    expect(high).toBe(1);
  });

  it('widen the interval when polygons differ, and give kappa one of its own', () => {
    const like = Array.from({ length: 12 }, (_, i) => polygon(i % 2, i % 2 ? { 7: 80, 3: 20 } : { 3: 80, 7: 20 }));
    const unlike = Array.from({ length: 12 }, (_, i) => {
      const right = i % 4 < 2 ? 100 : 60;
      return polygon(i % 2, i % 2 ? { 7: right, 3: 100 - right } : { 3: right, 7: 100 - right });
    });
    const widthOf = (polygons: HeldOutPolygon[]) => {
      const { overall, kappa } = measureAccuracy(polygons, classes, 'pixel');
      expect(overall.value).toBeCloseTo(0.8, 12);
      expect(kappa.value).toBeCloseTo(0.6, 12);
      return { overall: overall.high! - overall.low!, kappa: kappa.low === null ? null : kappa.high! - kappa.low };
    };
    // Polygons all alike: nothing is known of their spread but Wilson's for 12 of them, and of kappa nothing.
    expect(widthOf(like)).toEqual({ overall: expect.closeTo(0.418, 2), kappa: null });
    // Standard deviation .2 between 12 polygons: ± t·.2·√(12/11)/√12 with about 10 degrees, .13; kappa twice that.
    const { overall, kappa } = widthOf(unlike);
    expect(overall).toBeCloseTo(0.27, 1);
    expect(kappa! / overall).toBeCloseTo(2, 0);
    expect(measureOverall(unlike, classes, 'pixel')).toMatchObject({ value: expect.closeTo(0.8, 12) });
  });

  it('are no narrower than with pixels as independent, however alike a few polygons happen to be', () => {
    const nearly = [90, 91, 90, 91].map((right, i) => polygon(i % 2, { 3: i % 2 ? 100 - right : right, 7: i % 2 ? right : 100 - right })); // prettier-ignore
    const { low, high } = measureOverall(nearly, classes, 'pixel');
    // Wilson 1927 for 362 of 400, by hand: .872334 to .930015.
    expect(low).toBeLessThan(0.8724);
    expect(high).toBeGreaterThan(0.9299);
  });

  it('count a polygon once, and a tie against the map', () => {
    const { matrix, overall } = measureAccuracy(
      [polygon(0, { 3: 5, 7: 5 }), polygon(1, { 7: 9, 3: 1 })],
      classes,
      'polygon',
    );
    expect(matrix).toEqual([
      [0, 0, 0],
      [1, 1, 0],
      [0, 0, 0],
    ]);
    expect(overall.value).toBe(0.5);
  });

  it('warn of few units by the rule of thumb, and stop warning when there are enough', () => {
    const many = Array.from({ length: 50 }, () => polygon(0, { 3: 1 }));
    const { perClass } = measureAccuracy([...many, polygon(1, { 7: 60 })], classes, 'polygon');
    expect(perClass[0]!.warning).toBeNull();
    expect(perClass[1]!.warning).toMatch(
      /^Too few to rely on: 1 held-out polygon; .*Congalton 1991.*; 1 held-out polygon;/,
    );
  });
});
