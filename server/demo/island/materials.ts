/**
 * Surface reflectance of what the ground is made of, per date: blue 0.48, green 0.56, red 0.66,
 * near infrared 0.86, shortwave infrared 1.61 and 2.20 µm. Invented for the demo, from memory of
 * the usual shape of such spectra; no spectral library was copied.
 */
export type Season = 'spring' | 'lateSummer';

type Spectrum = readonly [blue: number, green: number, red: number, nir: number, swir1: number, swir2: number];

interface Material {
  spring: Spectrum;
  lateSummer: Spectrum;
  /** Midday warmth above the air, kelvin, in late summer; spring takes four fifths of it. */
  warmthKelvin: number;
}

function sameAllYear(spectrum: Spectrum, warmthKelvin: number): Material {
  return { spring: spectrum, lateSummer: spectrum, warmthKelvin };
}

export const MATERIALS = {
  lushGrass: {
    spring: [0.028, 0.064, 0.034, 0.43, 0.2, 0.092],
    lateSummer: [0.031, 0.063, 0.046, 0.375, 0.2, 0.102],
    warmthKelvin: 4.5,
  },
  roughGrass: {
    spring: [0.043, 0.07, 0.074, 0.235, 0.25, 0.155],
    lateSummer: [0.042, 0.074, 0.072, 0.285, 0.25, 0.145],
    warmthKelvin: 6.5,
  },
  cutGrass: {
    spring: [0.036, 0.074, 0.052, 0.36, 0.24, 0.13],
    lateSummer: [0.055, 0.098, 0.092, 0.335, 0.29, 0.175],
    warmthKelvin: 7.5,
  },
  greenCrop: {
    spring: [0.024, 0.056, 0.028, 0.46, 0.18, 0.076],
    lateSummer: [0.026, 0.056, 0.033, 0.43, 0.19, 0.083],
    warmthKelvin: 3.6,
  },
  rapeInFlower: {
    spring: [0.048, 0.135, 0.125, 0.46, 0.2, 0.1],
    lateSummer: [0.07, 0.105, 0.135, 0.27, 0.32, 0.22],
    warmthKelvin: 5,
  },
  stubble: {
    spring: [0.07, 0.1, 0.122, 0.25, 0.31, 0.22],
    lateSummer: [0.066, 0.108, 0.147, 0.285, 0.345, 0.235],
    warmthKelvin: 10.5,
  },
  ripeCereal: {
    spring: [0.026, 0.058, 0.032, 0.44, 0.18, 0.08],
    lateSummer: [0.054, 0.096, 0.132, 0.315, 0.275, 0.165],
    warmthKelvin: 8,
  },
  bareSoil: {
    spring: [0.058, 0.083, 0.108, 0.18, 0.255, 0.215],
    lateSummer: [0.056, 0.084, 0.117, 0.192, 0.275, 0.235],
    warmthKelvin: 12,
  },
  broadleaf: {
    spring: [0.03, 0.05, 0.047, 0.235, 0.18, 0.098],
    lateSummer: [0.02, 0.04, 0.024, 0.335, 0.15, 0.062],
    warmthKelvin: 1.5,
  },
  conifer: {
    spring: [0.017, 0.027, 0.02, 0.185, 0.083, 0.036],
    lateSummer: [0.016, 0.027, 0.018, 0.2, 0.083, 0.034],
    warmthKelvin: 0.8,
  },
  youngConifer: {
    spring: [0.028, 0.044, 0.038, 0.235, 0.155, 0.078],
    lateSummer: [0.026, 0.045, 0.034, 0.265, 0.15, 0.07],
    warmthKelvin: 2.5,
  },
  heather: {
    spring: [0.034, 0.042, 0.05, 0.165, 0.165, 0.105],
    lateSummer: [0.037, 0.046, 0.057, 0.205, 0.16, 0.092],
    warmthKelvin: 6.5,
  },
  moorGrass: {
    spring: [0.05, 0.072, 0.092, 0.205, 0.25, 0.17],
    lateSummer: [0.042, 0.066, 0.072, 0.245, 0.22, 0.13],
    warmthKelvin: 6,
  },
  peat: {
    spring: [0.034, 0.042, 0.052, 0.105, 0.15, 0.125],
    lateSummer: [0.035, 0.043, 0.053, 0.11, 0.15, 0.125],
    warmthKelvin: 9,
  },
  burntHeath: {
    spring: [0.031, 0.036, 0.042, 0.085, 0.13, 0.12],
    lateSummer: [0.034, 0.044, 0.05, 0.14, 0.15, 0.115],
    warmthKelvin: 10,
  },
  rock: sameAllYear([0.064, 0.082, 0.099, 0.142, 0.172, 0.148], 9),
  scree: sameAllYear([0.052, 0.068, 0.082, 0.124, 0.156, 0.137], 9.5),
  quarryFloor: sameAllYear([0.082, 0.105, 0.125, 0.17, 0.21, 0.19], 10.5),
  dryShoreSand: sameAllYear([0.135, 0.185, 0.23, 0.29, 0.32, 0.275], 7),
  wetSand: sameAllYear([0.074, 0.102, 0.126, 0.155, 0.095, 0.062], 2.2),
  mud: sameAllYear([0.058, 0.078, 0.093, 0.11, 0.072, 0.046], 2.6),
  weed: sameAllYear([0.026, 0.04, 0.036, 0.17, 0.07, 0.04], 1.5),
  marshPlants: {
    spring: [0.04, 0.056, 0.062, 0.175, 0.145, 0.084],
    lateSummer: [0.036, 0.056, 0.055, 0.225, 0.145, 0.075],
    warmthKelvin: 3.2,
  },
  slate: sameAllYear([0.064, 0.074, 0.083, 0.112, 0.128, 0.117], 11),
  tile: sameAllYear([0.056, 0.074, 0.112, 0.172, 0.21, 0.185], 11),
  sheetRoof: sameAllYear([0.185, 0.21, 0.225, 0.265, 0.26, 0.23], 12),
  asphalt: sameAllYear([0.068, 0.08, 0.09, 0.112, 0.135, 0.126], 12.5),
  concrete: sameAllYear([0.12, 0.145, 0.168, 0.21, 0.245, 0.222], 11),
  water: sameAllYear([0.034, 0.034, 0.022, 0.009, 0.004, 0.003], -2),
} satisfies Record<string, Material>;

export type MaterialName = keyof typeof MATERIALS;

export const MATERIAL_NAMES = Object.keys(MATERIALS) as MaterialName[];

/** Number of reflective bands. */
export const N_REFLECTIVE = 6;

/** Position of a material in mixture arrays. */
export function materialIndex(name: MaterialName): number {
  return MATERIAL_NAMES.indexOf(name);
}

/** Reflectances as a flat table, materials × six bands. */
export function reflectanceTable(season: Season): Float64Array {
  const table = new Float64Array(MATERIAL_NAMES.length * N_REFLECTIVE);
  MATERIAL_NAMES.forEach((name, m) => table.set(MATERIALS[name][season], m * N_REFLECTIVE));
  return table;
}
