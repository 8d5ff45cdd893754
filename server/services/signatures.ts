import type { SignatureSet } from '../../shared/contracts/signature.ts';
import { pickFeatures, poolSummaries } from '../analysis/spectral/sample-summary.ts';
import { computeSeparability } from '../analysis/spectral/separability.ts';
import type { ClassSignature } from '../analysis/spectral/class-signature.ts';
import type { App } from '../app-context.ts';
import type { LandClass } from '../entities/land-class.ts';
import type { Project } from '../entities/project.ts';
import type { Scene } from '../entities/scene.ts';
import { InvalidInput } from '../errors.ts';
import { listLandClasses } from './land-classes.ts';
import { digestSamples, PIXELS_KEPT, type DigestedSample } from './sample-digests.ts';
import { listSamples } from './samples-list.ts';
import { countBins, collectPoints, covarianceOfPoints, momentsOfPoints, type PointSet } from './signature-points.ts';
import { listFeatureColumns, type FeatureColumn } from './signature-features.ts';
import { countSquares } from './signature-squares.ts';

/** Pixels a band and class by the rule of thumb: 10 to 30 a band; see docs/methods.md. */
const PIXELS_A_BAND = 30;
/** Below this, polygons of a class cannot be split into training and held-out ones with any meaning (common practice, no source). */
const SAMPLES_WANTED = 10;
/** A class with less than this share of an even share of the pixels is said to be small. */
const SMALL_SHARE = 0.25;
/** From this bound on the error, a pair is at risk. */
const RISKY_ERROR = 0.02;
/** Points sent to the page; more are a blot. */
const MAX_POINTS = 6_000;

/** The training samples of a project as a scene shows them: signatures of the classes and how far apart they lie. */
export async function describeSignatures(
  app: App,
  project: Project,
  scene: Scene,
  bandNumbers: readonly number[] | null,
  viewerId: string,
): Promise<SignatureSet> {
  const columns = listFeatureColumns(scene.bands);
  const chosen = chooseBands(scene, bandNumbers);
  const classes = (await listLandClasses(app, project.id)).map(({ landClass }) => landClass);
  const all = await listSamples(app, project.id, null, viewerId);
  const digested = await digestSamples(app, scene, project.studyArea, all);
  const samples = digested.filter(({ summary }) => summary.nPixels > 0);
  const byClass = classes.map(({ id }) => samples.filter(({ classId }) => classId === id));
  const signatures = byClass.map((own) =>
    poolSummaries(
      own.map(({ summary }) => summary),
      scene.bands.length,
    ),
  );
  const points = collectPoints(byClass, scene.bands, columns);
  const squares = countSquares(byClass);
  const nPixels = signatures.reduce((sum, signature) => sum + signature.nPixels, 0);
  const pairs = comparePairs(signatures, classes, chosen, columns);
  return {
    sceneId: scene.id,
    bands: chosen.map((place) => scene.bands[place]?.number ?? 0),
    features: columns.map(({ feature }) => feature),
    classes: classes.map((landClass, c) => {
      const moments = columns.map(({ feature }, f) =>
        feature.kind === 'band' ? scaleMoments(signatures[c], scene, f) : momentsOfPoints(points, c, f),
      );
      return {
        ...{ classId: landClass.id, name: landClass.name, colour: landClass.colour, position: landClass.position },
        nSamples: byClass[c]?.length ?? 0,
        nPixels: signatures[c]?.nPixels ?? 0,
        share: nPixels > 0 ? (signatures[c]?.nPixels ?? 0) / nPixels : 0,
        mean: moments.map(({ mean }) => mean),
        standardDeviation: moments.map(({ standardDeviation }) => standardDeviation),
        covariance: covarianceOfPoints(points, c),
        squares: squares.byClass[c] ?? 0,
        pixelsWanted: PIXELS_A_BAND * chosen.length,
        samplesWanted: SAMPLES_WANTED,
        remarks: remarkOn({
          nSamples: byClass[c]?.length ?? 0,
          nPixels: signatures[c]?.nPixels ?? 0,
          evenShare: nPixels / Math.max(1, classes.length),
          squares: squares.byClass[c] ?? 0,
          nBands: chosen.length,
        }),
      };
    }),
    nSamples: samples.length,
    nOutside: all.length - samples.length,
    squares: squares.all,
    pixelsPerSample: PIXELS_KEPT,
    ...presentPoints(points, samples),
    histograms: columns.map((_, f) => countBins(points, f, classes.length)),
    pairs,
    risks: findRisks(pairs, classes),
  };
}

/** Places of the bands asked for. @throws InvalidInput for a number the scene does not have */
function chooseBands(scene: Scene, numbers: readonly number[] | null): number[] {
  if (!numbers) return scene.bands.map((_, place) => place);
  return [...new Set(numbers)].map((number) => {
    const place = scene.bands.findIndex((band) => band.number === number);
    if (place < 0) {
      throw new InvalidInput('The scene has no such band.', {
        found: `band ${number}`,
        wanted: `bands ${scene.bands.map((band) => band.number).join(', ')}`,
        errors: [{ path: 'bands', message: `There is no band ${number}.` }],
      });
    }
    return place;
  });
}

function scaleMoments(signature: ClassSignature | undefined, scene: Scene, place: number) {
  const band = scene.bands[place];
  if (!signature || !band || signature.nPixels === 0) return { mean: null, standardDeviation: null };
  const variance = signature.covariance?.[place * scene.bands.length + place];
  return {
    mean: (signature.mean[place] ?? Number.NaN) * band.scale + band.offset,
    standardDeviation: variance === undefined ? null : Math.sqrt(variance) * Math.abs(band.scale),
  };
}

function remarkOn(standing: {
  nSamples: number;
  nPixels: number;
  evenShare: number;
  squares: number;
  nBands: number;
}): string[] {
  const { nSamples, nPixels, evenShare, squares, nBands } = standing;
  if (nSamples === 0) return ['No sample in this scene yet.'];
  const remarks: string[] = [];
  if (nSamples < SAMPLES_WANTED) remarks.push(`Few samples: ${nSamples} of ${SAMPLES_WANTED} wanted.`);
  if (nPixels < PIXELS_A_BAND * nBands) {
    remarks.push(`Few pixels: ${nPixels} of ${PIXELS_A_BAND * nBands}, 30 a band.`);
  }
  if (nPixels < SMALL_SHARE * evenShare) remarks.push('Much smaller than the other classes.');
  if (nSamples >= SAMPLES_WANTED && squares <= 2) remarks.push('All its samples lie close together.');
  return remarks;
}

function comparePairs(
  signatures: readonly ClassSignature[],
  classes: readonly LandClass[],
  chosen: readonly number[],
  columns: readonly FeatureColumn[],
): SignatureSet['pairs'] {
  const picked = signatures.map((signature) => pickFeatures(signature, chosen));
  const single = chosen.map((place) => signatures.map((signature) => pickFeatures(signature, [place])));
  return classes.flatMap((_, first) =>
    classes.slice(first + 1).map((__, offset) => {
      const second = first + 1 + offset;
      const [one, two] = [picked[first], picked[second]];
      const figures = one && two ? computeSeparability(one, two) : null;
      return {
        ...{ first, second },
        bhattacharyya: figures?.bhattacharyya ?? null,
        jeffriesMatusita: figures?.jeffriesMatusita ?? null,
        jeffriesMatusitaSquared: figures?.jeffriesMatusitaSquared ?? null,
        transformedDivergence: figures?.transformedDivergence ?? null,
        errorBound: figures ? Math.exp(-figures.bhattacharyya) / 2 : null,
        reason: figures ? null : whyNone(one, two, chosen.length),
        bestBand: findBestBand(single, first, second, chosen, columns),
      };
    }),
  );
}

function whyNone(one: ClassSignature | undefined, two: ClassSignature | undefined, nBands: number): string {
  const fewest = Math.min(one?.nPixels ?? 0, two?.nPixels ?? 0);
  return fewest <= nBands
    ? `A class has ${fewest} pixels; more than ${nBands} are needed for ${nBands} bands.`
    : 'Bands repeat each other, or do not vary within a class.';
}

function findBestBand(
  single: readonly (readonly ClassSignature[])[],
  first: number,
  second: number,
  chosen: readonly number[],
  columns: readonly FeatureColumn[],
): string | null {
  let best: { name: string; distance: number } | null = null;
  single.forEach((signatures, i) => {
    const [one, two] = [signatures[first], signatures[second]];
    const distance = one && two ? computeSeparability(one, two)?.bhattacharyya : undefined;
    const name = columns[chosen[i] ?? -1]?.feature.name;
    if (distance !== undefined && name && (!best || distance > best.distance)) best = { name, distance };
  });
  return (best as { name: string } | null)?.name ?? null;
}

function findRisks(pairs: SignatureSet['pairs'], classes: readonly LandClass[]): SignatureSet['risks'] {
  return pairs
    .flatMap((pair, place) => (pair.errorBound !== null && pair.errorBound >= RISKY_ERROR ? [{ pair, place }] : []))
    .sort((a, b) => (b.pair.errorBound ?? 0) - (a.pair.errorBound ?? 0))
    .map(({ pair, place }) => {
      const names = `${classes[pair.first]?.name} and ${classes[pair.second]?.name}`;
      const share = `${((pair.errorBound ?? 0) * 100).toFixed(0)} %`;
      return {
        pair: place,
        text: `${names}: up to ${share} of their pixels could be taken for each other.`,
        advice: adviseOn(pair),
      };
    });
}

function adviseOn({ errorBound, bestBand }: SignatureSet['pairs'][number]): string {
  const best = bestBand ? `${bestBand} tells them apart best. ` : '';
  if ((errorBound ?? 0) >= 0.2) {
    return `${best}These bands hardly separate them: another date or a further band may, and if neither is to be had, think of one class for both.`;
  }
  return `${best}Look at the samples where they meet, and draw more of both there.`;
}

function presentPoints(
  points: PointSet,
  samples: readonly DigestedSample[],
): Pick<SignatureSet, 'points' | 'sampleIds'> {
  const step = Math.max(1, Math.ceil(points.nPoints / MAX_POINTS));
  const kept = Array.from({ length: Math.ceil(points.nPoints / step) }, (_, i) => i * step);
  const place = new Map(samples.map(({ id }, i) => [id, i]));
  return {
    sampleIds: samples.map(({ id }) => id),
    points: {
      classIndex: kept.map((i) => points.classIndex[i] ?? 0),
      sampleIndex: kept.map((i) => place.get(points.sampleIds[i] ?? '') ?? 0),
      values: points.values.map((column) =>
        kept.map((i) => {
          const value = column[i];
          return value !== undefined && Number.isFinite(value) ? Number(value.toPrecision(6)) : null;
        }),
      ),
    },
  };
}
