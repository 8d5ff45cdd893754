import { randomUUID } from 'node:crypto';
import { In } from 'typeorm';
import type { App } from '../app-context.ts';
import { Band } from '../entities/band.ts';
import { Job } from '../entities/job.ts';
import { Reproduction } from '../entities/reproduction.ts';
import { RunSample } from '../entities/run-sample.ts';
import type { Run } from '../entities/run.ts';
import { Conflict, NotFound } from '../errors.ts';
import { hashFile } from '../raster/hash-file.ts';
import { recordActivity } from './activities.ts';
import { digestInput, placeScene } from './run-scene.ts';

const SHOWN = { job: true, askedBy: true } as const;

/** Newest first. */
export function listReproductions(app: App, runId: string): Promise<Reproduction[]> {
  return app.db
    .getRepository(Reproduction)
    .find({ where: { runId }, relations: SHOWN, order: { createdAt: 'DESC' }, take: 50 });
}

/** Queues the making of a finished run once more. @throws Conflict when it is not finished or being made already */
export async function askReproduction(app: App, run: Run, byId: string): Promise<Reproduction> {
  if (!run.result) {
    throw new Conflict(
      'Only a finished run can be reproduced.',
      { found: `the run is ${run.job.state}`, wanted: 'a finished run' },
      'not-finished',
    );
  }
  const id = randomUUID();
  await app.db.transaction(async (manager) => {
    const underWay = await manager.findOne(Job, {
      where: { runId: run.id, kind: 'reproduce', state: In(['queued', 'running']) },
      lock: { mode: 'pessimistic_write' },
    });
    if (underWay) {
      throw new Conflict(
        'This run is being reproduced already.',
        { found: `that is ${underWay.state}`, advice: 'Wait for it to end, or cancel it.' },
        'reproduction-under-way',
      );
    }
    const job = await app.jobs.enqueue(manager, {
      ...{ kind: 'reproduce', projectId: run.projectId, sceneId: run.sceneId, runId: run.id, subjectId: id },
    });
    await insertReproduction(app, manager, { id, runId: run.id, jobId: job.id, askedById: byId });
    await recordActivity(manager, run.projectId, byId, `asked to reproduce run ${run.number}`, `runs/${run.id}`);
  });
  await app.events.publish(run.projectId, { type: 'changed', what: 'runs', id: run.id, by: byId });
  const made = await app.db.getRepository(Reproduction).findOne({ where: { id }, relations: SHOWN });
  if (!made) throw new NotFound();
  return made;
}

export async function insertReproduction(
  app: App,
  manager: App['db']['manager'],
  row: { id: string; runId: string; jobId: string | null; askedById: string | null },
): Promise<void> {
  const { threads } = app.workers.compute;
  await manager.insert(Reproduction, { ...row, verdict: null, checks: [], missing: [], threads, seconds: null });
}

/** What a run was made from and is no longer there as it was, in plain words; empty when all stands. */
export async function listMissingInputs(app: App, run: Run, signal: AbortSignal): Promise<string[]> {
  const missing: string[] = [];
  if (!placeScene(run.scene)) missing.push(`The scene “${run.scene.name}” is not ready: it is ${run.scene.state}.`);
  const found = await app.db.getRepository(Band).findBy({ id: In(run.recipe.bandIds), sceneId: run.sceneId });
  const bands = run.recipe.bandIds.flatMap((id) => found.find((band) => band.id === id) ?? []);
  const nGone = run.recipe.bandIds.length - bands.length;
  if (nGone > 0) {
    missing.push(`${nGone} of the recipe’s ${run.recipe.bandIds.length} bands are no longer in the scene.`);
  }
  let isAnyChanged = nGone > 0;
  for (const band of bands) {
    if (!(await app.files.has(band.fileKey))) {
      missing.push(`The file of band ${band.name} is missing.`);
      isAnyChanged = true;
    } else if ((await hashFile(await app.files.localPath(band.fileKey), signal)) !== band.sha256) {
      missing.push(`The file of band ${band.name} is not the one that was taken in: its SHA-256 differs.`);
      isAnyChanged = true;
    }
  }
  const samples = await app.db.getRepository(RunSample).findBy({ runId: run.id });
  const digest = digestInput({ samples, classes: run.classes, bands, studyArea: run.studyArea });
  if (digest !== run.inputSha256 && !isAnyChanged) {
    missing.push(
      'Samples, classes, study area and bands as stored do not add up to the digest the run was started with.',
    );
  }
  return missing;
}
