/** What brings each feature to one scale: (value − mean) · scale. */
export interface FeatureScales {
  means: Float64Array;
  scales: Float64Array;
}

/** Scales that leave values as they are. */
export function keepScales(nFeatures: number): FeatureScales {
  return { means: new Float64Array(nFeatures), scales: new Float64Array(nFeatures).fill(1) };
}

/**
 * Scales to mean 0 and standard deviation 1 (divisor n) of nRows row-major rows; a constant feature tells nothing and
 * becomes 0.
 */
export function measureScales(features: Float32Array, nRows: number, nFeatures: number): FeatureScales {
  const { means, scales } = keepScales(nFeatures);
  for (let f = 0; f < nFeatures; f++) {
    let sum = 0;
    for (let row = 0; row < nRows; row++) sum += features[row * nFeatures + f];
    const mean = sum / nRows;
    let squares = 0;
    for (let row = 0; row < nRows; row++) squares += (features[row * nFeatures + f] - mean) ** 2;
    const deviation = Math.sqrt(squares / nRows);
    means[f] = mean;
    scales[f] = deviation > 0 ? 1 / deviation : 0;
  }
  return { means, scales };
}

/** Scaled copy of nRows row-major rows. */
export function scaleRows(features: Float32Array, nRows: number, { means, scales }: FeatureScales): Float64Array {
  const nFeatures = means.length;
  const scaled = new Float64Array(nRows * nFeatures);
  for (let i = 0; i < scaled.length; i++) {
    const f = i % nFeatures;
    scaled[i] = (features[i] - means[f]) * scales[f];
  }
  return scaled;
}
