import { loadModel } from '../../server/analysis/classifiers/registry.ts';

export interface PredictTask {
  model: Uint8Array;
  features: Float32Array;
}

/** Worker entry: the classes of row-major pixels. */
export default function predict({ model, features }: PredictTask): Uint8Array {
  const loaded = loadModel(model);
  const n = features.length / loaded.nFeatures;
  const classIndex = new Uint8Array(n);
  loaded.predictBlock(features, n, classIndex);
  return classIndex;
}
