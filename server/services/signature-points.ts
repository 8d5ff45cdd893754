import type { Band } from '../entities/band.ts';
import type { DigestedSample } from './sample-digests.ts';
import { scaleRow, type FeatureColumn } from './signature-features.ts';

const BINS = 24;

/** Pixels of all samples in all columns; not finite where a column is undefined. */
export interface PointSet {
  nPoints: number;
  classIndex: number[];
  sampleIds: string[];
  /** By column, then by point. */
  values: Float64Array[];
}

export function collectPoints(
  byClass: readonly (readonly DigestedSample[])[],
  bands: readonly Band[],
  columns: readonly FeatureColumn[],
): PointSet {
  const nPoints = byClass.flat().reduce((sum, { kept }) => sum + kept.length / bands.length, 0);
  const values = columns.map(() => new Float64Array(nPoints));
  const classIndex: number[] = [];
  const sampleIds: string[] = [];
  byClass.forEach((samples, c) => {
    for (const { id, kept } of samples) {
      for (let row = 0; row < kept.length / bands.length; row++) {
        const scaled = scaleRow(kept, row, bands);
        columns.forEach(({ read }, f) => {
          const column = values[f];
          if (column) column[classIndex.length] = read(scaled);
        });
        classIndex.push(c);
        sampleIds.push(id);
      }
    }
  });
  return { nPoints, classIndex, sampleIds, values };
}

/** Mean and standard deviation (divisor n − 1) of a class's defined values in a column. */
export function momentsOfPoints(points: PointSet, c: number, f: number) {
  const values = pickClass(points, c, f).filter(Number.isFinite);
  if (values.length === 0) return { mean: null, standardDeviation: null };
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
  const squares = values.reduce((sum, value) => sum + (value - mean) ** 2, 0);
  return { mean, standardDeviation: values.length < 2 ? null : Math.sqrt(squares / (values.length - 1)) };
}

/** Covariance between all columns over a class's points, row-major; null where fewer than three points have both. */
export function covarianceOfPoints(points: PointSet, c: number): (number | null)[] {
  const columns = points.values.map((_, f) => pickClass(points, c, f));
  return columns.flatMap((one) => columns.map((two) => covarianceOf(one, two)));
}

function covarianceOf(one: readonly number[], two: readonly number[]): number | null {
  let [n, meanOne, meanTwo, products] = [0, 0, 0, 0];
  one.forEach((x, i) => {
    const y = two[i] ?? Number.NaN;
    if (!Number.isFinite(x) || !Number.isFinite(y)) return;
    const dx = x - meanOne;
    meanOne += dx / ++n;
    meanTwo += (y - meanTwo) / n;
    products += dx * (y - meanTwo);
  });
  return n < 3 ? null : products / (n - 1);
}

function pickClass(points: PointSet, c: number, f: number): number[] {
  return points.classIndex.flatMap((classIndex, i) => (classIndex === c ? [points.values[f]?.[i] ?? Number.NaN] : []));
}

/** Counts by class over bins of equal width, from the least to the greatest defined value of the column. */
export function countBins(points: PointSet, f: number, nClasses: number) {
  const values = points.values[f] ?? new Float64Array();
  let [from, to] = [Infinity, -Infinity];
  for (const value of values) {
    if (!Number.isFinite(value)) continue;
    from = Math.min(from, value);
    to = Math.max(to, value);
  }
  if (!(from < to)) {
    const middle = Number.isFinite(from) ? from : 0;
    [from, to] = [middle - 0.5, middle + 0.5];
  }
  const counts = Array.from({ length: nClasses }, () => new Array<number>(BINS).fill(0));
  values.forEach((value, i) => {
    if (!Number.isFinite(value)) return;
    const bin = Math.min(BINS - 1, Math.floor(((value - from) / (to - from)) * BINS));
    const row = counts[points.classIndex[i] ?? -1];
    if (row) row[bin] = (row[bin] ?? 0) + 1;
  });
  return { from, to, counts };
}
