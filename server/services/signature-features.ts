import type { SignatureFeature } from '../../shared/contracts/signature.ts';
import { spectralIndices, type SpectralIndex } from '../analysis/spectral/spectral-index.ts';
import type { Band } from '../entities/band.ts';

/** A column of the signatures page: from a pixel's scaled band values to one value. */
export interface FeatureColumn {
  feature: SignatureFeature;
  /** Place of the band, or of the bands of an index, in the scene. */
  bands: readonly number[];
  /** Not finite where it is undefined. */
  read: (scaled: Float64Array) => number;
}

/** The scene's bands, then every index its bands in reflectance allow. */
export function listFeatureColumns(bands: readonly Band[]): FeatureColumn[] {
  const columns = bands.map((band, place): FeatureColumn => ({
    feature: {
      key: `band-${band.number}`,
      kind: 'band',
      name: band.name,
      number: band.number,
      centreWavelengthUm: band.centreWavelengthUm,
      quantity: band.quantity,
      formula: null,
    },
    bands: [place],
    read: (scaled) => scaled[place] ?? Number.NaN,
  }));
  for (const index of Object.values(spectralIndices)) {
    const places = index.bands.map((role) =>
      bands.findIndex((band) => band.role === role && band.quantity === 'reflectance'),
    );
    if (places.every((place) => place >= 0)) columns.push(describeIndex(index, places));
  }
  return columns;
}

function describeIndex(index: SpectralIndex, places: readonly number[]): FeatureColumn {
  return {
    feature: {
      key: index.id,
      kind: 'index',
      name: `${index.id.toUpperCase()}: ${index.name}`,
      number: null,
      centreWavelengthUm: null,
      quantity: 'index',
      formula: index.formula,
    },
    bands: places,
    read: (scaled) => index.compute(...places.map((place) => scaled[place] ?? Number.NaN)),
  };
}

/** A pixel's stored values as what they measure. */
export function scaleRow(stored: Float32Array, row: number, bands: readonly Band[]): Float64Array {
  return Float64Array.from(
    bands,
    ({ scale, offset }, b) => (stored[row * bands.length + b] ?? Number.NaN) * scale + offset,
  );
}
