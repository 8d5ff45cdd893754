import { readFile } from 'node:fs/promises';
import { deflateRawSync } from 'node:zlib';
import { NODATA_CODE, UNCLASSIFIED_CODE } from '../../shared/constants/class-codes.ts';
import type { TrainedModel, TrainingSet } from '../analysis/classifiers/classifier.ts';
import { loadModel } from '../analysis/classifiers/registry.ts';
import type { BandFile } from '../raster/band-file.ts';
import { BandStore } from '../raster/band-store.ts';
import { classifyStrip } from '../raster/classify-strip.ts';
import { prepareClassifier } from './compute/classifier-of-recipe.ts';
import { finishMap } from './compute/finish-map.ts';
import { postProcess } from './compute/post-process.ts';
import { readTraining } from './compute/read-training.ts';
import { summariseSamples } from './compute/summarise-samples.ts';
import { judgeFold } from './compute/judge-fold.ts';
import { maskStrip } from './compute/study-area-mask.ts';
import { compareMapFiles } from './compute/compare-maps.ts';
import { joinStrips } from './compute/join-strips.ts';
import type { ComputeResult, ComputeTask, ComputeTasks, MappedStrip } from './compute/tasks.ts';

const store = new BandStore({ cacheMb: 32, decode: 'blocking' });
/** The last model used: a thread maps many strips with the same one. */
let loaded: { path: string; model: TrainedModel } | null = null;
/** The last training set used: each part of a training comes with the same one, and preparing it takes as long as a part. */
let taught: { id: string; set: TrainingSet } | null = null;

function openBands(paths: readonly string[]): Promise<BandFile[]> {
  return Promise.all(paths.map((path) => store.open(path)));
}

/** A file as bytes of its own: a Buffer's slices would be views of Node's shared pool. */
async function readBytes(path: string): Promise<Uint8Array> {
  return new Uint8Array(await readFile(path));
}

async function openModel(path: string): Promise<TrainedModel> {
  if (loaded?.path !== path) loaded = { path, model: loadModel(await readBytes(path)) };
  return loaded.model;
}

function trainParts(input: ComputeTasks['train-parts']['input']): Uint8Array[] {
  if (taught?.id !== input.setId) taught = { id: input.setId, set: input.set };
  const { set } = taught;
  const classifier = prepareClassifier(input.classifier, set.nFeatures);
  return input.parts.map((part) => classifier.trainPart(set, input.seed, part));
}

async function assembleModel(input: ComputeTasks['assemble-model']['input']): Promise<Uint8Array> {
  const parts: Uint8Array[] = [];
  for (const path of input.partPaths) parts.push(await readBytes(path));
  return prepareClassifier(input.classifier, input.shape.nFeatures).assemble(input.shape, parts).serialise();
}

async function mapStrip(input: ComputeTasks['map-strip']['input']): Promise<MappedStrip> {
  const { scene, y, height, codes, minShare } = input;
  const model = await openModel(input.modelPath);
  const nPixels = scene.grid.width * height;
  const layers = { confidence: new Uint8Array(nPixels), margin: new Uint8Array(nPixels) };
  const codesOfStrip = await classifyStrip({
    grid: scene.grid,
    bands: await openBands(scene.bandPaths),
    y,
    height,
    codes,
    nodataCode: NODATA_CODE,
    unclassified: minShare > 0 ? { below: minShare, code: UNCLASSIFIED_CODE } : null,
    inside: maskStrip(scene.studyArea, scene.grid.width, y, height),
    classify: (features, n, classIndex, share, margin) => model.predictBlock(features, n, classIndex, share, margin),
    layers,
  });
  return {
    codes: deflate(codesOfStrip),
    confidence: deflate(layers.confidence),
    margin: deflate(layers.margin),
  };
}

/** Copied out of Node's shared buffer pool. */
function deflate(bytes: Uint8Array): Uint8Array {
  return new Uint8Array(deflateRawSync(bytes, { level: 1 }));
}

/** Worker entry: the heavy steps of a run. */
export default async function compute(task: ComputeTask): Promise<ComputeResult> {
  switch (task.kind) {
    case 'summarise-samples':
      return summariseSamples(task, await openBands(task.scene.bandPaths));
    case 'read-training':
      return readTraining(task, await openBands(task.scene.bandPaths));
    case 'train-parts':
      return trainParts(task);
    case 'judge-fold':
      return judgeFold(task);
    case 'assemble-model':
      return assembleModel(task);
    case 'map-strip':
      return mapStrip(task);
    case 'compare-maps':
      return compareMapFiles(task, [await store.open(task.mapPaths[0]), await store.open(task.mapPaths[1])]);
    case 'join-strips':
      return joinStrips(task);
    case 'finish-map':
      return finishMap(task);
    case 'post-process':
      return postProcess(task, await store.open(task.mapPath));
  }
}
