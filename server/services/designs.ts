import { randomInt } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import type { AugmentDesign, CreateDesign, DesignState, PlanDesign } from '../../shared/contracts/reference.ts';
import type { App } from '../app-context.ts';
import { LandClass } from '../entities/land-class.ts';
import { Project } from '../entities/project.ts';
import { ReferenceDesign } from '../entities/reference-design.ts';
import { ReferencePoint } from '../entities/reference-point.ts';
import { Run, type RunClass } from '../entities/run.ts';
import { Conflict, InvalidInput, NotFound } from '../errors.ts';
import { recordActivity } from './activities.ts';
import { drawDesign } from './design-draw.ts';
import { planDesign } from './design-plan.ts';
import { openStrata } from './design-strata.ts';
import { copySettledAnswers, insertPoints, toDrawnPoint } from './design-points.ts';
import { loadAnsweredPoints } from './design-settle.ts';
import { readCodesAt } from './map-pixels.ts';
import { findPlannedRun } from './planned-run.ts';

const SHOWN = { createdBy: true, run: true } as const;
const SEEDS = 2 ** 32;

/** Newest first. */
export function listDesigns(app: App, projectId: string): Promise<ReferenceDesign[]> {
  return app.db
    .getRepository(ReferenceDesign)
    .find({ where: { projectId }, relations: SHOWN, order: { number: 'DESC' } });
}

export function findDesign(app: App, id: string): Promise<ReferenceDesign | null> {
  return app.db.getRepository(ReferenceDesign).findOne({ where: { id }, relations: SHOWN });
}

async function requireDesign(app: App, id: string): Promise<ReferenceDesign> {
  const design = await findDesign(app, id);
  if (!design) throw new NotFound();
  return design;
}

/** Classes an answer may name: what is there on the ground need not be on the map. */
async function listAnswerClasses(app: App, run: Run): Promise<RunClass[]> {
  const scheme = await app.db
    .getRepository(LandClass)
    .find({ where: { projectId: run.projectId }, order: { position: 'ASC' } });
  const others = scheme.filter(
    (landClass) => !run.classes.some(({ id, code }) => id === landClass.id || code === landClass.code),
  );
  return [...run.classes, ...others].map(({ id, code, name, colour }) => ({ id, code, name, colour }));
}

/** Plans and draws a design as a draft. @throws InvalidInput as `planDesign` and `drawDesign` do */
export async function createDesign(
  app: App,
  projectId: string,
  byId: string,
  { name, seed = randomInt(SEEDS), minSpacingMeters, answersPerPoint, ...input }: CreateDesign,
): Promise<ReferenceDesign> {
  const run = await findPlannedRun(app, projectId, input.runId);
  const open = await openStrata(app, run, input);
  const { strata } = planDesign(open.strata, input);
  const { points, leftOut } = await drawDesign(run, { strata, read: open.read }, { seed, minSpacingMeters });
  const mapped = await readCodesAt(app, run, points);
  const classes = await listAnswerClasses(app, run);
  const id = await app.db.transaction(async (manager) => {
    await holdMap(manager, run);
    const design = await insertDesign(manager, {
      ...{ projectId, runId: run.id, name, plan: input, strata, classes, seed, minSpacingMeters, answersPerPoint },
      ...{ leftOutBySpacing: leftOut, augmentsId: null, createdById: byId },
    });
    await insertPoints(manager, design, run, { drawn: points, mapped });
    await recordActivity(manager, projectId, byId, `drew reference design ${design.number}`, 'accuracy');
    return design.id;
  });
  return announceDesign(app, projectId, id, byId);
}

/** Keeps the map the points were drawn from in place. @throws Conflict when it was post-processed meanwhile */
async function holdMap(manager: EntityManager, run: Run): Promise<void> {
  const current = await manager.findOne(Run, { where: { id: run.id }, lock: { mode: 'pessimistic_write' } });
  if (current?.result && current.result.mapKey === run.result?.mapKey) return;
  throw new Conflict('The map was changed while the points were drawn.', { advice: 'Draw them again.' });
}

type NewDesign = Pick<
  ReferenceDesign,
  | 'projectId'
  | 'runId'
  | 'name'
  | 'plan'
  | 'strata'
  | 'classes'
  | 'seed'
  | 'minSpacingMeters'
  | 'answersPerPoint'
  | 'leftOutBySpacing'
  | 'augmentsId'
  | 'createdById'
>;

async function insertDesign(manager: EntityManager, fields: NewDesign): Promise<ReferenceDesign> {
  // Locks the project, so that two designs never take one number.
  await manager.findOneOrFail(Project, { where: { id: fields.projectId }, lock: { mode: 'pessimistic_write' } });
  const last = await manager.maximum(ReferenceDesign, 'number', { projectId: fields.projectId });
  const design = manager.create(ReferenceDesign, { ...fields, number: (last ?? 0) + 1, state: 'draft', digest: null });
  return manager.save(design);
}

/** Tells the project's browsers of a change, and gives the design as it now stands. */
export async function announceDesign(app: App, projectId: string, id: string, byId: string): Promise<ReferenceDesign> {
  await app.events.publish(projectId, { type: 'changed', what: 'designs', id, by: byId });
  return requireDesign(app, id);
}

/** Locks a design in one of the states. @throws Conflict with `code` in another */
export async function lockDesign(
  manager: EntityManager,
  id: string,
  states: readonly DesignState[],
  code: string,
  message: string,
): Promise<ReferenceDesign> {
  const design = await manager.findOne(ReferenceDesign, { where: { id }, lock: { mode: 'pessimistic_write' } });
  if (!design) throw new NotFound();
  if (states.includes(design.state)) return design;
  throw new Conflict(message, { found: `it is ${design.state}`, wanted: states.join(' or ') }, code);
}

const FROZEN = 'The design is frozen: its points cannot change once interpretation has started.';

/** Removes a draft. @throws Conflict "design-frozen" for any other */
export async function deleteDesign(app: App, design: ReferenceDesign, byId: string): Promise<void> {
  await app.db.transaction(async (manager) => {
    await lockDesign(manager, design.id, ['draft'], 'design-frozen', FROZEN);
    await manager.delete(ReferenceDesign, { id: design.id });
    await recordActivity(manager, design.projectId, byId, `deleted reference design ${design.number}`, 'accuracy');
  });
  await app.events.publish(design.projectId, { type: 'changed', what: 'designs', id: design.id, by: byId });
}

/**
 * Makes a design larger without drawing its points again. A draft grows in place; from a closed design a new draft is made
 * that begins with its points and the classes that stand.
 * @throws Conflict "design-frozen" while it is interpreted; InvalidInput when the plan adds no point
 */
export async function augmentDesign(
  app: App,
  design: ReferenceDesign,
  byId: string,
  { target, allocation, name }: AugmentDesign,
): Promise<ReferenceDesign> {
  const { projectId, seed, minSpacingMeters } = design;
  const run = await findPlannedRun(app, projectId, design.runId);
  const plan: PlanDesign = { ...design.plan, target, allocation };
  const open = await openStrata(app, run, plan);
  const { strata } = planDesign(
    open.strata,
    plan,
    design.strata.map(({ points }) => points),
  );
  const before = await loadAnsweredPoints(app, design.id);
  if (strata.reduce((sum, { points }) => sum + points, 0) <= before.length) {
    throw new InvalidInput('The plan adds no point to the design.', {
      ...{ found: `${before.length} points are drawn already`, advice: 'Ask for more points.' },
      errors: [{ path: 'target', message: 'The plan adds no point to the design.' }],
    });
  }
  const existing = before.map(({ point }) => toDrawnPoint(point));
  const draw = await drawDesign(run, { strata, read: open.read }, { seed, minSpacingMeters, existing });
  const mapped = await readCodesAt(app, run, draw.points);
  const id = await app.db.transaction(async (manager) => {
    const current = await lockDesign(manager, design.id, ['draft', 'closed'], 'design-frozen', FROZEN);
    const changes = { plan, strata, leftOutBySpacing: draw.leftOut, ...(name === undefined ? {} : { name }) };
    await recordActivity(manager, projectId, byId, `augmented reference design ${design.number}`, 'accuracy');
    if (current.state === 'closed') {
      const { runId, classes, answersPerPoint } = current;
      const grown = await insertDesign(manager, {
        ...{ projectId, runId, classes, seed, minSpacingMeters, answersPerPoint, name: current.name },
        ...{ ...changes, augmentsId: current.id, createdById: byId },
      });
      await insertPoints(manager, grown, run, { drawn: draw.points, mapped }, before);
      await copySettledAnswers(manager, grown.id, before);
      return grown.id;
    }
    if ((await manager.countBy(ReferencePoint, { designId: current.id })) !== before.length) {
      throw new Conflict('Somebody else changed the design in between.', { advice: 'Look at it again.' });
    }
    await manager.update(ReferenceDesign, { id: current.id }, changes as never);
    if (current.augmentsId === null) {
      await manager.delete(ReferencePoint, { designId: current.id });
      await insertPoints(manager, current, run, { drawn: draw.points, mapped });
    } else {
      const known = new Set(existing.map(({ stratum, order }) => `${stratum}/${order}`));
      const isAdded = draw.points.map(({ stratum, order }) => !known.has(`${stratum}/${order}`));
      const added = {
        drawn: draw.points.filter((_, i) => isAdded[i]),
        mapped: mapped.filter((_, i) => isAdded[i]),
      };
      await insertPoints(manager, current, run, added, [], before.length);
    }
    return current.id;
  });
  return announceDesign(app, projectId, id, byId);
}
