import type { ClassifierRecipe } from '../../../shared/contracts/run.ts';
import type { TrainingSet } from '../../analysis/classifiers/classifier.ts';
import type { MultiPolygon, Polygon } from '../../analysis/sampling/polygon.ts';
import type { SampleSummary } from '../../analysis/spectral/sample-summary.ts';
import type { CodeComparison, ComparedCodes } from '../../raster/compare-codes.ts';
import type { RasterGrid } from '../../raster/raster-grid.ts';

/** The pixels a run reads: band files in the recipe's order, on the scene's grid. */
export interface SceneInput {
  grid: RasterGrid;
  bandPaths: readonly string[];
  /** Pixel coordinates; pixels whose centre is outside are neither learned from nor mapped. Null is the whole scene. */
  studyArea: MultiPolygon | null;
}

export interface RunPolygon {
  id: string;
  classIndex: number;
  /** Pixel coordinates of the scene. */
  polygon: Polygon;
}

export interface TrainingData {
  /** In shared memory, so that every thread reads the same copy. */
  set: TrainingSet;
  perClass: { available: number; drawn: number }[];
  /** Training pixels left out because a held-out polygon holds them too. */
  nHeldOutToo: number;
  /** Training pixels left out because polygons of different classes hold them. */
  nConflicting: number;
  /** Training pixels left out because a band has no data there or they lie outside the study area. */
  nWithoutData: number;
}

export interface FinishedMap {
  /** Over the raw class codes, row-major, one byte a pixel. */
  sha256: string;
  pixelsByCode: Record<string, number>;
  areaM2ByCode: Record<string, number>;
  /** In the order of the held-out polygons: their pixels by code. */
  heldOutCodes: Record<string, number>[];
  nRepeated: number;
  nConflicting: number;
}

/** A sample in the features of a scene's bands, stored values. */
export interface SampleDigest {
  summary: SampleSummary;
  /** Some of its pixels, row-major. */
  kept: Float32Array;
}

/** A strip's class codes and layers (whole percent), each row-major, one byte a pixel, deflated. */
export interface MappedStrip {
  codes: Uint8Array;
  confidence: Uint8Array;
  margin: Uint8Array;
}

/** One count in shared memory, written by the thread and looked at from outside. */
export type SharedProgress = Int32Array;

/** What the compute threads do: what each kind of task is given and gives back. */
export interface ComputeTasks {
  /** The results are in the order of the polygons; a null polygon has no place in the scene. */
  'summarise-samples': {
    input: { scene: SceneInput; polygons: readonly (Polygon | null)[]; pixelsKept: number };
    result: SampleDigest[];
  };
  'read-training': {
    input: {
      scene: SceneInput;
      training: readonly RunPolygon[];
      heldOut: readonly RunPolygon[];
      nClasses: number;
      maxPixelsPerClass: number;
      seed: number;
      progress: SharedProgress;
    };
    result: TrainingData;
  };
  /** Several parts at a time, so that small ones are not all handing over. The results are in the order of `parts`. */
  'train-parts': {
    input: {
      set: TrainingSet;
      /** The same for all parts of one training, so that a thread prepares the set once. */
      setId: string;
      classifier: ClassifierRecipe;
      seed: number;
      parts: readonly number[];
    };
    result: Uint8Array[];
  };
  /** Learns from all folds but one and maps that one; an error of the classifier is a result, since other settings may work. */
  'judge-fold': {
    input: {
      sets: readonly TrainingSet[];
      /** The same for all trials of one tuning, so that a thread joins the folds once. */
      setsId: string;
      testFold: number;
      classifier: ClassifierRecipe;
      seed: number;
    };
    /** Rows by true class and predicted class, row-major. */
    result: { confusion: Uint32Array; error: string | null };
  };
  'assemble-model': {
    input: {
      shape: { nFeatures: number; nClasses: number };
      classifier: ClassifierRecipe;
      partPaths: readonly string[];
    };
    result: Uint8Array;
  };
  /** The results are deflated without a header. */
  'map-strip': {
    input: {
      scene: SceneInput;
      modelPath: string;
      y: number;
      height: number;
      codes: readonly number[];
      /** Pixels whose class has a smaller share stay unclassified. */
      minShare: number;
    };
    result: MappedStrip;
  };
  'compare-maps': {
    input: Omit<CodeComparison, 'owned'> & { mapPaths: readonly [string, string]; heldOut: readonly RunPolygon[] };
    result: ComparedCodes;
  };
  /** Joins the strips of a layer into one raw file at `rawPath`. */
  'join-strips': {
    input: { stripPaths: readonly string[]; rawPath: string };
    result: null;
  };
  /** Joins the strips into one raw file at `rawPath` and counts what is on the map. */
  'finish-map': {
    input: {
      grid: RasterGrid;
      stripPaths: readonly string[];
      rawPath: string;
      rowAreaM2: Float64Array;
      heldOut: readonly RunPolygon[];
      progress: SharedProgress;
    };
    result: FinishedMap;
  };
  /** Applies steps to a finished map, writes the raw codes to `rawPath` and counts what is on the map then. */
  'post-process': {
    input: {
      grid: RasterGrid;
      mapPath: string;
      steps: readonly MapStep[];
      rawPath: string;
      rowAreaM2: Float64Array;
      heldOut: readonly RunPolygon[];
      /** Steps done, in thousandths. */
      progress: SharedProgress;
    };
    result: FinishedMap & { effects: MapStepEffect[] };
  };
}

/** A step after mapping, with class codes and pixel coordinates. */
export type MapStep =
  | { kind: 'majority'; windowPixels: number; ties: 'keep-centre' | 'lowest-code' }
  | { kind: 'sieve'; minAreaM2: number; neighbours: 4 | 8 }
  | { kind: 'recode'; pairs: readonly (readonly [from: number, to: number])[] }
  /** Pixels inside or outside, of one code or of any but nodata, become another. */
  | { kind: 'paint'; polygons: MultiPolygon; where: 'inside' | 'outside'; from: number | null; to: number };

export interface MapStepEffect {
  changedPixels: number;
  changedM2: number;
  nMerged: number | null;
  nLeft: number | null;
}

export type ComputeKind = keyof ComputeTasks;
export type ComputeTask = { [K in ComputeKind]: { kind: K } & ComputeTasks[K]['input'] }[ComputeKind];
export type ComputeResult = ComputeTasks[ComputeKind]['result'];
