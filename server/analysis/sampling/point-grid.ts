/** A place in a grid; row and column need not be whole. */
export interface GridPlace {
  row: number;
  column: number;
}

export interface PointGrid {
  add(place: GridPlace): void;
  /** Whether a place added before lies nearer than the spacing; the spacing itself is far enough. */
  hasNear(place: GridPlace): boolean;
}

/** Buckets as wide as the spacing: whatever is nearer lies in a place's bucket or one of the eight around it. */
export function createPointGrid(spacing: number): PointGrid {
  const side = Math.max(1, spacing);
  const buckets = new Map<string, GridPlace[]>();
  const keyAt = (x: number, y: number): string => `${x},${y}`;
  return {
    add(place) {
      const key = keyAt(Math.floor(place.column / side), Math.floor(place.row / side));
      const bucket = buckets.get(key);
      if (bucket) bucket.push(place);
      else buckets.set(key, [place]);
    },
    hasNear({ row, column }) {
      const [x, y] = [Math.floor(column / side), Math.floor(row / side)];
      for (let dy = -1; dy <= 1; dy++) {
        for (let dx = -1; dx <= 1; dx++) {
          for (const other of buckets.get(keyAt(x + dx, y + dy)) ?? []) {
            if ((other.column - column) ** 2 + (other.row - row) ** 2 < spacing ** 2) return true;
          }
        }
      }
      return false;
    },
  };
}
