import type { NeighbourTree } from './neighbour-tree.ts';

/** Nodes waiting at once at most: one a level, of a tree of at most 2³¹ points. */
const MAX_WAITING = 64;

/**
 * Finds the k nearest points of a tree by Euclidean distance, exactly; points at the same distance count in the order of
 * their training rows.
 *
 * A box is passed over only when its distance is greater than the k-th best. That loses nothing to rounding: a box's
 * distance is summed over the features in the same order as a point's, each term being no greater, and rounding keeps
 * order. The search starts from the distances to the last answer, since the pixel before is most often alike.
 */
export class NeighbourSearch {
  /** Training rows found, nearest first. */
  readonly found: Int32Array;
  readonly #tree: NeighbourTree;
  readonly #k: number;
  readonly #distances: Float64Array;
  /** Place of each found point in the tree's order. */
  readonly #places: Int32Array;
  readonly #waiting = new Int32Array(MAX_WAITING);
  readonly #waitingDistances = new Float64Array(MAX_WAITING);

  /** @throws RangeError when the tree has fewer than k points. */
  constructor(tree: NeighbourTree, k: number) {
    if (k > tree.nPoints) throw new RangeError(`${k} neighbours are wanted of ${tree.nPoints} training rows.`);
    this.#tree = tree;
    this.#k = k;
    this.found = Int32Array.from({ length: k }, (_, i) => i);
    this.#distances = new Float64Array(k);
    this.#places = Int32Array.from({ length: k }, (_, i) => i);
  }

  /** Fills `found` for one position; with a NaN in it every row is as far, and the first k rows are found. */
  find(position: Float64Array): void {
    const { nFeatures, points, rows, first, end, left, boxes } = this.#tree;
    const { found } = this;
    const k = this.#k;
    const distances = this.#distances;
    const places = this.#places;
    const waiting = this.#waiting;
    const waitingDistances = this.#waitingDistances;
    const width = 2 * nFeatures;

    let limit = this.#farthestOfLast(position);
    let nFound = 0;
    let nWaiting = 0;
    let node = 0;
    while (node >= 0) {
      const child = left[node];
      if (child >= 0) {
        let toLeft = 0;
        let toRight = 0;
        let at = child * width;
        for (let f = 0; f < nFeatures; f++, at += 2) {
          const value = position[f];
          let gap = boxes[at] - value;
          if (gap <= 0) gap = value - boxes[at + 1];
          if (gap > 0) toLeft += gap * gap;
          gap = boxes[at + width] - value;
          if (gap <= 0) gap = value - boxes[at + width + 1];
          if (gap > 0) toRight += gap * gap;
        }
        const isLeftNearer = toLeft <= toRight;
        const nearer = isLeftNearer ? toLeft : toRight;
        const farther = isLeftNearer ? toRight : toLeft;
        if (farther <= limit) {
          waiting[nWaiting] = isLeftNearer ? child + 1 : child;
          waitingDistances[nWaiting++] = farther;
        }
        if (nearer <= limit) {
          node = isLeftNearer ? child : child + 1;
          continue;
        }
      } else {
        const last = end[node];
        for (let i = first[node], at = i * nFeatures; i < last; i++, at += nFeatures) {
          let distance = 0;
          for (let f = 0; f < nFeatures; f++) {
            const difference = position[f] - points[at + f];
            distance += difference * difference;
          }
          if (!(distance <= limit)) continue;
          const row = rows[i];
          let j = nFound < k ? nFound : k - 1;
          if (nFound < k) nFound++;
          else if (distance === distances[j] && row > found[j]) continue;
          while (j > 0 && (distances[j - 1] > distance || (distances[j - 1] === distance && found[j - 1] > row))) {
            distances[j] = distances[j - 1];
            found[j] = found[j - 1];
            places[j] = places[j - 1];
            j--;
          }
          distances[j] = distance;
          found[j] = row;
          places[j] = i;
          if (nFound === k) limit = distances[k - 1];
        }
      }
      node = -1;
      while (nWaiting > 0 && node < 0) {
        if (waitingDistances[--nWaiting] <= limit) node = waiting[nWaiting];
      }
    }
    if (nFound < k) for (let j = 0; j < k; j++) found[j] = j;
  }

  /** Distance within which there are k points for sure. */
  #farthestOfLast(position: Float64Array): number {
    const { nFeatures, points } = this.#tree;
    let farthest = 0;
    for (let j = 0; j < this.#k; j++) {
      const at = this.#places[j] * nFeatures;
      let distance = 0;
      for (let f = 0; f < nFeatures; f++) {
        const difference = position[f] - points[at + f];
        distance += difference * difference;
      }
      if (!(distance <= farthest)) farthest = distance;
    }
    return farthest;
  }
}
