import { CLASS } from './class-codes.ts';
import type { Coastline } from './coastline.ts';
import { fractalNoise } from './fractal-noise.ts';
import { smoothstep } from './grid-filters.ts';
import { ISLAND_HEIGHT as H, ISLAND_PIXELS, ISLAND_WIDTH as W } from './island-grid.ts';
import type { Parcels } from './parcels.ts';
import { meanByParcel, parcelUnit } from './parcels.ts';
import type { Relief } from './relief.ts';
import type { Rivers } from './rivers.ts';
import type { SeaBed } from './sea-bed.ts';
import type { Settlements } from './settlements.ts';
import type { TownPlan } from './town-plan.ts';
import { BUILT } from './town-plan.ts';

/** Height of the sea above the bed's zero on the late-summer date, metres: low water. */
export const LOW_WATER_METERS = -2.4;

/** All that land cover depends on. */
export interface Ground {
  coast: Coastline;
  relief: Relief;
  rivers: Rivers;
  sea: SeaBed;
  settlements: Settlements;
  plan: TownPlan;
  fields: Parcels;
  compartments: Parcels;
}

function nearestSite(sites: { x: number; y: number }[], x: number, y: number): number {
  return Math.min(...sites.map((s) => Math.hypot(s.x - x, s.y - y)));
}

/** Class of the sea and shore pixels at low water. */
function classifyShore(ground: Ground, i: number, ragged: number): number {
  const { sea, coast } = ground;
  if (sea.channel[i] || sea.bed[i] < LOW_WATER_METERS) return CLASS.openWater;
  if (coast.estuary[i] > 0.35 && sea.bed[i] > -0.7 && coast.offshorePx[i] < 12 + 5 * ragged) return CLASS.saltmarsh;
  return sea.sand[i] > 0.25 || coast.estuary[i] > 0.2 ? CLASS.tidalFlat : CLASS.bareRock;
}

/** Decides the true class of every pixel for the late-summer date. */
export function classifyGround(ground: Ground): Uint8Array {
  const { coast, relief, rivers, settlements, plan, fields, compartments } = ground;
  const height = fractalNoise(W, H, { seed: 71, wavelengthPx: 110, roughness: 0.58 });
  const woods = fractalNoise(W, H, { seed: 72, wavelengthPx: 54, roughness: 0.6, finestPx: 3.5 });
  const dry = fractalNoise(W, H, { seed: 73, wavelengthPx: 260, roughness: 0.45, finestPx: 12 });
  const crag = fractalNoise(W, H, { seed: 74, wavelengthPx: 34, roughness: 0.66, finestPx: 2.5 });
  const planted = fractalNoise(W, H, { seed: 75, wavelengthPx: 120, roughness: 0.4, finestPx: 30 });
  const fieldHeight = meanByParcel(fields, relief.elevation);
  const fieldSlope = meanByParcel(fields, relief.slope);
  const fieldDry = meanByParcel(fields, dry);
  const fieldWoods = meanByParcel(fields, woods);
  const fieldRagged = meanByParcel(fields, height);
  const blockHeight = meanByParcel(compartments, relief.elevation);
  const blockPlanted = meanByParcel(compartments, planted);
  const blockSlope = meanByParcel(compartments, relief.slope);
  const trueClass = new Uint8Array(ISLAND_PIXELS);

  const classifyLand = (i: number): number => {
    const z = relief.elevation[i];
    const slope = relief.slope[i];
    const f = fields.id[i];
    const b = compartments.id[i];
    const lot = parcelUnit(f, 1);
    const x = i % W;
    const y = (i - x) / W;
    const inland = coast.inlandPx[i];
    if (coast.islandPixels[i] < 900) {
      if (inland < 1.3 + 0.8 * crag[i] || coast.islandPixels[i] < 30) return CLASS.bareRock;
      return coast.islandPixels[i] < 260 ? CLASS.heathAndMoor : CLASS.improvedPasture;
    }
    const marshLine = 7 + 2.4 * height[i];
    if (coast.estuary[i] > 0.3 && inland < 15 + 8 * height[i] && z < marshLine) return CLASS.saltmarsh;
    if (coast.exposure[i] > 0.62 && inland < 1.6 + 1.1 * crag[i] && slope > 0.1) return CLASS.bareRock;
    if (nearestSite(settlements.quarries, x, y) < 4.2 + 2.6 * height[i] + 0.8 * crag[i]) return CLASS.bareRock;

    const craggy = smoothstep(330, 560, z) * 1.55 + smoothstep(0.3, 0.62, slope) * 1.5 * smoothstep(120, 300, z);
    if (craggy > 0.35 && craggy + 0.55 * crag[i] > 1.25) return CLASS.bareRock;

    const isPlanted = blockPlanted[b] > 0.78 + 0.5 * (parcelUnit(b, 3) - 0.5);
    if (isPlanted && blockHeight[b] > 70 && blockHeight[b] < 330 && blockSlope[b] < 0.36) {
      const isRide = compartments.edgePx[i] < 0.55;
      // One compartment in nine has been felled and gone back to heath and brash.
      if (!isRide && z < 345) return parcelUnit(b, 4) < 0.11 ? CLASS.heathAndMoor : CLASS.coniferPlantation;
      return z > 170 ? CLASS.heathAndMoor : CLASS.coniferPlantation;
    }
    const stream = rivers.coverage[i] > 0 ? 0.5 : 0;
    const wooded =
      woods[i] + stream + 1.5 * smoothstep(0.1, 0.3, slope) * smoothstep(300, 190, z) - 1.1 * coast.exposure[i];
    // On slopes woods follow the ground; on the flat they end at field edges.
    if (z < 270 && slope > 0.08 && wooded > 1.62) return CLASS.broadleafWoodland;
    if (z < 200 && fieldWoods[f] > 1.5 + 0.5 * lot) return CLASS.broadleafWoodland;
    const open = 205 + 42 * height[i];
    if (z > open + 45 || slope > 0.42) return CLASS.heathAndMoor;
    if (fieldHeight[f] > 168 + 34 * fieldRagged[f] + 40 * (lot - 0.5) || fieldSlope[f] > 0.26)
      return CLASS.heathAndMoor;
    if (coast.exposure[i] > 0.55 && inland < 9 + 5 * height[i] && lot < 0.75) return CLASS.heathAndMoor;
    if (parcelUnit(f, 2) < 0.035 || (z < 200 && wooded > 1.4 && lot < 0.3)) return CLASS.broadleafWoodland;
    const suited =
      0.3 +
      0.28 * fieldDry[f] -
      smoothstep(45, 120, fieldHeight[f]) * 0.6 -
      smoothstep(0.05, 0.15, fieldSlope[f]) * 0.55;
    const east = smoothstep(380, 900, x) * 0.3 - 0.06;
    return lot < suited + east ? CLASS.arable : CLASS.improvedPasture;
  };

  for (let i = 0; i < ISLAND_PIXELS; i++) {
    if (rivers.isWater[i]) trueClass[i] = CLASS.openWater;
    else if (!coast.isLand[i]) trueClass[i] = classifyShore(ground, i, height[i]);
    else if (plan.built[i] === BUILT.park) trueClass[i] = CLASS.improvedPasture;
    else if (plan.built[i] === BUILT.parkWood) trueClass[i] = CLASS.broadleafWoodland;
    else if (plan.built[i]) trueClass[i] = CLASS.builtUp;
    else trueClass[i] = classifyLand(i);
  }
  return trueClass;
}
