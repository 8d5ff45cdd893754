import { describe, expect, it } from 'vitest';
import { diffRecipes } from '../../server/services/recipe-diff.ts';

const scene = '11111111-1111-4111-8111-111111111111';
const other = '22222222-2222-4222-8222-222222222222';
const base = {
  sceneId: scene,
  bandIds: [scene, other],
  heldOutShare: 0.3,
  seed: 1,
  classifier: { kind: 'random-forest', trees: 100, featuresPerTree: null },
};

describe('the difference of two recipes', () => {
  it('is nothing for the same recipe', () => {
    expect(diffRecipes(base, structuredClone(base))).toEqual([]);
  });

  it('names settings and values in words', () => {
    const changed = {
      ...base,
      sceneId: other,
      heldOutShare: 0.25,
      classifier: { ...base.classifier, trees: 200, featuresPerTree: 3 },
    };
    const names: Record<string, string> = { [scene]: 'Spring', [other]: 'Late summer' };
    expect(diffRecipes(base, changed, (id) => names[id] ?? null)).toEqual([
      { path: 'sceneId', label: 'Scene', left: 'Spring', right: 'Late summer' },
      { path: 'heldOutShare', label: 'Held out of each class’s polygons', left: '30 %', right: '25 %' },
      { path: 'classifier.trees', label: 'Trees', left: '100', right: '200' },
      {
        path: 'classifier.featuresPerTree',
        label: 'Features drawn for a split or tree',
        left: 'automatic',
        right: '3',
      },
    ]);
  });

  it('shows what only one side has, such as the settings of another classifier', () => {
    const changed = { ...base, classifier: { kind: 'nearest-neighbours', neighbours: 5 } };
    expect(diffRecipes(base, changed)).toEqual([
      { path: 'classifier.kind', label: 'Classifier', left: 'random forest', right: 'k-nearest neighbours' },
      { path: 'classifier.trees', label: 'Trees', left: '100', right: null },
      {
        path: 'classifier.featuresPerTree',
        label: 'Features drawn for a split or tree',
        left: 'automatic',
        right: null,
      },
      { path: 'classifier.neighbours', label: 'Neighbours', left: null, right: '5' },
    ]);
  });

  it('knows settings nobody told it of, and members of lists by their number', () => {
    const a = { ...base, features: { windowPixels: 3, indices: [{ kind: 'ratio', weight: 1 }] } };
    const b = { ...base, features: { windowPixels: 5, indices: [{ kind: 'ratio', weight: 2 }, { kind: 'sum' }] } };
    expect(diffRecipes(a, b)).toEqual([
      { path: 'features.windowPixels', label: 'Features, window pixels', left: '3', right: '5' },
      { path: 'features.indices.1.weight', label: 'Indices, weight 1', left: '1', right: '2' },
      { path: 'features.indices.2.kind', label: 'Indices, kind 2', left: null, right: 'sum' },
    ]);
  });

  it('says when a thing is gone, rather than printing its number', () => {
    expect(diffRecipes(base, { ...base, sceneId: other })[0]).toMatchObject({ left: 'one that is gone' });
  });
});
