import { NODATA_CODE, UNCLASSIFIED_CODE } from '../../shared/constants/class-codes.ts';
import { runLayers, type Run as RunContract } from '../../shared/contracts/run.ts';
import type { z } from 'zod';
import type { classAreaSchema } from '../../shared/contracts/run.ts';
import type { Run } from '../entities/run.ts';
import { presentJob } from './present-job.ts';
import { can } from '../policies/policy-table.ts';
import type { Viewer } from '../policies/viewer.ts';
import { isUnderWay } from '../services/runs.ts';
import { completeRecipe } from './complete-recipe.ts';

type ClassArea = z.infer<typeof classAreaSchema>;

const NODATA_COLOUR = '#000000';
const UNCLASSIFIED_COLOUR = '#808080';

/** Area of each class of a finished run, in the recipe's order, then what the map leaves out. */
export function listClassAreas(run: Run): ClassArea[] | null {
  const { result } = run;
  if (!result) return null;
  const amounts = (code: number) => ({
    pixels: result.pixelsByCode[code] ?? 0,
    areaHa: result.areaHaByCode[code] ?? 0,
  });
  const areas: ClassArea[] = run.classes.map(({ id, code, name, colour }) => ({
    ...{ classId: id, code, name, colour },
    ...amounts(code),
  }));
  const others = [
    { code: UNCLASSIFIED_CODE, name: 'Unclassified', colour: UNCLASSIFIED_COLOUR },
    { code: NODATA_CODE, name: 'No data or outside the study area', colour: NODATA_COLOUR },
  ];
  for (const other of others) {
    const left = amounts(other.code);
    if (left.pixels > 0) areas.push({ classId: null, ...other, ...left });
  }
  return areas;
}

/** Accuracy is shown only to those who may read it; neither it nor areas to those from whom maps are withheld. */
export function presentRun(run: Run, viewer: Viewer, isMapWithheld = false): RunContract {
  const { result, job } = run;
  const shown = can('accuracy.read', viewer.roles) && !isMapWithheld ? result : null;
  const mayStop = can('run.stop', viewer.roles, run.startedById === viewer.userId);
  return {
    id: run.id,
    projectId: run.projectId,
    number: run.number,
    name: run.name,
    note: run.note,
    recipe: completeRecipe(run.recipe),
    classes: run.classes,
    sceneName: run.scene.name,
    job: presentJob(job),
    startedBy: run.startedBy ? { id: run.startedBy.id, name: run.startedBy.name } : null,
    createdAt: run.createdAt.toISOString(),
    trainingPixels: result?.trainingPixels ?? null,
    trainingPolygons: result?.trainingPolygons ?? null,
    heldOutPolygons: result?.heldOutPolygons ?? null,
    classMapSha256: result?.classMapSha256 ?? null,
    inputSha256: run.inputSha256,
    areas: isMapWithheld ? null : listClassAreas(run),
    overallAccuracy: shown?.overallAccuracy ?? null,
    overallLow: shown?.overallLow ?? null,
    overallHigh: shown?.overallHigh ?? null,
    bounds: run.scene.bounds,
    layers: isMapWithheld || !result?.layerKeys ? [] : [...runLayers],
    notes: [...run.warnings, ...(isMapWithheld ? [] : (result?.notes ?? []))],
    abilities: {
      cancel: mayStop && isUnderWay(run),
      delete: mayStop && !isUnderWay(run),
      retry: can('run.start', viewer.roles) && (job.state === 'failed' || job.state === 'cancelled'),
      prioritise: can('run.start', viewer.roles) && job.state === 'queued',
    },
  };
}
