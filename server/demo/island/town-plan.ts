import type { Coastline } from './coastline.ts';
import { fractalNoise } from './fractal-noise.ts';
import { clamp, gaussianBlur } from './grid-filters.ts';
import { ISLAND_HEIGHT as H, ISLAND_PIXELS, ISLAND_WIDTH as W } from './island-grid.ts';
import { divideGround, parcelUnit } from './parcels.ts';
import type { Relief } from './relief.ts';
import type { Rivers } from './rivers.ts';
import type { Roads } from './roads.ts';
import type { Settlement, Settlements } from './settlements.ts';

/** What stands on a pixel of built ground. */
export const BUILT = {
  none: 0,
  centre: 1,
  terrace: 2,
  suburb: 3,
  works: 4,
  village: 5,
  street: 6,
  runway: 7,
  park: 8,
  parkWood: 9,
} as const;

/** The plan of the town, its villages and the airfield. */
export interface TownPlan {
  /** One of {@link BUILT} per pixel. */
  built: Uint8Array;
  /** Number of the town block, 0 outside the town. */
  block: Int32Array;
}

const HALF = 100;

function townReach(plan: Settlement, x: number, y: number, noise: number, road: number): number {
  const d = Math.hypot((x - plan.x) / 1.25, y - plan.y) / plan.radiusPx;
  return Math.exp(-d * d) * (1 + 0.3 * noise) + 0.6 * road * Math.exp(-((d / 1.7) ** 2));
}

/** Which use a town block has: dense in the middle, works by the water, houses further out. */
function blockUse(block: number, reach: number, estuarySide: number): number {
  const lot = parcelUnit(block, 61);
  if (lot < 0.08) return BUILT.park;
  if (lot < 0.11) return BUILT.parkWood;
  if (estuarySide > 0.25 && lot > 0.42) return BUILT.works;
  if (reach > 0.86) return BUILT.centre;
  if (reach > 0.62) return lot > 0.3 ? BUILT.terrace : BUILT.suburb;
  return lot > 0.92 ? BUILT.works : BUILT.suburb;
}

/** Lays out streets and blocks of the town, the villages along their roads, and the runway. */
export function layOutSettlements(
  coast: Coastline,
  relief: Relief,
  rivers: Rivers,
  settlements: Settlements,
  roads: Roads,
): TownPlan {
  const built = new Uint8Array(ISLAND_PIXELS);
  const block = new Int32Array(ISLAND_PIXELS);
  const ragged = fractalNoise(W, H, { seed: 62, wavelengthPx: 16, roughness: 0.65 });
  const nearRoad = gaussianBlur(roads.coverage, W, H, 2.2);
  const mayBuild = (i: number): boolean =>
    coast.isLand[i] === 1 && rivers.isWater[i] === 0 && relief.slope[i] < 0.3 && relief.elevation[i] > 0.5;
  const around = (s: Settlement, half: number, visit: (x: number, y: number, i: number) => void): void => {
    for (let y = Math.max(0, Math.round(s.y) - half); y < Math.min(H, Math.round(s.y) + half); y++) {
      for (let x = Math.max(0, Math.round(s.x) - half); x < Math.min(W, Math.round(s.x) + half); x++) {
        const i = y * W + x;
        if (mayBuild(i)) visit(x, y, i);
      }
    }
  };

  const { town } = settlements;
  const blocks = divideGround(HALF * 2, HALF * 2, {
    seed: 63,
    districtPx: 30,
    smallestPx: 13,
    largestPx: 46,
    longest: 2.4,
    bendPx: 1.6,
  });
  around(town, HALF, (x, y, i) => {
    const reach = townReach(town, x, y, ragged[i], clamp(2.2 * nearRoad[i], 0, 1));
    if (reach < 0.45) return;
    const b = (y - Math.round(town.y) + HALF) * HALF * 2 + (x - Math.round(town.x) + HALF);
    block[i] = blocks.id[b] + 1;
    const seaward = (x - town.x) * 0.6 + (y - town.y) * 0.8;
    const use = blockUse(blocks.id[b], reach, seaward / 40);
    const isStreet = blocks.isDistrictEdge[b] === 1 || (blocks.edgePx[b] < 0.5 && use !== BUILT.park);
    built[i] = isStreet ? BUILT.street : use;
  });
  for (const village of settlements.villages) {
    around(village, Math.ceil(village.radiusPx * 3), (x, y, i) => {
      if (built[i]) return;
      const reach = townReach(village, x, y, 2 * ragged[i], clamp(3.4 * nearRoad[i], 0, 1));
      if (reach > 0.62) built[i] = BUILT.village;
    });
  }
  const { airfield } = settlements;
  around({ ...airfield, radiusPx: 30 }, 40, (x, y, i) => {
    const along = (x - airfield.x) * Math.cos(airfield.turn) + (y - airfield.y) * Math.sin(airfield.turn);
    const across = -(x - airfield.x) * Math.sin(airfield.turn) + (y - airfield.y) * Math.cos(airfield.turn);
    const onStrip = Math.abs(along) < 25 && Math.abs(across) < 0.95;
    const onApron = Math.abs(along - 4) < 4 && across > 0 && across < 6;
    if (onStrip || onApron) built[i] = BUILT.runway;
  });
  for (let i = 0; i < ISLAND_PIXELS; i++) {
    if (roads.isMainRoad[i] && !built[i] && mayBuild(i)) built[i] = BUILT.street;
  }
  return { built, block };
}
