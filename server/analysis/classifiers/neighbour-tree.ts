import KNN from 'ml-knn';

/** Points of a node that are compared one by one instead of being halved again. */
const LEAF_POINTS = 16;

/**
 * Points in the order of a k-d tree, with the box around each node's points; everything flat, for `NeighbourSearch`.
 * Node 0 is the root; the children of node i are left[i] and left[i] + 1.
 */
export interface NeighbourTree {
  nFeatures: number;
  nPoints: number;
  /** Row-major, in the tree's order. */
  points: Float64Array;
  /** Training row of each point. */
  rows: Int32Array;
  /** Points first[i]..end[i] lie below node i. */
  first: Int32Array;
  end: Int32Array;
  /** Left child; −1 at a leaf. */
  left: Int32Array;
  /** Lowest and highest value of each feature below node i, side by side, from 2·nFeatures·i on. */
  boxes: Float64Array;
}

/**
 * Order of the points in a k-d tree that ml-knn builds: all of a node's left half, the node's own point, the right
 * half. A node halves its points at place floor(n / 2).
 * Source: Bentley 1975, Communications of the ACM 18:509–517.
 */
export function orderPoints(points: Float64Array, nFeatures: number): Int32Array {
  const nPoints = points.length / nFeatures;
  const { root } = new KNN(
    Array.from({ length: nPoints }, (_, row) => Array.from(points.subarray(row * nFeatures, (row + 1) * nFeatures))),
    // The label stored with a point is its row number.
    Array.from({ length: nPoints }, (_, row) => row),
  ).kdTree;
  const order = new Int32Array(nPoints);
  let next = 0;
  const visit = ({ obj, left, right }: typeof root): void => {
    if (left) visit(left);
    order[next++] = obj[nFeatures];
    if (right) visit(right);
  };
  visit(root);
  return order;
}

/** Lays a tree out flat from the points, row-major, and their order by `orderPoints`. */
export function layOutTree(unordered: Float64Array, order: Int32Array, nFeatures: number): NeighbourTree {
  const nPoints = order.length;
  const points = new Float64Array(nPoints * nFeatures);
  order.forEach((row, i) => {
    points.set(unordered.subarray(row * nFeatures, (row + 1) * nFeatures), i * nFeatures);
  });
  const first = [0];
  const end = [nPoints];
  // A right child also takes its parent's own point, which stands before the points the library halves next.
  const halvedFrom = [0];
  const left: number[] = [];
  for (let node = 0; node < first.length; node++) {
    if (end[node] - first[node] <= LEAF_POINTS) {
      left.push(-1);
      continue;
    }
    const middle = halvedFrom[node] + ((end[node] - halvedFrom[node]) >> 1);
    left.push(first.length);
    first.push(first[node], middle);
    end.push(middle, end[node]);
    halvedFrom.push(halvedFrom[node], middle + 1);
  }
  const boxes = new Float64Array(first.length * 2 * nFeatures);
  for (let node = 0; node < first.length; node++) {
    for (let f = 0; f < nFeatures; f++) {
      let low = Infinity;
      let high = -Infinity;
      for (let i = first[node]; i < end[node]; i++) {
        const value = points[i * nFeatures + f];
        if (value < low) low = value;
        if (value > high) high = value;
      }
      boxes[(node * nFeatures + f) * 2] = low;
      boxes[(node * nFeatures + f) * 2 + 1] = high;
    }
  }
  return {
    nFeatures,
    nPoints,
    points,
    rows: order,
    first: Int32Array.from(first),
    end: Int32Array.from(end),
    left: Int32Array.from(left),
    boxes,
  };
}
