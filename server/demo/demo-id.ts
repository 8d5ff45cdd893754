/**
 * Identifier of the n-th class or sample of the demo: the same on every site, so that the demo's run holds out the same
 * polygons and makes the same map everywhere.
 */
export function demoId(kind: 'class' | 'sample', n: number): string {
  const digits = String(n).padStart(12, '0');
  return `${kind === 'class' ? 'de30c1a5' : 'de305a3b'}-0000-4000-8000-${digits}`;
}
