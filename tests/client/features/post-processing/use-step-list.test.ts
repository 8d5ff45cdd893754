import { describe, expect, it } from 'vitest';
import type { PostProcessingStep } from '../../../../shared/contracts/post-processing.ts';
import { areSameSteps, moveStep } from '../../../../client/src/features/post-processing/use-step-list.ts';

const sieve: PostProcessingStep = { id: 'a', isOn: true, kind: 'sieve', minAreaHa: 0.5, neighbours: 4 };
const edit: PostProcessingStep = {
  ...{ id: 'b', isOn: true, kind: 'reclass', polygon: { type: 'Polygon', coordinates: [] } },
  ...{ from: 'any', to: 'nodata', reason: 'Cloud', by: '', at: '' },
};

describe('list of steps', () => {
  it('is the same once the server has signed its edits and ordered the fields its own way', () => {
    const signed = { ...edit, by: 'Lead', at: '2025-06-01T10:00:00.000Z' };
    const { id, kind, ...rest } = sieve;
    expect(areSameSteps([sieve, edit], [{ kind, ...rest, id }, signed])).toBe(true);
  });

  it('differs by a setting, a switch or the order', () => {
    expect(areSameSteps([sieve], [{ ...sieve, minAreaHa: 1 }])).toBe(false);
    expect(areSameSteps([sieve], [{ ...sieve, isOn: false }])).toBe(false);
    expect(areSameSteps([sieve, edit], [edit, sieve])).toBe(false);
  });

  it('moves a step a place and leaves the ends alone', () => {
    expect(moveStep([sieve, edit], 1, -1)).toEqual([edit, sieve]);
    expect(moveStep([sieve, edit], 0, -1)).toEqual([sieve, edit]);
  });
});
