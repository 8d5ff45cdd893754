import { describe, expect, it } from 'vitest';
import {
  NO_FILTER,
  filterSamples,
  isFiltering,
  sampleAuthors,
} from '../../../../client/src/features/samples/sample-filter.ts';
import { outlinePaths } from '../../../../client/src/features/samples/outline-path.ts';
import { polygonBounds } from '../../../../client/src/features/samples/polygon-bounds.ts';
import { makeClass, makeSample, square } from './sample-fixture.ts';

const classes = new Map(
  [makeClass('water', 'Open water', 0), makeClass('rock', 'Bare rock', 1)].map((one) => [one.id, one]),
);
const samples = [
  makeSample({ id: '1', number: 1 }),
  makeSample({ id: '2', number: 2, classId: 'rock', confidence: 'low', note: 'Shadow of the cliff' }),
  makeSample({ id: '3', number: 31, createdBy: { id: 'b', name: 'Labeller B' } }),
  makeSample({ id: '4', number: 4, createdBy: null }),
];
const idsOf = (filter: Partial<typeof NO_FILTER>) =>
  filterSamples(samples, { ...NO_FILTER, ...filter }, classes).map(({ id }) => id);

describe('the filter of the sample list', () => {
  it('lets everything through when nothing is asked', () => {
    expect(idsOf({})).toEqual(['1', '2', '3', '4']);
    expect(isFiltering({ ...NO_FILTER, text: '  ' })).toBe(false);
  });

  it('finds beginnings of words in number, class, person and note, all of them', () => {
    expect(idsOf({ text: 'ROCK shadow' })).toEqual(['2']);
    expect(idsOf({ text: '31' })).toEqual(['3']);
    expect(idsOf({ text: 'cliff' })).toEqual(['2']);
    expect(idsOf({ text: '1' })).toEqual(['1']);
    expect(idsOf({ text: 'rock water' })).toEqual([]);
  });

  it('narrows by class, person and confidence together', () => {
    expect(idsOf({ classId: 'water', authorId: 'a' })).toEqual(['1']);
    expect(idsOf({ confidence: 'low' })).toEqual(['2']);
    expect(isFiltering({ ...NO_FILTER, confidence: 'low' })).toBe(true);
  });

  it('lists each person once, by name', () => {
    expect(sampleAuthors(samples).map(({ name }) => name)).toEqual(['Labeller A', 'Labeller B']);
  });
});

describe('outlines', () => {
  it('have bounds around all of them', () => {
    expect(polygonBounds([square(0), square(4)])).toEqual([0, 0, 5, 1]);
    expect(polygonBounds([])).toBeNull();
  });

  it('are drawn in one box at one scale, north up', () => {
    // Two unit squares side by side near the equator: 2 × 1, so a 200-wide box has them 100 pixels each.
    const paths = outlinePaths([square(0), square(1)], { width: 200, height: 200, margin: 0 });
    expect(paths?.[0]).toBe('M0.0 150.0L100.0 150.0L100.0 50.0L0.0 50.0L0.0 150.0Z');
    expect(paths?.[1]?.startsWith('M100.0 150.0')).toBe(true);
    expect(outlinePaths([], { width: 1, height: 1, margin: 0 })).toBeNull();
  });
});
