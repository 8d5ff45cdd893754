import type { NamedRecipe as NamedRecipeContract } from '../../shared/contracts/named-recipe.ts';
import type { Tuning as TuningContract } from '../../shared/contracts/tuning.ts';
import type { NamedRecipe } from '../entities/named-recipe.ts';
import type { Tuning } from '../entities/tuning.ts';
import { presentJob } from './present-job.ts';
import { can } from '../policies/policy-table.ts';
import type { Viewer } from '../policies/viewer.ts';
import { findBestTrial } from '../services/tunings.ts';
import { presentPerson } from './present-account.ts';
import { completeRecipe } from './complete-recipe.ts';

export function presentNamedRecipe(row: NamedRecipe, viewer: Viewer): NamedRecipeContract {
  const { id, projectId, name, note, recipe, version } = row;
  return {
    ...{ id, projectId, name, note, version },
    recipe: completeRecipe(recipe),
    createdBy: presentPerson(row.createdBy),
    updatedAt: row.updatedAt.toISOString(),
    abilities: { change: can('run.start', viewer.roles) },
  };
}

export function presentTuning(row: Tuning, viewer: Viewer): TuningContract {
  const { id, projectId, name, recipe, plan, trials, notes, samples, job } = row;
  const isUnderWay = job?.state === 'queued' || job?.state === 'running';
  const mayStop = can('run.stop', viewer.roles);
  return {
    ...{ id, projectId, name, plan, trials, notes },
    recipe: completeRecipe(recipe),
    job: job ? presentJob(job) : null,
    bestTrial: findBestTrial(trials),
    nTrainingPolygons: samples.filter(({ part }) => part === 'training').length,
    startedBy: presentPerson(row.startedBy),
    createdAt: row.createdAt.toISOString(),
    abilities: { cancel: mayStop && isUnderWay, delete: mayStop && !isUnderWay },
  };
}
