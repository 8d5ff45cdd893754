import type { Polygon } from '../../shared/contracts/geometry.ts';
import type { DrawingJudgement } from '../../shared/contracts/signature.ts';
import { poolSummaries, summarisePixels, type SampleSummary } from '../analysis/spectral/sample-summary.ts';
import { judgeTypicality, learnSampleSpread, mahalanobisSquared } from '../analysis/spectral/typicality.ts';
import type { App } from '../app-context.ts';
import type { LandClass } from '../entities/land-class.ts';
import type { Project } from '../entities/project.ts';
import type { Scene } from '../entities/scene.ts';
import { InvalidInput } from '../errors.ts';
import { readPixelFeatures } from '../raster/pixel-features.ts';
import { findDrawnPixels } from './drawing-check.ts';
import { findHeldOutNear, findOverlaps } from './drawing-neighbours.ts';
import { listLandClasses } from './land-classes.ts';
import { digestSamples, type DigestedSample } from './sample-digests.ts';
import { listSamples } from './samples-list.ts';
import { requireGrid } from './scenes.ts';

/** Classes shown beside the drawing's own. */
const RIVALS = 2;
/** Below this chance a sample is called unusual (common practice, no source). */
const UNUSUAL_BELOW = 0.05;
/** A sample this many times as varied as others of its class is called mixed (common practice, no source). */
const MIXED_FROM = 2;
const MIN_PIXELS_FOR_MIXING = 4;

interface Asked {
  classId: string;
  geometry: Polygon;
  sampleId?: string | undefined;
}

/** How a drawing stands to the samples there are: typical or not, mixed, overlapping, near what is held out. */
export async function judgeDrawing(
  app: App,
  project: Project,
  scene: Scene,
  asked: Asked,
  viewerId: string,
): Promise<DrawingJudgement> {
  const classes = (await listLandClasses(app, project.id)).map(({ landClass }) => landClass);
  const ownIndex = classes.findIndex(({ id }) => id === asked.classId);
  const own = classes[ownIndex];
  if (!own) {
    throw new InvalidInput('The drawing needs a class of this project.', {
      errors: [{ path: 'classId', message: 'Choose a class of this project.' }],
    });
  }
  const { pixels } = findDrawnPixels(scene, project.studyArea, asked.geometry);
  const drawing = pixels && (await summariseDrawing(app, scene, pixels));
  if (!pixels || !drawing || drawing.nPixels === 0) return NOTHING;

  const all = await listSamples(app, project.id, null, viewerId);
  const others = all.filter(({ id }) => id !== asked.sampleId);
  const digested = (await digestSamples(app, scene, project.studyArea, others)).filter(
    ({ summary }) => summary.nPixels > 0,
  );
  const byClass = classes.map(({ id }) => digested.filter(({ classId }) => classId === id));
  const distances = measureDistances(drawing, byClass, scene.bands.length);
  const typicality = distances[ownIndex]?.typicality ?? null;
  const mixing = measureMixing(drawing, byClass[ownIndex] ?? [], scene.bands.length);
  const overlaps = findOverlaps(scene, project.studyArea, pixels, asked, others);
  const heldOut = await findHeldOutNear(app, project.id, scene, pixels, asked.sampleId ?? null);
  const judgement = {
    rivals: pickRivals(classes, ownIndex, distances, byClass, scene),
    typicality,
    noTypicality: typicality ? null : whyNone(byClass[ownIndex] ?? []),
    mixing,
    overlaps,
    heldOut,
  };
  return { ...judgement, warnings: warnOf(judgement, own, classes) };
}

const NOTHING: DrawingJudgement = {
  ...{ rivals: [], typicality: null, noTypicality: 'The drawing holds no pixel with data.', mixing: null },
  ...{ overlaps: [], heldOut: null, warnings: [] },
};

async function summariseDrawing(app: App, scene: Scene, pixels: Uint32Array): Promise<SampleSummary> {
  const files = await Promise.all(
    scene.bands.map(async ({ fileKey }) => app.bands.open(await app.files.localPath(fileKey))),
  );
  const nBands = files.length;
  const features = new Float32Array(pixels.length * nBands);
  const isValid = await readPixelFeatures(requireGrid(scene).grid, files, pixels, { features, keep: true });
  return summarisePixels(
    features.filter((_, i) => isValid[Math.floor(i / nBands)] === 1),
    nBands,
  );
}

interface ClassDistance {
  /** From the class's samples where they say enough, from its pixels otherwise. */
  distance: number | null;
  typicality: DrawingJudgement['typicality'];
}

function measureDistances(
  drawing: SampleSummary,
  byClass: readonly (readonly DigestedSample[])[],
  nBands: number,
): ClassDistance[] {
  const summaries = byClass.map((samples) => samples.map(({ summary }) => summary));
  return learnSampleSpread(summaries, nBands).map((spread, c) => {
    const verdict = spread && judgeTypicality(drawing, spread);
    if (verdict) {
      const { distanceSquared, ...rest } = verdict;
      const distance = Math.sqrt(distanceSquared);
      return { distance, typicality: { distance, ...rest } };
    }
    const { mean, covariance } = poolSummaries(summaries[c] ?? [], nBands);
    const squared = covariance && mahalanobisSquared(drawing.mean, mean, covariance);
    return { distance: squared === null ? null : Math.sqrt(squared), typicality: null };
  });
}

function measureMixing(
  drawing: SampleSummary,
  own: readonly DigestedSample[],
  nBands: number,
): DrawingJudgement['mixing'] {
  const usual = own.map(({ summary }) => summary).filter(({ nPixels }) => nPixels >= MIN_PIXELS_FOR_MIXING);
  if (drawing.nPixels < MIN_PIXELS_FOR_MIXING || usual.length < 3) return null;
  const deviationOf = ({ scatter, nPixels }: SampleSummary, f: number) =>
    Math.sqrt((scatter[f * nBands + f] ?? 0) / (nPixels - 1));
  const ratios = Array.from({ length: nBands }, (_, f) => {
    const typical = median(usual.map((summary) => deviationOf(summary, f)));
    return typical > 0 ? deviationOf(drawing, f) / typical : 1;
  });
  const ratio = median(ratios);
  return { ratio, isMixed: ratio >= MIXED_FROM };
}

function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const middle = sorted.length >> 1;
  const upper = sorted[middle] ?? Number.NaN;
  return sorted.length % 2 === 1 ? upper : ((sorted[middle - 1] ?? Number.NaN) + upper) / 2;
}

function pickRivals(
  classes: readonly LandClass[],
  ownIndex: number,
  distances: readonly ClassDistance[],
  byClass: readonly (readonly DigestedSample[])[],
  scene: Scene,
): DrawingJudgement['rivals'] {
  const nearest = classes
    .map((_, c) => c)
    .filter((c) => c !== ownIndex && (distances[c]?.distance ?? null) !== null)
    .sort((a, b) => (distances[a]?.distance ?? 0) - (distances[b]?.distance ?? 0))
    .slice(0, RIVALS);
  const nBands = scene.bands.length;
  return [ownIndex, ...nearest].flatMap((c) => {
    const samples = byClass[c] ?? [];
    const landClass = classes[c];
    if (samples.length === 0 || !landClass) return [];
    const { mean, covariance } = poolSummaries(
      samples.map(({ summary }) => summary),
      nBands,
    );
    return {
      classId: landClass.id,
      isOwn: c === ownIndex,
      nSamples: samples.length,
      mean: scene.bands.map(({ scale, offset }, f) => (mean[f] ?? Number.NaN) * scale + offset),
      standardDeviation: scene.bands.map(({ scale }, f) =>
        covariance ? Math.sqrt(covariance[f * nBands + f] ?? 0) * Math.abs(scale) : null,
      ),
      distance: distances[c]?.distance ?? null,
    };
  });
}

function whyNone(own: readonly DigestedSample[]): string {
  if (own.length === 0) return 'It is the first sample of its class here.';
  return own.length === 1
    ? 'With one other sample of its class there is nothing to hold it against yet.'
    : 'There are too few samples yet to say what is usual, or bands repeat each other.';
}

function warnOf(
  { rivals, typicality, mixing, overlaps, heldOut }: Omit<DrawingJudgement, 'warnings'>,
  own: LandClass,
  classes: readonly LandClass[],
): string[] {
  const nameOf = (id: string) => classes.find((one) => one.id === id)?.name ?? 'another class';
  const warnings = overlaps.map(
    ({ number, classId, pixels }) =>
      `Shares ${pixels} ${pixels === 1 ? 'pixel' : 'pixels'} with sample ${number}, ${nameOf(classId)}.`,
  );
  const isUnusual = typicality !== null && typicality.pValue < UNUSUAL_BELOW;
  const rival = rivals.find(({ isOwn }) => !isOwn);
  if (isUnusual && rival?.distance && rival.distance < typicality.distance) {
    warnings.push(`Looks more like ${nameOf(rival.classId)} than ${own.name}.`);
  } else if (isUnusual) {
    warnings.push(`Unusual for ${own.name}: fewer than one sample in twenty lies as far out.`);
  }
  if (mixing?.isMixed) {
    warnings.push(
      `Varies ${mixing.ratio.toFixed(1)} times as much as other samples of ${own.name}: it may hold two covers.`,
    );
  }
  if (heldOut && !heldOut.isItself) {
    warnings.push(`Close to sample ${heldOut.sampleNumber}, which run ${heldOut.runNumber} is judged by.`);
  }
  return warnings;
}
