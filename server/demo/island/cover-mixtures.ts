import { CLASS } from './class-codes.ts';
import { clamp, smoothstep } from './grid-filters.ts';
import { ISLAND_WIDTH as W } from './island-grid.ts';
import type { Landscape } from './landscape.ts';
import type { MaterialName, Season } from './materials.ts';
import { parcelUnit } from './parcels.ts';
import { hashUnit } from './seeded-rng.ts';
import type { Texture } from './texture.ts';
import { BUILT } from './town-plan.ts';

/** Takes a share of a material into the pixel being mixed; shares add to about 1. */
export type AddMaterial = (name: MaterialName, share: number) => void;

/** Everything a mixture may depend on. */
export interface MixContext {
  land: Landscape;
  texture: Texture;
  season: Season;
}

/** What grows in an arable field, by its lot. */
function mixArable({ land, texture, season }: MixContext, i: number, add: AddMaterial): void {
  const f = land.fields.id[i];
  const crop = parcelUnit(f, 11);
  const patch = clamp(0.16 + 0.1 * texture.middle[i] + 0.22 * (parcelUnit(f, 12) - 0.4), 0, 0.5);
  if (season === 'spring') {
    if (crop < 0.47) {
      add('greenCrop', 1 - patch);
      add('bareSoil', patch);
    } else if (crop < 0.57) {
      add('rapeInFlower', 1 - 0.5 * patch);
      add('greenCrop', 0.5 * patch);
    } else if (crop < 0.9) {
      const cover = 0.5 * parcelUnit(f, 13) * parcelUnit(f, 14);
      add('bareSoil', 1 - cover);
      add('greenCrop', cover);
    } else {
      add('stubble', 0.75);
      add('roughGrass', 0.25);
    }
    return;
  }
  if (crop < 0.46) {
    add('stubble', 1 - patch);
    add('bareSoil', patch * 0.5);
    add('cutGrass', patch * 0.5);
  } else if (crop < 0.56) {
    add('ripeCereal', 1 - 0.5 * patch);
    add('greenCrop', 0.5 * patch);
  } else if (crop < 0.76) {
    const cover = 0.32 * parcelUnit(f, 13) * parcelUnit(f, 14);
    add('bareSoil', 1 - cover);
    add('stubble', cover);
  } else if (crop < 0.93) {
    add('greenCrop', 1 - patch);
    add('bareSoil', patch);
  } else {
    add('stubble', 0.5);
    add('lushGrass', 0.5);
  }
}

function mixPasture({ land, texture, season }: MixContext, i: number, add: AddMaterial): void {
  const f = land.fields.id[i];
  const z = land.relief.elevation[i];
  const upland = smoothstep(60, 210, z) * 0.5 + 0.35 * land.coast.exposure[i];
  const rough = clamp(
    0.14 + upland + 0.5 * (parcelUnit(f, 15) - 0.42) + 0.09 * texture.middle[i] + 0.1 * texture.broad[i],
    0.02,
    0.9,
  );
  const cutShare = parcelUnit(f, 16) < (season === 'spring' ? 0.05 : 0.17) ? 0.75 * (1 - rough) : 0;
  add('roughGrass', rough);
  add('cutGrass', cutShare);
  add('lushGrass', 1 - rough - cutShare);
}

function mixMoor({ land, texture, season }: MixContext, i: number, add: AddMaterial): void {
  const z = land.relief.elevation[i];
  const b = land.compartments.id[i];
  const stony = clamp(0.32 * smoothstep(300, 520, z) + 0.1 * texture.fine[i] * smoothstep(230, 380, z), 0, 0.55);
  const grassy = clamp(
    0.42 + 0.26 * texture.middle[i] + 0.16 * texture.broad[i] - 0.15 * smoothstep(180, 330, z),
    0.05,
    0.95,
  );
  // Keepers burn the heather in small strips, a few each year.
  const strip = land.fields.id[i];
  const burnt = z > 160 && parcelUnit(strip, 17) < 0.09 ? 0.75 * (1 - grassy) : 0;
  const peat = clamp(0.06 + 0.07 * texture.fine[i] + 0.06 * texture.middle[i], 0, 0.3);
  const rest = 1 - stony - peat;
  const felled = land.compartments.edgePx[i] > 0.6 && parcelUnit(b, 4) < 0.11 && z < 330 ? 0.22 : 0;
  add('scree', stony);
  add('peat', peat);
  add('burntHeath', rest * burnt);
  add('bareSoil', season === 'spring' ? 0 : felled * 0.3 * rest);
  add('moorGrass', rest * grassy * (1 - burnt));
  add('heather', rest * (1 - grassy) * (1 - burnt));
}

function mixWoodland({ land, texture }: MixContext, i: number, add: AddMaterial): void {
  const open = clamp(0.08 + 0.07 * texture.middle[i] + 0.05 * texture.fine[i], 0, 0.32);
  const evergreen = clamp(0.13 + 0.16 * texture.broad[i] + 0.1 * texture.middle[i], 0, 0.5);
  add('roughGrass', open);
  add('conifer', evergreen * (1 - open));
  add('broadleaf', (1 - evergreen) * (1 - open));
  if (land.relief.elevation[i] > 210) add('moorGrass', 0.1);
}

function mixPlantation({ land, texture }: MixContext, i: number, add: AddMaterial): void {
  const b = land.compartments.id[i];
  const age = parcelUnit(b, 21);
  const young = age < 0.26 ? 0.78 : age < 0.46 ? 0.34 : 0.05;
  const birch = clamp(0.04 + 0.06 * texture.middle[i], 0, 0.25);
  const ride = land.compartments.edgePx[i] < 1 ? 0.2 : 0;
  add('youngConifer', young * (1 - birch - ride));
  add('conifer', (1 - young) * (1 - birch - ride));
  add('broadleaf', birch);
  add('roughGrass', ride);
}

function mixRock({ land, texture }: MixContext, i: number, add: AddMaterial): void {
  const quarry = land.settlements.quarries.some((q) => Math.hypot(q.x - (i % W), q.y - Math.floor(i / W)) < 11);
  if (quarry) {
    add('quarryFloor', 0.7);
    add('scree', 0.3);
    return;
  }
  const shore = land.coast.isLand[i] === 0 || land.coast.inlandPx[i] < 3;
  const lichen = clamp(0.17 + 0.1 * texture.middle[i] + 0.07 * texture.fine[i], 0, 0.5);
  const scree = clamp(0.4 + 0.3 * texture.middle[i], 0, 1) * (1 - lichen);
  add(shore && land.coast.isLand[i] === 0 ? 'weed' : 'moorGrass', lichen);
  add('scree', scree);
  add('rock', 1 - lichen - scree);
}

function mixFlat({ land, texture }: MixContext, i: number, add: AddMaterial): void {
  const { sea, coast } = land;
  const muddy = clamp(
    0.25 + 0.5 * coast.estuary[i] + 0.22 * texture.middle[i] - 0.25 * smoothstep(-1.6, -0.6, sea.bed[i]),
    0,
    0.95,
  );
  const dry = clamp(smoothstep(-0.9, 0.1, sea.bed[i]) * (1 - coast.estuary[i]) + 0.06 * texture.fine[i], 0, 0.9);
  const weed = clamp(0.05 * texture.fine[i] + 0.06 * texture.middle[i], 0, 0.25);
  add('weed', weed);
  add('dryShoreSand', (1 - weed) * dry);
  add('mud', (1 - weed) * (1 - dry) * muddy);
  add('wetSand', (1 - weed) * (1 - dry) * (1 - muddy));
}

function mixMarsh({ texture }: MixContext, i: number, add: AddMaterial): void {
  // Creeks are the zero lines of a noise field: they branch and wind like real ones.
  const creek = Math.abs(texture.creeks[i]) < 0.13 ? 0.45 : 0;
  const grass = clamp(0.24 + 0.2 * texture.middle[i] + 0.1 * texture.broad[i], 0, 0.7);
  add('mud', creek + 0.08);
  add('roughGrass', grass * (0.92 - creek));
  add('marshPlants', (1 - grass) * (0.92 - creek));
}

function mixBuilt({ land, texture }: MixContext, i: number, add: AddMaterial): void {
  const block = land.plan.block[i];
  const lot = parcelUnit(block, 31);
  const spot = hashUnit(i, 32);
  const streets = (share: number): void => add('asphalt', share);
  switch (land.plan.built[i]) {
    case BUILT.centre:
      streets(0.28);
      add(lot < 0.6 ? 'slate' : 'concrete', 0.34);
      add('slate', 0.2);
      add('tile', 0.1);
      add('broadleaf', 0.08);
      break;
    case BUILT.terrace:
      streets(0.26);
      add(lot < 0.55 ? 'slate' : 'tile', 0.4);
      add('lushGrass', 0.16 + 0.08 * spot);
      add('broadleaf', 0.18 - 0.08 * spot);
      break;
    case BUILT.works: {
      const roofed = lot < 0.55 || spot < 0.25;
      add(roofed ? 'sheetRoof' : 'concrete', roofed ? 0.6 : 0.5);
      streets(roofed ? 0.34 : 0.3);
      add('roughGrass', roofed ? 0.06 : 0.2);
      break;
    }
    case BUILT.street:
      streets(0.68);
      add('concrete', 0.16);
      add('lushGrass', 0.1);
      add('broadleaf', 0.06);
      break;
    case BUILT.runway:
      streets(0.55);
      add('concrete', 0.45);
      break;
    default: {
      // Houses in gardens: what a suburb and a village have in common.
      const green = clamp(0.42 + 0.22 * (spot - 0.5) + 0.12 * texture.fine[i] + 0.14 * (lot - 0.5), 0.15, 0.66);
      add('lushGrass', green * 0.62);
      add('broadleaf', green * 0.38);
      streets((1 - green) * 0.38);
      add(lot < 0.5 ? 'slate' : 'tile', (1 - green) * 0.47);
      add('concrete', (1 - green) * 0.15);
    }
  }
}

/** Mixes the materials of one pixel that is not open water; calls `add` with shares adding to about 1. */
export function mixCover(context: MixContext, trueClass: number, i: number, add: AddMaterial): void {
  switch (trueClass) {
    case CLASS.tidalFlat:
      return mixFlat(context, i, add);
    case CLASS.saltmarsh:
      return mixMarsh(context, i, add);
    case CLASS.broadleafWoodland:
      return mixWoodland(context, i, add);
    case CLASS.coniferPlantation:
      return mixPlantation(context, i, add);
    case CLASS.heathAndMoor:
      return mixMoor(context, i, add);
    case CLASS.improvedPasture:
      return mixPasture(context, i, add);
    case CLASS.arable:
      return mixArable(context, i, add);
    case CLASS.bareRock:
      return mixRock(context, i, add);
    default:
      return mixBuilt(context, i, add);
  }
}
