import { describe, expect, it } from 'vitest';
import {
  addToConfusionMatrix,
  confusionMatrixFromPairs,
  confusionMatrixFromRows,
  createConfusionMatrix,
  sumConfusionMatrices,
  summariseConfusionMatrix,
} from '../../../server/analysis/accuracy/confusion-matrix.ts';
import { computeDisagreement, toPopulationMatrix } from '../../../server/analysis/accuracy/disagreement.ts';
import { computeKappa } from '../../../server/analysis/accuracy/kappa.ts';
import { compareByMcNemar } from '../../../server/analysis/accuracy/mcnemar.ts';
import { countPolygonAgreement } from '../../../server/analysis/accuracy/polygon-agreement.ts';

describe('confusion matrix', () => {
  it('puts the mapped class in rows and the reference class in columns', () => {
    const matrix = confusionMatrixFromPairs([0, 0, 1, 2], [0, 1, 1, 0], 3);
    expect([...matrix.counts]).toEqual([1, 1, 0, 0, 1, 0, 1, 0, 0]);
  });

  it('says null, not 0 or NaN, where a class was never mapped or has no reference', () => {
    const { perClass, overall } = summariseConfusionMatrix(confusionMatrixFromRows([[3, 0, 1], [0, 0, 0], [2, 0, 4]])); // prettier-ignore
    expect(perClass[1]).toEqual({ mapped: 0, reference: 0, correct: 0, users: null, producers: null, f1: null });
    expect(overall).toBe(0.7);
    const neverMapped = summariseConfusionMatrix(confusionMatrixFromRows([[3, 2], [0, 0]])); // prettier-ignore
    expect(neverMapped.perClass[1]).toMatchObject({ users: null, producers: 0, f1: 0 });
    expect(summariseConfusionMatrix(createConfusionMatrix(2)).overall).toBeNull();
  });

  it('has F1 equal to the harmonic mean of user and producer accuracy', () => {
    const { users, producers, f1 } = summariseConfusionMatrix(confusionMatrixFromRows([[7, 3], [1, 9]])).perClass[0]; // prettier-ignore
    expect(f1).toBeCloseTo((2 * users! * producers!) / (users! + producers!), 14);
  });

  it('adds matrices cell by cell', () => {
    const one = confusionMatrixFromRows([[1, 2], [3, 4]]); // prettier-ignore
    expect([...sumConfusionMatrices([one, one], 2).counts]).toEqual([2, 4, 6, 8]);
    expect(() => sumConfusionMatrices([createConfusionMatrix(3)], 2)).toThrow(/3 classes/);
  });

  it('refuses class indices, weights and shapes that make no sense', () => {
    const matrix = createConfusionMatrix(2);
    expect(() => addToConfusionMatrix(matrix, 2, 0)).toThrow(/0\.\.1/);
    expect(() => addToConfusionMatrix(matrix, 0, 0.5)).toThrow(RangeError);
    expect(() => addToConfusionMatrix(matrix, 0, 0, NaN)).toThrow(/weight/);
    expect(() => confusionMatrixFromPairs([0], [0, 1], 2)).toThrow(/1 mapped/);
    expect(() => confusionMatrixFromRows([[1, 2], [3]])).toThrow(/square/);
    expect(() => createConfusionMatrix(0)).toThrow(RangeError);
  });
});

describe('kappa', () => {
  it('is null for an empty matrix and where everything lies in one class', () => {
    expect(computeKappa(createConfusionMatrix(3))).toBeNull();
    expect(computeKappa(confusionMatrixFromRows([[12, 0], [0, 0]]))).toBeNull(); // prettier-ignore
  });

  it('is 1 with variance 0 and no Z for perfect agreement', () => {
    const result = computeKappa(confusionMatrixFromRows([[5, 0], [0, 7]]))!; // prettier-ignore
    expect(result).toMatchObject({ kappa: 1, variance: 0, z: null });
  });

  it('stays the same when map and reference change places', () => {
    const rows = [[12, 3, 0], [2, 20, 5], [1, 0, 9]]; // prettier-ignore
    const swapped = rows.map((_, i) => rows.map((row) => row[i]));
    const a = computeKappa(confusionMatrixFromRows(rows))!;
    const b = computeKappa(confusionMatrixFromRows(swapped))!;
    expect(b.kappa).toBeCloseTo(a.kappa, 14);
    expect(b.variance).toBeCloseTo(a.variance, 14);
  });
});

describe('disagreement', () => {
  it('is all quantity when amounts differ without exchange, all allocation when two cells are exchanged', () => {
    expect(computeDisagreement(confusionMatrixFromRows([[6, 2], [0, 2]]))).toMatchObject({ quantity: 0.2, allocation: 0 }); // prettier-ignore
    expect(computeDisagreement(confusionMatrixFromRows([[3, 2], [2, 3]]))).toMatchObject({ quantity: 0, allocation: 0.4 }); // prettier-ignore
    expect(computeDisagreement(createConfusionMatrix(2))).toBeNull();
  });

  it('weights sample rows by what was mapped', () => {
    const population = toPopulationMatrix(confusionMatrixFromRows([[8, 2], [1, 9]]), [900, 100])!; // prettier-ignore
    [0.72, 0.18, 0.01, 0.09].forEach((p, i) => expect(population.counts[i]).toBeCloseTo(p, 14));
  });

  it('is unknown when a mapped class was not sampled', () => {
    expect(toPopulationMatrix(confusionMatrixFromRows([[8, 2], [0, 0]]), [900, 100])).toBeNull(); // prettier-ignore
    expect(() => toPopulationMatrix(createConfusionMatrix(2), [1])).toThrow(/1 mapped totals/);
  });
});

describe('agreement by polygon', () => {
  it('counts each polygon once, by the class of most of its pixels', () => {
    const { matrix, majority } = countPolygonAgreement(
      [
        { id: 'a', referenceClass: 0, mappedCounts: [90, 10, 0] },
        { id: 'b', referenceClass: 1, mappedCounts: [1, 2, 4] },
      ],
      3,
    );
    expect(majority).toEqual([0, 2]);
    expect([...matrix.counts]).toEqual([1, 0, 0, 0, 0, 0, 0, 1, 0]);
  });

  it('never gives a tie to the reference class, and leaves out polygons without a classified pixel', () => {
    const { majority, skippedIds } = countPolygonAgreement(
      [
        { id: 'tie first', referenceClass: 0, mappedCounts: [5, 5, 5] },
        { id: 'tie last', referenceClass: 2, mappedCounts: [0, 5, 5] },
        { id: 'tie of others', referenceClass: 1, mappedCounts: [5, 1, 5] },
        { id: 'empty', referenceClass: 0, mappedCounts: [0, 0, 0] },
      ],
      3,
    );
    expect(majority).toEqual([1, 1, 0, null]);
    expect(skippedIds).toEqual(['empty']);
  });
});

describe('McNemar test', () => {
  it('has nothing to say when the maps never differ, and refuses fractions', () => {
    expect(compareByMcNemar(0, 0)).toBeNull();
    expect(() => compareByMcNemar(1.5, 0)).toThrow(RangeError);
  });

  it('changes only its sign when the maps change places', () => {
    const a = compareByMcNemar(9, 2)!;
    const b = compareByMcNemar(2, 9)!;
    expect(b.z).toBe(-a.z);
    expect(b.exactPValue).toBe(a.exactPValue);
    // By hand: 2 · (C(11,0) + C(11,1) + C(11,2)) / 2^11 = 134 / 2048.
    expect(a.exactPValue).toBeCloseTo(134 / 2048, 12);
    expect(compareByMcNemar(3, 3)!.exactPValue).toBe(1);
  });
});
