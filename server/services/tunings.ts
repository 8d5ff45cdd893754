import { randomUUID } from 'node:crypto';
import { In } from 'typeorm';
import type { Recipe } from '../../shared/contracts/run.ts';
import type { TuningPlan, TuningTrial } from '../../shared/contracts/tuning.ts';
import type { App } from '../app-context.ts';
import { Job } from '../entities/job.ts';
import type { Project } from '../entities/project.ts';
import { Tuning, type TuningSample } from '../entities/tuning.ts';
import { Conflict, InvalidInput, NotFound } from '../errors.ts';
import { recordActivity } from './activities.ts';
import { checkRecipe } from './recipe-check.ts';
import { placeScene } from './run-scene.ts';
import { planFolds } from './tuning-folds.ts';
import { listTrials } from './tuning-trials.ts';

const SHOWN = { job: true, startedBy: true } as const;

/** Newest first. */
export function listTunings(app: App, projectId: string): Promise<Tuning[]> {
  return app.db
    .getRepository(Tuning)
    .find({ where: { projectId }, relations: SHOWN, order: { createdAt: 'DESC' }, take: 100 });
}

export function findTuning(app: App, id: string): Promise<Tuning | null> {
  return app.db.getRepository(Tuning).findOne({ where: { id }, relations: SHOWN });
}

/**
 * Starts a search: takes the snapshot of samples and classes, and queues the work.
 * @throws InvalidInput "recipe-refused" or "plan-refused", saying why
 */
export async function startTuning(
  app: App,
  project: Project,
  byId: string,
  { name, recipe, plan }: { name: string; recipe: Recipe; plan: TuningPlan },
): Promise<Tuning> {
  const checked = await checkRecipe(app, project, recipe);
  if (!checked.plan) {
    const stops = checked.problems.filter(({ severity }) => severity === 'stops');
    throw new InvalidInput(
      'The recipe cannot be tuned.',
      {
        errors: stops.map(({ path, text }) => ({ path, message: text })),
        found: stops.map(({ text }) => text).join(' '),
        advice: 'Change what is named and start again.',
      },
      'recipe-refused',
    );
  }
  const samples: TuningSample[] = checked.plan.samples.map(({ sample, part }) => ({
    ...{ id: sample.id, classId: sample.classId, part, geometry: sample.geometry },
  }));
  const classes = checked.plan.classes.map(({ id, code, name: className, colour }) => ({
    ...{ id, code, name: className, colour },
  }));
  const placed = placeScene(checked.plan.scene);
  if (!placed) throw new Conflict('The scene was removed in between.', { advice: 'Choose another.' }, 'scene-gone');
  let notes: string[];
  try {
    listTrials(recipe.classifier, plan);
    notes = planFolds(placed, samples, classes, plan).notes;
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
    throw new InvalidInput('The search cannot be done.', { found: error.message }, 'plan-refused');
  }
  const id = randomUUID();
  await app.db.transaction(async (manager) => {
    const job = await app.jobs.enqueue(manager, {
      ...{ kind: 'tune', projectId: project.id, sceneId: recipe.sceneId, subjectId: id },
    });
    await manager.insert(Tuning, {
      ...{ id, projectId: project.id, name, recipe, plan, classes, studyArea: project.studyArea, samples, notes },
      ...{ trials: [], jobId: job.id, startedById: byId },
    });
    await recordActivity(manager, project.id, byId, `started a tuning${name ? ` (${name})` : ''}`, 'runs/tunings');
  });
  await app.events.publish(project.id, { type: 'changed', what: 'runs', id: null, by: byId });
  const made = await findTuning(app, id);
  if (!made) throw new NotFound();
  return made;
}

/** Removes a tuning with its results. @throws Conflict while it waits or works */
export async function deleteTuning(app: App, tuning: Tuning, byId: string): Promise<void> {
  await app.db.transaction(async (manager) => {
    const underWay = await manager.findOne(Job, {
      where: { id: tuning.jobId ?? '', state: In(['queued', 'running']) },
      lock: { mode: 'pessimistic_write' },
    });
    if (underWay) {
      throw new Conflict(
        'The tuning is still under way.',
        { found: `it is ${underWay.state}`, advice: 'Cancel it first.' },
        'tuning-under-way',
      );
    }
    await manager.delete(Tuning, { id: tuning.id });
    if (tuning.jobId) await manager.delete(Job, { id: tuning.jobId });
    await recordActivity(manager, tuning.projectId, byId, 'deleted a tuning', 'runs/tunings');
  });
  await app.events.publish(tuning.projectId, { type: 'changed', what: 'runs', id: null, by: byId });
}

/** Number of the trial with the greatest mean accuracy, the first of equals; null while there is none. */
export function findBestTrial(trials: readonly TuningTrial[]): number | null {
  let best: TuningTrial | null = null;
  for (const trial of trials) {
    if (trial.meanAccuracy === null || trial.error !== null) continue;
    if (best === null || trial.meanAccuracy > (best.meanAccuracy ?? 0)) best = trial;
  }
  return best?.number ?? null;
}
