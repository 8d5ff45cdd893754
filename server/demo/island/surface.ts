import { CLASS } from './class-codes.ts';
import type { MixContext } from './cover-mixtures.ts';
import { mixCover } from './cover-mixtures.ts';
import { clamp, smoothstep } from './grid-filters.ts';
import { relativeIllumination } from './illumination.ts';
import type { Sun } from './illumination.ts';
import { ISLAND_PIXELS } from './island-grid.ts';
import { LOW_WATER_METERS } from './land-cover.ts';
import type { Landscape } from './landscape.ts';
import type { Season } from './materials.ts';
import { MATERIAL_NAMES, MATERIALS, materialIndex, N_REFLECTIVE, reflectanceTable } from './materials.ts';
import { parcelUnit } from './parcels.ts';
import { colourSea, SILT } from './sea-colour.ts';
import { hashUnit } from './seeded-rng.ts';
import type { Texture } from './texture.ts';

/** Sky, tide and air at the moment of a scene. */
export interface Moment {
  season: Season;
  sun: Sun;
  /** Height of the sea above the bed's zero, metres. */
  tideMeters: number;
  airKelvin: number;
  seaKelvin: number;
}

/** The late-summer scene is taken at low water, the spring one with the tide half in. */
export const MOMENTS: Record<Season, Moment> = {
  spring: {
    season: 'spring',
    sun: { azimuthDegrees: 156, elevationDegrees: 45 },
    tideMeters: -1.15,
    airKelvin: 284.5,
    seaKelvin: 282.4,
  },
  lateSummer: {
    season: 'lateSummer',
    sun: { azimuthDegrees: 152, elevationDegrees: 36 },
    tideMeters: LOW_WATER_METERS,
    airKelvin: 289.5,
    seaKelvin: 286.6,
  },
};

/** The ground as light and heat leave it. */
export interface Surface {
  /** Six reflectance planes in band order, each one value per 30 m pixel. */
  reflectance: Float32Array[];
  /** Temperature of the surface, kelvin. */
  temperature: Float32Array;
}

/** Share of light that comes from the sky rather than the sun, per band. */
const SKYLIGHT = [0.24, 0.17, 0.12, 0.07, 0.04, 0.03] as const;
/** How unevenly each class reflects from pixel to pixel and field to field, by class code. */
const UNEVENNESS = [0, 0.02, 0.12, 0.12, 0.13, 0.15, 0.13, 0.09, 0.1, 0.16, 0.2] as const;

/** Mixes, lights and warms the ground for one date. */
export function renderSurface(land: Landscape, texture: Texture, moment: Moment): Surface {
  const { season, tideMeters } = moment;
  const { coast, relief, rivers, fields, compartments, roads, sea, trueClass } = land;
  const table = reflectanceTable(season);
  const context: MixContext = { land, texture, season };
  const shares = new Float64Array(MATERIAL_NAMES.length);
  const position = new Map(MATERIAL_NAMES.map((name, m) => [name, m]));
  const add = (name: (typeof MATERIAL_NAMES)[number], share: number): void => {
    shares[position.get(name)!] += share;
  };
  const warmth = MATERIAL_NAMES.map((name) => MATERIALS[name].warmthKelvin * (season === 'spring' ? 0.8 : 1));
  const broadleaf = materialIndex('broadleaf');
  const water = materialIndex('water');
  const asphalt = materialIndex('asphalt');
  const lit = relativeIllumination(relief.elevation, moment.sun);
  const reflectance = Array.from({ length: N_REFLECTIVE }, () => new Float32Array(ISLAND_PIXELS));
  const temperature = new Float32Array(ISLAND_PIXELS);
  const spectrum = new Float64Array(N_REFLECTIVE);

  /** Puts `share` of a material over what the pixel already holds. */
  const overlay = (material: number, share: number): void => {
    for (let m = 0; m < shares.length; m++) shares[m] *= 1 - share;
    shares[material] += share;
  };

  for (let i = 0; i < ISLAND_PIXELS; i++) {
    const code = trueClass[i];
    const underSea = coast.isLand[i] === 0 && (code === CLASS.openWater || sea.bed[i] < tideMeters);
    if (underSea) {
      colourSea(land, texture, i, Math.max(0.02, tideMeters - sea.bed[i]), spectrum);
      for (let b = 0; b < N_REFLECTIVE; b++) reflectance[b][i] = spectrum[b];
      temperature[i] = moment.seaKelvin + 0.35 * texture.broad[i] + 1.1 * sea.silt[i] * (season === 'spring' ? 1 : 0.7);
      continue;
    }
    shares.fill(0);
    const farmed = code === CLASS.improvedPasture || code === CLASS.arable;
    if (code === CLASS.openWater) shares[water] = 1;
    else mixCover(context, code, i, add);
    if (farmed) {
      const hedgerow = 0.34 * smoothstep(0.95, 0.2, fields.edgePx[i]) * smoothstep(-0.9, 0.5, texture.middle[i] + 0.4);
      overlay(broadleaf, hedgerow);
      if (hashUnit(fields.id[i], 41) < 0.02 && fields.edgePx[i] < 1 && hashUnit(i, 42) < 0.12) overlay(asphalt, 0.4);
    }
    if (farmed && fields.isDistrictEdge[i]) overlay(asphalt, 0.12);
    if (code !== CLASS.builtUp && roads.coverage[i] > 0) overlay(asphalt, 0.8 * roads.coverage[i]);
    if (code !== CLASS.openWater && rivers.coverage[i] > 0) overlay(water, 0.75 * rivers.coverage[i]);

    const unevenness = UNEVENNESS[code];
    const parcel = code === CLASS.coniferPlantation ? compartments.id[i] : fields.id[i];
    const ofField =
      farmed || code === CLASS.coniferPlantation ? (parcelUnit(parcel, 43) - 0.5) * 1.9 : 0.5 * texture.middle[i];
    const brightness = clamp(1 + unevenness * (ofField + 0.45 * texture.fine[i] + 0.3 * texture.broad[i]), 0.45, 1.7);
    let warm = 0;
    for (let m = 0; m < shares.length; m++) warm += shares[m] * warmth[m];
    for (let b = 0; b < N_REFLECTIVE; b++) {
      let sum = 0;
      for (let m = 0; m < shares.length; m++) if (shares[m] > 0) sum += shares[m] * table[m * N_REFLECTIVE + b];
      const light = SKYLIGHT[b] + (1 - SKYLIGHT[b]) * lit[i];
      // Lower rivers carry the silt that colours the bay; lochs stay clear.
      const silt = code === CLASS.openWater && !rivers.isLoch[i] ? 0.8 * SILT[b] * sea.silt[i] : 0;
      reflectance[b][i] = silt + sum * brightness * (code === CLASS.openWater ? 1 : light);
    }
    temperature[i] =
      moment.airKelvin -
      0.0065 * relief.elevation[i] +
      warm +
      7 * (lit[i] - 1) +
      0.5 * texture.broad[i] +
      0.4 * ofField;
  }
  return { reflectance, temperature };
}
