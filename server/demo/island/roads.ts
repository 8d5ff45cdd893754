import type { Coastline } from './coastline.ts';
import { drawStroke } from './draw-line.ts';
import { blockAverage } from './grid-filters.ts';
import { ISLAND_HEIGHT as H, ISLAND_PIXELS, ISLAND_WIDTH as W } from './island-grid.ts';
import { findLeastCostPath } from './least-cost-path.ts';
import type { Relief } from './relief.ts';
import type { Rivers } from './rivers.ts';
import type { Settlement, Settlements } from './settlements.ts';

const FACTOR = 3;
/** Carriageway with its verges, in 30 m pixels. */
const MAIN_ROAD_PX = 0.85;
const MINOR_ROAD_PX = 0.34;

/** Share of each pixel under a road, 0–1. */
export interface Roads {
  coverage: Float32Array;
  /** 1 on main roads where they fill most of the pixel. */
  isMainRoad: Uint8Array;
}

/** Cost of building a road per coarse cell: steep ground and water are dear. */
function buildingCost(coast: Coastline, relief: Relief, rivers: Rivers) {
  const slope = blockAverage(relief.slope, W, H, FACTOR);
  const land = blockAverage(coast.isLand, W, H, FACTOR);
  const water = blockAverage(rivers.isWater, W, H, FACTOR);
  const height = blockAverage(relief.elevation, W, H, FACTOR);
  const cost = land.values.map((share, i) =>
    share < 1 ? Infinity : 1 + (slope.values[i] / 0.07) ** 2 + 30 * water.values[i] + (height.values[i] / 160) ** 2,
  );
  return { cost, width: land.width, height: land.height };
}

/** Joins every village to the town by the cheapest ways, sharing roads already built. */
export function buildRoads(coast: Coastline, relief: Relief, rivers: Rivers, settlements: Settlements): Roads {
  const grid = buildingCost(coast, relief, rivers);
  const { cost, width, height } = grid;
  const n = width * height;
  const onRoad = new Uint8Array(n);
  const placed = new Uint8Array(n);
  const px = new Float32Array(n);
  const py = new Float32Array(n);
  const main = new Float32Array(ISLAND_PIXELS);
  const minor = new Float32Array(ISLAND_PIXELS);
  const cellOf = (s: Settlement): number => Math.floor(s.y / FACTOR) * width + Math.floor(s.x / FACTOR);

  const draw = (path: number[], coverage: Float32Array, widthPx: number): void => {
    const free = path.filter((cell) => !placed[cell]);
    for (const cell of free) {
      px[cell] = ((cell % width) + 0.5) * FACTOR;
      py[cell] = (Math.floor(cell / width) + 0.5) * FACTOR;
    }
    // Smooth the new stretch; where it meets an older road its end stays put.
    for (let pass = 0; pass < 10; pass++) {
      for (let k = 1; k < path.length - 1; k++) {
        if (placed[path[k]]) continue;
        px[path[k]] = 0.25 * px[path[k - 1]] + 0.5 * px[path[k]] + 0.25 * px[path[k + 1]];
        py[path[k]] = 0.25 * py[path[k - 1]] + 0.5 * py[path[k]] + 0.25 * py[path[k + 1]];
      }
    }
    for (let k = 1; k < path.length; k++) {
      const [a, b] = [path[k - 1], path[k]];
      drawStroke(coverage, px[a], py[a], px[b], py[b], widthPx);
    }
    for (const cell of path) {
      placed[cell] = 1;
      onRoad[cell] = 1;
      if (cost[cell] !== Infinity) cost[cell] = Math.min(cost[cell], 0.5);
    }
  };

  const { town, villages } = settlements;
  const away = (s: Settlement): number => Math.hypot(s.x - town.x, s.y - town.y);
  const isLarge = (s: Settlement): boolean => s.radiusPx >= 9;
  onRoad[cellOf(town)] = placed[cellOf(town)] = 1;
  px[cellOf(town)] = town.x;
  py[cellOf(town)] = town.y;
  const inOrder = [...villages].sort((a, b) => Number(isLarge(b)) - Number(isLarge(a)) || away(a) - away(b));
  for (const village of inOrder) {
    const path = findLeastCostPath(cost, width, height, cellOf(village), (cell) => onRoad[cell] === 1);
    if (path) draw(path, isLarge(village) ? main : minor, isLarge(village) ? MAIN_ROAD_PX : MINOR_ROAD_PX);
  }
  // Lanes between neighbouring villages close the loops.
  for (const village of villages) {
    const others = villages.filter((v) => v !== village);
    others.sort((a, b) => Math.hypot(a.x - village.x, a.y - village.y) - Math.hypot(b.x - village.x, b.y - village.y));
    for (const other of others.slice(0, 2)) {
      const goal = cellOf(other);
      const path = findLeastCostPath(cost, width, height, cellOf(village), (cell) => cell === goal);
      if (path) draw(path, minor, MINOR_ROAD_PX);
    }
  }
  const coverage = main.map((share, i) => Math.max(share, minor[i]));
  const isMainRoad = Uint8Array.from(main, (share, i) => (share > 0.62 && coast.isLand[i] ? 1 : 0));
  return { coverage, isMainRoad };
}
