/** What a band sees, whatever the sensor calls it. */
export type BandRole = 'blue' | 'green' | 'red' | 'nir' | 'swir1' | 'swir2';

export interface SpectralIndex {
  id: SpectralIndexId;
  name: string;
  /** Formula over reflectances, for people. */
  formula: string;
  source: string;
  /** Bands needed, in the order `compute` takes them. */
  bands: readonly BandRole[];
  /** Value from reflectances; not finite where the denominator is zero. */
  compute: (...reflectances: number[]) => number;
}

export type SpectralIndexId = 'ndvi' | 'ndwi' | 'mndwi' | 'ndbi' | 'nbr' | 'ndmi' | 'savi' | 'evi' | 'evi2';

function normalisedDifference(a: number, b: number): number {
  return (a - b) / (a + b);
}

/** Spectral indices over surface reflectance (0..1), each with where it was published. */
export const spectralIndices: Record<SpectralIndexId, SpectralIndex> = {
  ndvi: {
    id: 'ndvi',
    name: 'Normalised difference vegetation index',
    formula: '(NIR − red) / (NIR + red)',
    source: 'Rouse et al. 1974, NASA SP-351',
    bands: ['nir', 'red'],
    compute: normalisedDifference,
  },
  ndwi: {
    id: 'ndwi',
    name: 'Normalised difference water index (open water)',
    formula: '(green − NIR) / (green + NIR)',
    source: 'McFeeters 1996, International Journal of Remote Sensing 17:1425–1432',
    bands: ['green', 'nir'],
    compute: normalisedDifference,
  },
  mndwi: {
    id: 'mndwi',
    name: 'Modified normalised difference water index',
    formula: '(green − SWIR 1) / (green + SWIR 1)',
    source: 'Xu 2006, International Journal of Remote Sensing 27:3025–3033',
    bands: ['green', 'swir1'],
    compute: normalisedDifference,
  },
  ndbi: {
    id: 'ndbi',
    name: 'Normalised difference built-up index',
    formula: '(SWIR 1 − NIR) / (SWIR 1 + NIR)',
    source: 'Zha, Gao & Ni 2003, International Journal of Remote Sensing 24:583–594 (formula from memory)',
    bands: ['swir1', 'nir'],
    compute: normalisedDifference,
  },
  nbr: {
    id: 'nbr',
    name: 'Normalised burn ratio',
    formula: '(NIR − SWIR 2) / (NIR + SWIR 2)',
    source: 'Key & Benson 2006, USDA RMRS-GTR-164 (citation from memory)',
    bands: ['nir', 'swir2'],
    compute: normalisedDifference,
  },
  ndmi: {
    id: 'ndmi',
    name: 'Normalised difference moisture index (leaf water)',
    formula: '(NIR − SWIR 1) / (NIR + SWIR 1)',
    source: 'Gao 1996, Remote Sensing of Environment 58:257–266, there called NDWI',
    bands: ['nir', 'swir1'],
    compute: normalisedDifference,
  },
  savi: {
    id: 'savi',
    name: 'Soil-adjusted vegetation index, L = 0.5',
    formula: '1.5 (NIR − red) / (NIR + red + 0.5)',
    source: 'Huete 1988, Remote Sensing of Environment 25:295–309',
    bands: ['nir', 'red'],
    compute: (nir, red) => (1.5 * (nir - red)) / (nir + red + 0.5),
  },
  evi: {
    id: 'evi',
    name: 'Enhanced vegetation index',
    formula: '2.5 (NIR − red) / (NIR + 6 red − 7.5 blue + 1)',
    source: 'Huete et al. 2002, Remote Sensing of Environment 83:195–213',
    bands: ['nir', 'red', 'blue'],
    compute: (nir, red, blue) => (2.5 * (nir - red)) / (nir + 6 * red - 7.5 * blue + 1),
  },
  evi2: {
    id: 'evi2',
    name: 'Enhanced vegetation index without blue',
    formula: '2.5 (NIR − red) / (NIR + 2.4 red + 1)',
    source: 'Jiang et al. 2008, Remote Sensing of Environment 112:3833–3845',
    bands: ['nir', 'red'],
    compute: (nir, red) => (2.5 * (nir - red)) / (nir + 2.4 * red + 1),
  },
};

/**
 * Computes an index pixel by pixel from reflectances; NaN where a band is NaN or the denominator is zero, never
 * infinity.
 *
 * Bands that hold scaled numbers with an additive offset must be turned into reflectance first: the ratio of raw
 * numbers is another value.
 * @throws RangeError when a band is missing or the lengths differ.
 */
export function computeSpectralIndex(
  id: SpectralIndexId,
  reflectance: Partial<Record<BandRole, Float32Array>>,
): Float32Array {
  const { bands, compute } = spectralIndices[id];
  const inputs = bands.map((role) => {
    const band = reflectance[role];
    if (!band) throw new RangeError(`${id.toUpperCase()} needs the ${role} band.`);
    return band;
  });
  const length = inputs[0].length;
  if (inputs.some((band) => band.length !== length)) {
    throw new RangeError(
      `The bands of ${id.toUpperCase()} differ in length: ${inputs.map((b) => b.length).join(', ')}.`,
    );
  }
  const [first, second, third] = inputs;
  const result = new Float32Array(length);
  for (let i = 0; i < length; i++) {
    const value = third ? compute(first[i], second[i], third[i]) : compute(first[i], second[i]);
    result[i] = Number.isFinite(value) ? value : Number.NaN;
  }
  return result;
}
