/** Connected patches of equal value. */
export interface Patches {
  /** Patch number of each pixel, from 0. */
  id: Int32Array;
  /** Pixels in each patch. */
  nPixels: number[];
}

/** Numbers the 4-connected patches of equal value of a row-major grid. */
export function labelPatches(values: Uint8Array, width: number, height: number): Patches {
  const id = new Int32Array(width * height).fill(-1);
  const stack = new Int32Array(width * height);
  const nPixels: number[] = [];
  for (let start = 0; start < id.length; start++) {
    if (id[start] >= 0) continue;
    const patch = nPixels.length;
    const value = values[start];
    let size = 0;
    let top = 0;
    stack[top++] = start;
    id[start] = patch;
    while (top > 0) {
      const i = stack[--top];
      size++;
      const x = i % width;
      const visit = (j: number): void => {
        if (id[j] < 0 && values[j] === value) {
          id[j] = patch;
          stack[top++] = j;
        }
      };
      if (x > 0) visit(i - 1);
      if (x < width - 1) visit(i + 1);
      if (i >= width) visit(i - width);
      if (i < id.length - width) visit(i + width);
    }
    nPixels.push(size);
  }
  return { id, nPixels };
}
