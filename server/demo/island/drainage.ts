import { STEP_LENGTH, STEP_X, STEP_Y } from './island-grid.ts';

/** Which way water runs over a grid of land cells. */
export interface Drainage {
  /** Land cells from the coast upwards: each comes after the cell it drains to. */
  order: Int32Array;
  /** The cell each land cell drains to (a sea cell at a mouth); -1 at sea. */
  receiver: Int32Array;
  /** Elevation with every hollow filled to its spill level, metres. */
  filled: Float32Array;
}

/** A first-in first-out queue per elevation step: a priority queue for keys that never fall. */
function makeBucketQueue(nCells: number, nBuckets: number) {
  const head = new Int32Array(nBuckets).fill(-1);
  const tail = new Int32Array(nBuckets).fill(-1);
  const next = new Int32Array(nCells).fill(-1);
  let lowest = 0;
  return {
    push(cell: number, bucket: number): void {
      const b = Math.max(lowest, Math.min(nBuckets - 1, bucket));
      if (head[b] < 0) head[b] = cell;
      else next[tail[b]] = cell;
      tail[b] = cell;
    },
    pop(): number {
      while (lowest < nBuckets && head[lowest] < 0) lowest++;
      if (lowest === nBuckets) return -1;
      const cell = head[lowest];
      head[lowest] = next[cell];
      next[cell] = -1;
      return cell;
    },
  };
}

/**
 * Routes water from every land cell to the sea: priority flood (Barnes, Lehman & Mulla 2014) from
 * the coast, then the steepest way down among the cells flooded before.
 * `elevation` in metres above the sea, `stepMeters` the height step the flood tells apart.
 */
export function routeDrainage(
  elevation: Float32Array,
  isLand: Uint8Array,
  width: number,
  height: number,
  stepMeters: number,
): Drainage {
  const n = width * height;
  let highest = 0;
  let nLand = 0;
  for (let i = 0; i < n; i++) {
    if (!isLand[i]) continue;
    nLand++;
    if (elevation[i] > highest) highest = elevation[i];
  }
  const queue = makeBucketQueue(n, Math.ceil(highest / stepMeters) + 3);
  const filled = new Float32Array(n);
  const receiver = new Int32Array(n).fill(-1);
  const queued = new Uint8Array(n);
  const settled = new Uint8Array(n);
  const order = new Int32Array(nLand);
  let nOrdered = 0;

  const floodNeighbours = (cell: number): void => {
    const x = cell % width;
    const y = (cell - x) / width;
    for (let k = 0; k < 8; k++) {
      const xx = x + STEP_X[k];
      const yy = y + STEP_Y[k];
      if (xx < 0 || yy < 0 || xx >= width || yy >= height) continue;
      const j = yy * width + xx;
      if (queued[j] || !isLand[j]) continue;
      queued[j] = 1;
      receiver[j] = cell;
      filled[j] = Math.max(elevation[j], filled[cell]);
      queue.push(j, Math.floor(filled[j] / stepMeters) + 1);
    }
  };
  for (let i = 0; i < n; i++) {
    if (isLand[i]) continue;
    settled[i] = 1;
    floodNeighbours(i);
  }
  for (let cell = queue.pop(); cell >= 0; cell = queue.pop()) {
    const x = cell % width;
    const y = (cell - x) / width;
    let steepest = 0;
    for (let k = 0; k < 8; k++) {
      const xx = x + STEP_X[k];
      const yy = y + STEP_Y[k];
      if (xx < 0 || yy < 0 || xx >= width || yy >= height) continue;
      const j = yy * width + xx;
      if (!settled[j]) continue;
      const fall = (filled[cell] - filled[j]) / STEP_LENGTH[k];
      if (fall > steepest) {
        steepest = fall;
        receiver[cell] = j;
      }
    }
    settled[cell] = 1;
    order[nOrdered++] = cell;
    floodNeighbours(cell);
  }
  return { order, receiver, filled };
}

/** Number of cells that drain through each cell, itself included. */
export function accumulateFlow(drainage: Drainage): Float32Array {
  const flow = new Float32Array(drainage.receiver.length);
  for (let k = drainage.order.length - 1; k >= 0; k--) {
    const cell = drainage.order[k];
    flow[cell] += 1;
    flow[drainage.receiver[cell]] += flow[cell];
  }
  return flow;
}
