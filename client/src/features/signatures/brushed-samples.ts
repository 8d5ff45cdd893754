import type { SignatureSet } from '../../../../shared/contracts/signature.ts';
import type { Brush } from './feature-scatter.tsx';

/** Samples with a pixel in the brush, those with the most pixels in it first. */
export function brushedSamples(
  { points, sampleIds }: Pick<SignatureSet, 'points' | 'sampleIds'>,
  { x: fx, y: fy }: { x: number; y: number },
  shown: ReadonlySet<number>,
  brush: Brush,
): string[] {
  const counts = new Map<number, number>();
  points.classIndex.forEach((c, i) => {
    const [x, y] = [points.values[fx]?.[i] ?? null, points.values[fy]?.[i] ?? null];
    if (!shown.has(c) || x === null || y === null) return;
    if (x < brush.x[0] || x > brush.x[1] || y < brush.y[0] || y > brush.y[1]) return;
    const sample = points.sampleIndex[i] ?? -1;
    counts.set(sample, (counts.get(sample) ?? 0) + 1);
  });
  return [...counts].sort((a, b) => b[1] - a[1]).flatMap(([sample]) => sampleIds[sample] ?? []);
}
