/** What is used of ml-knn, which ships no types. */
declare module 'ml-knn' {
  /** A position, or an array-like stand-in for one: entries past the features are not read. */
  type PointLike = ArrayLike<number>;

  /** A stored point (features, then label) that halves the points below it. */
  interface KdNode {
    obj: number[];
    left: KdNode | null;
    right: KdNode | null;
  }

  export default class KNN {
    constructor(
      dataset: number[][],
      labels: number[],
      options?: { k?: number; distance?: (a: PointLike, b: PointLike) => number },
    );

    kdTree: {
      root: KdNode;
      /** The nearest stored points (features, then label) with their distances, in no order. */
      nearest(point: number[], maxNodes: number): [point: number[], distance: number][];
    };
  }
}
