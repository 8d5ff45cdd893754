import { createHash, randomUUID } from 'node:crypto';
import { In, type EntityManager } from 'typeorm';
import type {
  ChangePostProcessing,
  PostProcessingPreview,
  PostProcessingStep,
} from '../../shared/contracts/post-processing.ts';
import type { App } from '../app-context.ts';
import { Job } from '../entities/job.ts';
import { PostProcessingRevision } from '../entities/post-processing-revision.ts';
import { ReferenceDesign } from '../entities/reference-design.ts';
import { Run } from '../entities/run.ts';
import { Conflict, InvalidInput, NotFound } from '../errors.ts';
import { requireResult } from './accuracy.ts';
import { recordActivity } from './activities.ts';
import { listAreaChanges } from './area-changes.ts';
import { makeProcessedMap } from './post-processing-map.ts';
import { resolveSteps } from './post-processing-steps.ts';
import { runFiles } from './run-files.ts';
import { placeScene } from './run-scene.ts';

const M2_PER_HECTARE = 10_000;
/** A preview is waited for at the screen; larger maps take too long for that. */
const MAX_PREVIEW_PIXELS = 25_000_000;
const KEPT_PREVIEWS = 6;
const SHOWN = { job: true, madeBy: true } as const;

/** Newest first. */
export function listRevisions(app: App, runId: string): Promise<PostProcessingRevision[]> {
  return app.db
    .getRepository(PostProcessingRevision)
    .find({ where: { runId }, relations: SHOWN, order: { number: 'DESC' }, take: 200 });
}

/** Why a run's map may not change now; null when it may. */
export async function findRefusal(manager: EntityManager, run: Run): Promise<string | null> {
  const designs = await manager.findBy(ReferenceDesign, { projectId: run.projectId });
  const resting = designs.find(
    ({ runId, plan }) =>
      runId === run.id ||
      (typeof plan.strata === 'object' && plan.strata.kind === 'from-to' && plan.strata.runId === run.id),
  );
  return resting ? `Reference design ${resting.number} was drawn from this map.` : null;
}

/** @throws Conflict "map-judged" while a reference design rests on the run's map */
export async function requireUnjudgedMap(manager: EntityManager, run: Run): Promise<void> {
  const refusal = await findRefusal(manager, run);
  if (refusal === null) return;
  throw new Conflict(
    'The map cannot change: reference points were drawn from it.',
    {
      found: refusal,
      wanted: 'a map that no reference design rests on',
      advice: 'Start a new run with this list in its recipe, or delete the design while it is a draft.',
    },
    'map-judged',
  );
}

/**
 * Keeps a new list for a finished run as its next revision and queues its application.
 * @throws InvalidInput for a step that does not fit; Conflict while another is applied, when the list was changed in between, and
 * while reference points rest on the map
 */
export async function changePostProcessing(
  app: App,
  run: Run,
  by: { userId: string; name: string },
  { steps, basedOn }: ChangePostProcessing,
): Promise<void> {
  const placed = requirePlacedMap(run);
  await resolveSteps(app, run, placed, steps);
  const id = randomUUID();
  await app.db.transaction(async (manager) => {
    await manager.findOne(Run, { where: { id: run.id }, lock: { mode: 'pessimistic_write' } });
    await requireUnjudgedMap(manager, run);
    if (await manager.existsBy(Job, { runId: run.id, kind: 'post-process', state: In(['queued', 'running']) })) {
      throw new Conflict(
        'A list of steps is being applied to this run already.',
        { advice: 'Wait for it to end, or cancel it.' },
        'post-processing-under-way',
      );
    }
    const latest = await manager.findOne(PostProcessingRevision, {
      where: { runId: run.id },
      order: { number: 'DESC' },
    });
    if ((latest?.number ?? 0) !== basedOn) {
      throw new Conflict(
        'Somebody else changed the list in between.',
        { found: `revision ${latest?.number ?? 0}`, wanted: `revision ${basedOn}`, advice: 'Look at it again.' },
        'changed-in-between',
      );
    }
    const number = basedOn + 1;
    const job = await app.jobs.enqueue(manager, {
      ...{ kind: 'post-process', projectId: run.projectId, sceneId: run.sceneId, runId: run.id, subjectId: id },
    });
    await manager.insert(PostProcessingRevision, {
      ...{ id, runId: run.id, number, jobId: job.id, madeById: by.userId, effects: [] },
      steps: signEdits(steps, latest?.steps ?? [], by.name),
    });
    await recordActivity(
      manager,
      run.projectId,
      by.userId,
      `changed the post-processing of run ${run.number}`,
      `runs/${run.id}/post-processing`,
    );
  });
  await app.events.publish(run.projectId, { type: 'changed', what: 'runs', id: run.id, by: by.userId });
}

/** Edits by hand carry who made them and when: the author's own for new and changed ones, what stood before for the others. */
function signEdits(
  steps: readonly PostProcessingStep[],
  before: readonly PostProcessingStep[],
  name: string,
): PostProcessingStep[] {
  const at = new Date().toISOString();
  const bare = (step: PostProcessingStep) => JSON.stringify({ ...step, by: '', at: '', isOn: true });
  return steps.map((step) => {
    if (step.kind !== 'reclass') return step;
    const known = before.find(({ id }) => id === step.id);
    if (known?.kind === 'reclass' && bare(known) === bare(step)) return { ...step, by: known.by, at: known.at };
    return { ...step, by: name, at };
  });
}

/**
 * What a list would make of the classifier's map: a map for the screen, and the areas.
 * @throws InvalidInput "map-too-large-to-preview", or for a step that does not fit
 */
export async function previewPostProcessing(
  app: App,
  run: Run,
  steps: PostProcessingStep[],
  signal: AbortSignal,
): Promise<PostProcessingPreview> {
  const { grid } = requirePlacedMap(run);
  const result = requireResult(run);
  if (grid.width * grid.height > MAX_PREVIEW_PIXELS) {
    throw new InvalidInput(
      'The map is too large to preview.',
      {
        found: `${grid.width} × ${grid.height} pixels`,
        wanted: `at most ${MAX_PREVIEW_PIXELS / 1e6} million pixels`,
        advice: 'Apply the list; an earlier one can be taken back at any time.',
      },
      'map-too-large-to-preview',
    );
  }
  const rawSha = (result.raw ?? result).classMapSha256;
  const previewId = createHash('sha256')
    .update(JSON.stringify([rawSha, steps]))
    .digest('hex')
    .slice(0, 32);
  const files = runFiles(run.id);
  if (await app.files.has(files.previewFigures(previewId))) {
    return JSON.parse(
      (await app.files.read(files.previewFigures(previewId))).toString('utf8'),
    ) as PostProcessingPreview;
  }
  const target = { mapKey: files.preview(previewId), mapNamesKey: null, heldOut: [] };
  const map = await makeProcessedMap(app, run, steps, target, { signal, report: () => undefined });
  const areaHaByCode = Object.fromEntries(
    Object.entries(map.areaM2ByCode).map(([code, areaM2]) => [code, areaM2 / M2_PER_HECTARE]),
  );
  const preview = {
    previewId,
    effects: map.effects,
    areas: listAreaChanges(run.classes, (result.raw ?? result).areaHaByCode, areaHaByCode),
  };
  await app.files.write(files.previewFigures(previewId), Buffer.from(JSON.stringify(preview)));
  await forgetOldPreviews(app, run.id, previewId);
  return preview;
}

async function forgetOldPreviews(app: App, runId: string, newest: string): Promise<void> {
  const files = runFiles(runId);
  const kept = (await app.files.list(files.previews)).filter((key) => key.endsWith('.json') && !key.includes(newest));
  for (const key of kept.slice(KEPT_PREVIEWS - 1)) {
    const mapKey = key.replace(/json$/, 'tif');
    await app.bands.forget(await app.files.localPath(mapKey));
    await app.files.remove(mapKey);
    await app.files.remove(key);
  }
}

/** Where the map of a preview lies. @throws NotFound when it was never made or is gone */
export async function requirePreview(app: App, run: Run, previewId: string): Promise<string> {
  const key = runFiles(run.id).preview(previewId);
  if (!(await app.files.has(key))) throw new NotFound();
  return key;
}

function requirePlacedMap(run: Run) {
  requireResult(run);
  const placed = placeScene(run.scene);
  if (placed) return placed;
  throw new Conflict(
    'The scene of this run is not ready.',
    { found: `it is ${run.scene.state}`, wanted: 'a ready scene' },
    'scene-gone',
  );
}
