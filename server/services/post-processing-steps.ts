import { NODATA_CODE, UNCLASSIFIED_CODE } from '../../shared/constants/class-codes.ts';
import type { ArealGeometry } from '../../shared/contracts/geometry.ts';
import type { PostProcessingStep } from '../../shared/contracts/post-processing.ts';
import type { App } from '../app-context.ts';
import type { Run } from '../entities/run.ts';
import { InvalidInput } from '../errors.ts';
import type { MapStep } from '../jobs/compute/tasks.ts';
import type { PixelPolygon } from '../raster/pixel-polygon.ts';
import { drawInPixels, type PlacedScene } from './run-scene.ts';
import { checkStudyArea } from './study-area.ts';
import { requireZoneLayer } from './zone-layers.ts';

const M2_PER_HECTARE = 10_000;

export interface ResolvedStep {
  stepId: string;
  step: MapStep;
}

/**
 * Turns the steps that are switched on into what the compute threads do: ids into class codes, outlines into pixels.
 * @throws InvalidInput naming the step whose class, zones, study area or outline is not there
 */
export async function resolveSteps(
  app: App,
  run: Run,
  placed: PlacedScene,
  steps: readonly PostProcessingStep[],
): Promise<ResolvedStep[]> {
  const resolved: ResolvedStep[] = [];
  for (const [i, step] of steps.entries()) {
    // A step that is off is checked too, so that switching it on later holds no surprise.
    const mapStep = await resolveStep(app, run, placed, step, `steps.${i}`);
    if (step.isOn) resolved.push({ stepId: step.id, step: mapStep });
  }
  return resolved;
}

async function resolveStep(
  app: App,
  run: Run,
  placed: PlacedScene,
  step: PostProcessingStep,
  path: string,
): Promise<MapStep> {
  const codeOf = (value: string, field: string): number => {
    if (value === 'unclassified') return UNCLASSIFIED_CODE;
    if (value === 'nodata') return NODATA_CODE;
    const found = run.classes.find(({ id }) => id === value);
    if (found) return found.code;
    throw refuse(`${path}.${field}`, 'a class that is not on the map', 'one of the run’s classes');
  };
  switch (step.kind) {
    case 'majority':
      return { kind: 'majority', windowPixels: step.windowPixels, ties: step.ties };
    case 'sieve':
      return { kind: 'sieve', minAreaM2: step.minAreaHa * M2_PER_HECTARE, neighbours: step.neighbours };
    case 'recode':
      return {
        kind: 'recode',
        pairs: step.pairs.map(({ from, to }, n) => [codeOf(from, `pairs.${n}.from`), codeOf(to, `pairs.${n}.to`)]),
      };
    case 'fill': {
      const to = codeOf(step.to, 'to');
      const polygons = await drawMask(app, run, placed, step.mask, `${path}.mask`);
      return { kind: 'paint', polygons, where: step.where, from: null, to };
    }
    case 'reclass': {
      const to = codeOf(step.to, 'to');
      const from = step.from === 'any' ? null : codeOf(step.from, 'from');
      checkStudyArea(step.polygon);
      const polygons = drawAll(placed, step.polygon, `${path}.polygon`);
      return { kind: 'paint', polygons, where: 'inside', from, to };
    }
  }
}

async function drawMask(
  app: App,
  run: Run,
  placed: PlacedScene,
  mask: Extract<PostProcessingStep, { kind: 'fill' }>['mask'],
  path: string,
): Promise<PixelPolygon[]> {
  if (mask.kind === 'study-area') {
    if (run.studyArea) return drawAll(placed, run.studyArea, path);
    throw refuse(path, 'the run was made without a study area', 'zones, or a run with a study area');
  }
  const { zones } = await requireZoneLayer(app, run.projectId, mask.layerId);
  return zones.flatMap(({ polygons }) => drawAll(placed, { type: 'MultiPolygon', coordinates: polygons }, path));
}

function drawAll(placed: PlacedScene, geometry: ArealGeometry, path: string): PixelPolygon[] {
  const polygons = geometry.type === 'Polygon' ? [geometry.coordinates] : geometry.coordinates;
  return polygons.map((coordinates) => {
    const drawn = drawInPixels(placed, { type: 'Polygon', coordinates });
    if (!drawn) throw refuse(path, 'an outline without a place in the scene’s projection', 'an outline over the map');
    return drawn;
  });
}

function refuse(path: string, found: string, wanted: string): InvalidInput {
  return new InvalidInput(
    'A step cannot be applied to this map.',
    { found, wanted, advice: 'Change the step or take it out.', errors: [{ path, message: `Found ${found}.` }] },
    'step-refused',
  );
}
