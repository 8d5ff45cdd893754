import { lessThanThreshold } from './float32-threshold.ts';
import type { FlatTree } from './tree-part.ts';

/** A node of a tree as ml-cart writes it to JSON: a row goes left when row[splitColumn] < splitValue. */
export interface CartNode {
  left?: CartNode;
  right?: CartNode;
  splitColumn?: number;
  splitValue?: number;
  gain?: number;
  numberSamples?: number;
  /** One row of class shares; only classes up to the highest in the leaf are there. */
  distribution?: number[][];
}

/**
 * Lays a tree of ml-cart out breadth-first, with columns turned back into feature numbers.
 *
 * Thresholds become 32-bit floats that decide the same for every 32-bit value. A leaf's class is the first with the
 * greatest share, as in the library.
 */
export function flattenCartTree(root: CartNode, usedFeatures: readonly number[]): FlatTree {
  const queue: CartNode[] = [root];
  const feature: number[] = [];
  const threshold: number[] = [];
  const left: number[] = [];
  const leafClass: number[] = [];
  for (let i = 0; i < queue.length; i++) {
    const node = queue[i];
    if (node.left && node.right) {
      feature.push(usedFeatures[node.splitColumn!]);
      threshold.push(lessThanThreshold(node.splitValue!));
      left.push(queue.length);
      leafClass.push(0);
      queue.push(node.left, node.right);
    } else {
      feature.push(-1);
      threshold.push(0);
      left.push(i);
      leafClass.push(indexOfGreatest(node.distribution![0]));
    }
  }
  return {
    feature: Int16Array.from(feature),
    threshold: Float32Array.from(threshold),
    left: Int32Array.from(left),
    leafClass: Uint8Array.from(leafClass),
  };
}

function indexOfGreatest(shares: readonly number[]): number {
  let greatest = 0;
  for (let c = 1; c < shares.length; c++) if (shares[c] > shares[greatest]) greatest = c;
  return greatest;
}
