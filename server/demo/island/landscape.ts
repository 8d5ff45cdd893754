import { drawCoastline } from './coastline.ts';
import { ISLAND_HEIGHT as H, ISLAND_WIDTH as W } from './island-grid.ts';
import type { Ground } from './land-cover.ts';
import { classifyGround } from './land-cover.ts';
import { divideGround } from './parcels.ts';
import { raiseRelief } from './relief.ts';
import { layRivers } from './rivers.ts';
import { buildRoads } from './roads.ts';
import type { Roads } from './roads.ts';
import { shapeSeaBed } from './sea-bed.ts';
import { siteSettlements } from './settlements.ts';
import { layOutSettlements } from './town-plan.ts';

/** The island as it is on the ground, before any sensor sees it. */
export interface Landscape extends Ground {
  roads: Roads;
  trueClass: Uint8Array;
}

/** Makes the ground: coast, relief, rivers, sea floor, farms, settlements and, from those, land cover. */
export function makeLandscape(): Landscape {
  const coast = drawCoastline();
  const relief = raiseRelief(coast);
  const rivers = layRivers(coast, relief);
  const sea = shapeSeaBed(coast, rivers);
  const settlements = siteSettlements(coast, relief, rivers);
  const roads = buildRoads(coast, relief, rivers, settlements);
  const plan = layOutSettlements(coast, relief, rivers, settlements, roads);
  const fields = divideGround(W, H, {
    seed: 81,
    districtPx: 68,
    smallestPx: 42,
    largestPx: 290,
    longest: 3.4,
    bendPx: 6,
  });
  const compartments = divideGround(W, H, {
    seed: 91,
    districtPx: 120,
    smallestPx: 130,
    largestPx: 420,
    longest: 2,
    bendPx: 4,
  });
  const ground: Ground = { coast, relief, rivers, sea, settlements, plan, fields, compartments };
  return { ...ground, roads, trueClass: classifyGround(ground) };
}
