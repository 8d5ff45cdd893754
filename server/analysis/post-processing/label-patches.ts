/** Pixels with one code that hang together. */
export interface Patches {
  /** Patch of each pixel, row-major; −1 without data. Patches are numbered by their first pixel. */
  labels: Int32Array;
  count: number;
  /** Area of each patch in m². */
  areaM2: Float64Array;
  code: Uint8Array;
}

export type Neighbours = 4 | 8;

/**
 * Finds the patches of a class map with two passes and a union-find (Rosenfeld & Pfaltz 1966).
 *
 * @param codes width × height, row-major
 * @param rowAreaM2 area of a pixel of each row
 * @param neighbours 4: pixels hang together by their sides; 8: also by their corners
 */
export function labelPatches(
  codes: Uint8Array,
  width: number,
  rowAreaM2: Float64Array,
  neighbours: Neighbours,
  nodata: number,
): Patches {
  const labels = new Int32Array(codes.length);
  let parent = new Int32Array(1024);
  let count = 0;
  const find = (label: number): number => {
    let root = label;
    while (parent[root] !== root) {
      parent[root] = parent[parent[root]];
      root = parent[root];
    }
    return root;
  };
  const join = (a: number, b: number): number => {
    const [one, other] = [find(a), find(b)];
    const root = Math.min(one, other);
    parent[one] = root;
    parent[other] = root;
    return root;
  };
  for (let i = 0, column = 0; i < codes.length; i++, column = column + 1 === width ? 0 : column + 1) {
    const code = codes[i];
    if (code === nodata) {
      labels[i] = -1;
      continue;
    }
    let label = -1;
    if (column > 0 && codes[i - 1] === code) label = labels[i - 1];
    if (i >= width) {
      const up = i - width;
      if (codes[up] === code) label = label < 0 ? labels[up] : join(label, labels[up]);
      if (neighbours === 8) {
        if (column > 0 && codes[up - 1] === code) label = label < 0 ? labels[up - 1] : join(label, labels[up - 1]);
        if (column + 1 < width && codes[up + 1] === code) {
          label = label < 0 ? labels[up + 1] : join(label, labels[up + 1]);
        }
      }
    }
    if (label < 0) {
      if (count === parent.length) {
        const larger = new Int32Array(parent.length * 2);
        larger.set(parent);
        parent = larger;
      }
      label = count;
      parent[count] = count;
      count++;
    }
    labels[i] = label;
  }
  return numberPatches(codes, width, rowAreaM2, labels, parent, count);
}

/** Second pass: numbers the roots without gaps. A root is the lowest label of its patch, so it is met before the others. */
function numberPatches(
  codes: Uint8Array,
  width: number,
  rowAreaM2: Float64Array,
  labels: Int32Array,
  parent: Int32Array,
  nLabels: number,
): Patches {
  let count = 0;
  for (let label = 0; label < nLabels; label++) {
    parent[label] = parent[label] === label ? count++ : parent[parent[label]];
  }
  const areaM2 = new Float64Array(count);
  const code = new Uint8Array(count);
  for (let i = 0, row = 0, column = 0; i < codes.length; i++) {
    if (labels[i] >= 0) {
      const patch = parent[labels[i]];
      labels[i] = patch;
      areaM2[patch] += rowAreaM2[row];
      code[patch] = codes[i];
    }
    if (++column === width) {
      column = 0;
      row++;
    }
  }
  return { labels, count, areaM2, code };
}
