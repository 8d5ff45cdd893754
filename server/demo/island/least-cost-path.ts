import { STEP_LENGTH, STEP_X, STEP_Y } from './island-grid.ts';

/** A binary heap of cells by cost; stale entries are skipped by the caller. */
function makeHeap() {
  const cells: number[] = [];
  const costs: number[] = [];
  return {
    push(cell: number, cost: number): void {
      let i = cells.length;
      cells.push(cell);
      costs.push(cost);
      while (i > 0) {
        const up = (i - 1) >> 1;
        if (costs[up] <= cost) break;
        cells[i] = cells[up];
        costs[i] = costs[up];
        i = up;
      }
      cells[i] = cell;
      costs[i] = cost;
    },
    pop(): { cell: number; cost: number } | null {
      const lastCell = cells.pop();
      const lastCost = costs.pop();
      if (lastCell === undefined || lastCost === undefined) return null;
      if (cells.length === 0) return { cell: lastCell, cost: lastCost };
      const first = { cell: cells[0], cost: costs[0] };
      let i = 0;
      for (;;) {
        let down = 2 * i + 1;
        if (down >= cells.length) break;
        if (down + 1 < cells.length && costs[down + 1] < costs[down]) down++;
        if (costs[down] >= lastCost) break;
        cells[i] = cells[down];
        costs[i] = costs[down];
        i = down;
      }
      cells[i] = lastCell;
      costs[i] = lastCost;
      return first;
    },
  };
}

/**
 * Cheapest 8-connected way from `start` to the first cell where `isGoal` holds (Dijkstra 1959).
 * `cost` is per pixel of way, Infinity where there is none. Returns the cells from start to goal,
 * or null when no goal can be reached.
 */
export function findLeastCostPath(
  cost: Float32Array,
  width: number,
  height: number,
  start: number,
  isGoal: (cell: number) => boolean,
): number[] | null {
  const best = new Float64Array(width * height).fill(Infinity);
  const from = new Int32Array(width * height).fill(-1);
  const heap = makeHeap();
  best[start] = 0;
  heap.push(start, 0);
  for (let top = heap.pop(); top; top = heap.pop()) {
    const { cell } = top;
    if (top.cost > best[cell]) continue;
    if (isGoal(cell)) {
      const path = [cell];
      for (let c = from[cell]; c >= 0; c = from[c]) path.push(c);
      return path.reverse();
    }
    const x = cell % width;
    const y = (cell - x) / width;
    for (let k = 0; k < 8; k++) {
      const xx = x + STEP_X[k];
      const yy = y + STEP_Y[k];
      if (xx < 0 || yy < 0 || xx >= width || yy >= height) continue;
      const j = yy * width + xx;
      const reached = top.cost + STEP_LENGTH[k] * 0.5 * (cost[cell] + cost[j]);
      if (reached < best[j]) {
        best[j] = reached;
        from[j] = cell;
        heap.push(j, reached);
      }
    }
  }
  return null;
}
