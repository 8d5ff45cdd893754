import { IsNull, type EntityManager } from 'typeorm';
import type { z } from 'zod';
import { MAX_CLASS_CODE, MIN_CLASS_CODE } from '../../shared/constants/class-codes.ts';
import type { createLandClassSchema, updateLandClassSchema } from '../../shared/contracts/land-class.ts';
import type { App } from '../app-context.ts';
import { LandClass } from '../entities/land-class.ts';
import { Project } from '../entities/project.ts';
import { Sample } from '../entities/sample.ts';
import { Conflict, InvalidInput, NotFound } from '../errors.ts';
import { recordActivity } from './activities.ts';
import { moveSamples } from './samples-move.ts';

export interface LandClassRow {
  landClass: LandClass;
  sampleCount: number;
}

export function findLandClass(app: App, id: string): Promise<LandClass | null> {
  return app.db.getRepository(LandClass).findOneBy({ id });
}

/** The class scheme in its order. */
export async function listLandClasses(app: App, projectId: string): Promise<LandClassRow[]> {
  const classes = await app.db
    .getRepository(LandClass)
    .find({ where: { projectId }, order: { position: 'ASC', code: 'ASC' } });
  const counts = await app.db
    .getRepository(Sample)
    .createQueryBuilder('sample')
    .select('sample.classId', 'classId')
    .addSelect('COUNT(*)', 'count')
    .where({ projectId, deletedAt: IsNull() })
    .groupBy('sample.classId')
    .getRawMany<{ classId: string; count: string }>();
  const countOf = new Map(counts.map(({ classId, count }) => [classId, Number(count)]));
  return classes.map((landClass) => ({ landClass, sampleCount: countOf.get(landClass.id) ?? 0 }));
}

export async function loadLandClassRow(app: App, id: string): Promise<LandClassRow> {
  const landClass = await findLandClass(app, id);
  if (!landClass) throw new NotFound();
  const sampleCount = await app.db.getRepository(Sample).countBy({ classId: id, deletedAt: IsNull() });
  return { landClass, sampleCount };
}

/** Locks the project's row, so that two changes of one scheme follow each other. */
async function lockScheme(manager: EntityManager, projectId: string): Promise<LandClass[]> {
  await manager.findOneOrFail(Project, { where: { id: projectId }, lock: { mode: 'pessimistic_write' } });
  return manager.find(LandClass, { where: { projectId }, order: { position: 'ASC', code: 'ASC' } });
}

function checkCodeFree(scheme: readonly LandClass[], code: number, id: string | null): void {
  const holder = scheme.find((landClass) => landClass.code === code && landClass.id !== id);
  if (!holder) return;
  throw new Conflict(
    'The code is taken.',
    {
      found: `${code} is the code of ${holder.name}`,
      wanted: 'a code of its own for each class',
      errors: [{ path: 'code', message: `${code} is the code of ${holder.name}.` }],
    },
    'code-taken',
  );
}

/** The first code after the highest, or the lowest gap when the highest is the last. */
function nextCode(scheme: readonly LandClass[]): number {
  const taken = new Set(scheme.map(({ code }) => code));
  const highest = Math.max(MIN_CLASS_CODE - 1, ...taken);
  if (highest < MAX_CLASS_CODE) return highest + 1;
  for (let code = MIN_CLASS_CODE; code <= MAX_CLASS_CODE; code++) if (!taken.has(code)) return code;
  throw new Conflict('The scheme is full.', { found: `${taken.size} classes`, wanted: `at most ${MAX_CLASS_CODE}` });
}

async function announce(app: App, projectId: string, id: string | null, byId: string): Promise<void> {
  await app.events.publish(projectId, { type: 'changed', what: 'classes', id, by: byId });
}

export async function createLandClass(
  app: App,
  projectId: string,
  byId: string,
  input: z.output<typeof createLandClassSchema> & { id?: string },
): Promise<LandClassRow> {
  const id = await app.db.transaction(async (manager) => {
    const scheme = await lockScheme(manager, projectId);
    const code = input.code ?? nextCode(scheme);
    checkCodeFree(scheme, code, null);
    const position = (scheme.at(-1)?.position ?? -1) + 1;
    const made = await manager.save(LandClass, manager.create(LandClass, { ...input, code, projectId, position }));
    await recordActivity(manager, projectId, byId, `added class ${input.name}`, 'classes');
    return made.id;
  });
  await announce(app, projectId, id, byId);
  return loadLandClassRow(app, id);
}

/** Changes a class if it still stands at `version`; runs keep the scheme as it stood when they started. */
export async function updateLandClass(
  app: App,
  landClass: LandClass,
  byId: string,
  { version, ...change }: z.output<typeof updateLandClassSchema>,
): Promise<LandClassRow> {
  const { id, projectId } = landClass;
  await app.db.transaction(async (manager) => {
    const scheme = await lockScheme(manager, projectId);
    if (change.code !== undefined) checkCodeFree(scheme, change.code, id);
    const result = await manager.update(LandClass, { id, version }, { ...change, version: version + 1 });
    if (result.affected === 0) {
      throw new Conflict(
        'Someone else changed the class in between.',
        { advice: 'Look at their change, then make yours again.' },
        'stale-version',
      );
    }
    await recordActivity(manager, projectId, byId, `changed class ${change.name ?? landClass.name}`, 'classes');
  });
  await announce(app, projectId, id, byId);
  return loadLandClassRow(app, id);
}

/** Puts the scheme into a new order. @throws Conflict when a class came or went in between */
export async function orderLandClasses(
  app: App,
  projectId: string,
  byId: string,
  ids: readonly string[],
): Promise<LandClassRow[]> {
  await app.db.transaction(async (manager) => {
    const scheme = await lockScheme(manager, projectId);
    if (new Set(ids).size !== ids.length) {
      throw new InvalidInput('The order names a class twice.', {
        errors: [{ path: 'ids', message: 'Name each class once.' }],
      });
    }
    const isWhole = ids.length === scheme.length && scheme.every(({ id }) => ids.includes(id));
    if (!isWhole) {
      throw new Conflict(
        'The order does not name the scheme as it stands.',
        {
          found: `${ids.length} classes`,
          wanted: `the ${scheme.length} classes of the scheme, each once`,
          advice: 'Load the classes again, then order them.',
        },
        'stale-order',
      );
    }
    for (const [position, id] of ids.entries()) await manager.update(LandClass, { id, projectId }, { position });
    await recordActivity(manager, projectId, byId, 'changed the order of the classes', 'classes');
  });
  await announce(app, projectId, null, byId);
  return listLandClasses(app, projectId);
}

/**
 * Deletes a class; its samples go to the class named. Samples deleted before move too, or, where no class is named because none else are
 * left, go for good with the class.
 * @throws Conflict when it has samples and none is named
 */
export async function deleteLandClass(
  app: App,
  landClass: LandClass,
  byId: string,
  moveSamplesTo: string | undefined,
): Promise<void> {
  const { id, projectId, name } = landClass;
  const nMoved = await app.db.transaction(async (manager) => {
    const scheme = await lockScheme(manager, projectId);
    const heir =
      moveSamplesTo === undefined ? null : scheme.find((other) => other.id === moveSamplesTo && other.id !== id);
    if (heir === undefined) {
      throw new InvalidInput('The samples cannot move there.', {
        errors: [{ path: 'moveSamplesTo', message: 'Choose another class of this project.' }],
      });
    }
    const nSamples = await manager.countBy(Sample, { classId: id, deletedAt: IsNull() });
    if (nSamples > 0 && !heir) {
      throw new Conflict(
        'The class has samples.',
        {
          found: nSamples === 1 ? '1 sample' : `${nSamples} samples`,
          wanted: 'a class without samples, or a class they move to',
          advice: 'Choose the class that takes them over.',
        },
        'has-samples',
      );
    }
    if (heir) await moveSamples(manager, id, heir.id, byId);
    else await manager.delete(Sample, { classId: id });
    await manager.delete(LandClass, { id });
    const moved =
      heir && nSamples ? ` and moved ${nSamples === 1 ? '1 sample' : `${nSamples} samples`} to ${heir.name}` : '';
    await recordActivity(manager, projectId, byId, `deleted class ${name}${moved}`, 'classes');
    return nSamples;
  });
  await announce(app, projectId, id, byId);
  if (nMoved) await app.events.publish(projectId, { type: 'changed', what: 'samples', id: null, by: byId });
}
