import type { PolygonCounts } from './polygon-agreement.ts';

/** The classes met in each polygon, one after the other: polygon i has entries start[i]..start[i+1]. */
export interface PackedPolygons {
  nPolygons: number;
  referenceClass: Uint16Array;
  size: Float64Array;
  start: Uint32Array;
  mappedClass: Uint16Array;
  count: Float64Array;
}

/** Packs polygons, leaving out those without counted pixels. @throws RangeError as `bootstrapPolygons` does. */
export function packPolygons(polygons: readonly PolygonCounts[], nClasses: number): PackedPolygons {
  const kept = polygons.filter(({ id, referenceClass, mappedCounts }) => {
    if (mappedCounts.length !== nClasses) {
      throw new RangeError(`Polygon ${id} has counts of ${mappedCounts.length} classes, expected ${nClasses}.`);
    }
    if (!Number.isInteger(referenceClass) || referenceClass < 0 || referenceClass >= nClasses) {
      throw new RangeError(`Polygon ${id} has reference class ${referenceClass}, expected 0..${nClasses - 1}.`);
    }
    return sumOf(mappedCounts) > 0;
  });
  const start = new Uint32Array(kept.length + 1);
  const mappedClass: number[] = [];
  const count: number[] = [];
  kept.forEach(({ mappedCounts }, i) => {
    for (let k = 0; k < nClasses; k++) {
      if (mappedCounts[k] === 0) continue;
      mappedClass.push(k);
      count.push(mappedCounts[k]);
    }
    start[i + 1] = count.length;
  });
  return {
    nPolygons: kept.length,
    referenceClass: Uint16Array.from(kept, ({ referenceClass }) => referenceClass),
    size: Float64Array.from(kept, ({ mappedCounts }) => sumOf(mappedCounts)),
    start,
    mappedClass: Uint16Array.from(mappedClass),
    count: Float64Array.from(count),
  };
}

function sumOf(counts: ArrayLike<number>): number {
  let sum = 0;
  for (let k = 0; k < counts.length; k++) {
    if (!(counts[k] >= 0) || !Number.isFinite(counts[k])) throw new RangeError(`A count is ${counts[k]}.`);
    sum += counts[k];
  }
  return sum;
}

/** Row totals, column totals and diagonal of a matrix: all that the figures ask for. */
export interface MatrixTotals {
  mapped: Float64Array;
  reference: Float64Array;
  correct: Float64Array;
}

export function createTotals(nClasses: number): MatrixTotals {
  const make = (): Float64Array => new Float64Array(nClasses);
  return { mapped: make(), reference: make(), correct: make() };
}

export function clearTotals({ mapped, reference, correct }: MatrixTotals): void {
  mapped.fill(0);
  reference.fill(0);
  correct.fill(0);
}

/** Adds a polygon to totals, `weight` times; a negative weight takes it out. */
export function addPolygon(totals: MatrixTotals, packed: PackedPolygons, i: number, weight: number): void {
  const { mapped, reference, correct } = totals;
  const { referenceClass, size, start, mappedClass, count } = packed;
  const truth = referenceClass[i];
  reference[truth] += weight * size[i];
  for (let e = start[i]; e < start[i + 1]; e++) {
    const k = mappedClass[e];
    mapped[k] += weight * count[e];
    if (k === truth) correct[k] += weight * count[e];
  }
}

/** Polygons with pixels mapped as, of, and either mapped as or of each class. */
export function countCarriers(
  packed: PackedPolygons,
  nClasses: number,
): Record<'mapped' | 'reference' | 'either', number[]> {
  const make = (): number[] => new Array<number>(nClasses).fill(0);
  const carriers = { mapped: make(), reference: make(), either: make() };
  for (let i = 0; i < packed.nPolygons; i++) {
    const truth = packed.referenceClass[i];
    carriers.reference[truth]++;
    carriers.either[truth]++;
    for (let e = packed.start[i]; e < packed.start[i + 1]; e++) {
      carriers.mapped[packed.mappedClass[e]]++;
      if (packed.mappedClass[e] !== truth) carriers.either[packed.mappedClass[e]]++;
    }
  }
  return carriers;
}
