import type { Neighbours, Patches } from './label-patches.ts';

/** Patches that touch each small patch; a patch that touches it several times may be named several times. */
export interface PatchNeighbours {
  /** Where a patch's neighbours begin in `neighbour`; count + 1 entries. */
  start: Uint32Array;
  neighbour: Int32Array;
}

/** Lists the neighbours of the patches marked in `isSmall`; the others' lists stay empty, which keeps memory in bounds. */
export function listNeighbours(
  { labels, count }: Patches,
  width: number,
  neighbours: Neighbours,
  isSmall: Uint8Array,
): PatchNeighbours {
  const start = new Uint32Array(count + 1);
  visitBorders(labels, width, neighbours, (a, b) => {
    if (isSmall[a]) start[a + 1]++;
    if (isSmall[b]) start[b + 1]++;
  });
  for (let patch = 0; patch < count; patch++) start[patch + 1] += start[patch];
  const neighbour = new Int32Array(start[count]);
  const next = start.slice();
  visitBorders(labels, width, neighbours, (a, b) => {
    if (isSmall[a]) neighbour[next[a]++] = b;
    if (isSmall[b]) neighbour[next[b]++] = a;
  });
  return { start, neighbour };
}

/** Every pair of touching pixels of different patches; each pair of pixels once. */
function visitBorders(
  labels: Int32Array,
  width: number,
  neighbours: Neighbours,
  visit: (a: number, b: number) => void,
): void {
  const see = (i: number, j: number) => {
    if (labels[i] !== labels[j] && labels[i] >= 0 && labels[j] >= 0) visit(labels[i], labels[j]);
  };
  for (let i = 0, column = 0; i < labels.length; i++, column = column + 1 === width ? 0 : column + 1) {
    if (column > 0) see(i, i - 1);
    if (i < width) continue;
    see(i, i - width);
    if (neighbours === 8 && column > 0) see(i, i - width - 1);
    if (neighbours === 8 && column + 1 < width) see(i, i - width + 1);
  }
}
