import type { BandStatistics } from '../../../shared/contracts/scene.ts';

/**
 * The stored value (DN) below which a share of a band's valid pixels lies, read off the histogram with straight lines
 * inside a bin. The 2nd and 98th percentile are the band's exact ones.
 *
 * @param percent 0–100
 */
export function bandPercentile(statistics: BandStatistics, percent: number): number {
  if (percent <= 0) return statistics.min;
  if (percent >= 100) return statistics.max;
  if (percent === 2) return statistics.p2;
  if (percent === 98) return statistics.p98;
  const { low, high, counts } = statistics.histogram;
  const total = counts.reduce((sum, count) => sum + count, 0);
  if (total === 0) return statistics.min;
  const binWidth = (high - low) / counts.length;
  const wanted = (percent / 100) * total;
  let passed = 0;
  for (const [index, count] of counts.entries()) {
    if (count > 0 && passed + count >= wanted) return low + binWidth * (index + (wanted - passed) / count);
    passed += count;
  }
  return high;
}
