import { In } from 'typeorm';
import type { RecipeDiff } from '../../shared/contracts/named-recipe.ts';
import type { Recipe } from '../../shared/contracts/run.ts';
import type { App } from '../app-context.ts';
import { Band } from '../entities/band.ts';
import { LandClass } from '../entities/land-class.ts';
import { NamedRecipe } from '../entities/named-recipe.ts';
import { Run } from '../entities/run.ts';
import { Scene } from '../entities/scene.ts';
import { Conflict, NotFound } from '../errors.ts';
import { recordActivity } from './activities.ts';
import { diffRecipes } from './recipe-diff.ts';

/** By name. */
export function listNamedRecipes(app: App, projectId: string): Promise<NamedRecipe[]> {
  return app.db
    .getRepository(NamedRecipe)
    .find({ where: { projectId }, relations: { createdBy: true }, order: { name: 'ASC' } });
}

export function findNamedRecipe(app: App, id: string): Promise<NamedRecipe | null> {
  return app.db.getRepository(NamedRecipe).findOne({ where: { id }, relations: { createdBy: true } });
}

/** Keeps a recipe under a name. @throws Conflict when the project has one of this name */
export async function createNamedRecipe(
  app: App,
  projectId: string,
  byId: string,
  { name, note, recipe }: { name: string; note: string; recipe: Recipe },
): Promise<NamedRecipe> {
  const row = app.db.getRepository(NamedRecipe).create({ projectId, name, note, recipe, createdById: byId });
  await refuseTakenName(name, () =>
    app.db.transaction(async (manager) => {
      await manager.save(row);
      await recordActivity(manager, projectId, byId, `kept a recipe as “${name}”`, 'runs/recipes');
    }),
  );
  return announce(app, row.id, projectId, byId);
}

/** Renames or replaces a recipe. @throws Conflict when someone changed it in between, or the name is taken */
export async function updateNamedRecipe(
  app: App,
  row: NamedRecipe,
  byId: string,
  { version, ...change }: { version: number; name?: string; note?: string; recipe?: Recipe },
): Promise<NamedRecipe> {
  const { affected } = await refuseTakenName(change.name ?? row.name, () =>
    app.db
      .createQueryBuilder()
      .update(NamedRecipe)
      .set({ ...change, version: () => 'version + 1' })
      .where({ id: row.id, version })
      .execute(),
  );
  if (!affected) {
    const current = await findNamedRecipe(app, row.id);
    if (!current) throw new NotFound();
    throw new Conflict(
      'Someone else changed this recipe in between.',
      { found: `version ${current.version}`, wanted: `version ${version}`, advice: 'Look at it as it stands now.' },
      'stale-version',
    );
  }
  return announce(app, row.id, row.projectId, byId);
}

export async function deleteNamedRecipe(app: App, row: NamedRecipe, byId: string): Promise<void> {
  await app.db.transaction(async (manager) => {
    await manager.delete(NamedRecipe, { id: row.id });
    await recordActivity(manager, row.projectId, byId, `deleted the recipe “${row.name}”`, 'runs/recipes');
  });
  await app.events.publish(row.projectId, { type: 'changed', what: 'runs', id: null, by: byId });
}

async function refuseTakenName<T>(name: string, write: () => Promise<T>): Promise<T> {
  try {
    return await write();
  } catch (error) {
    if ((error as { code?: string }).code !== 'ER_DUP_ENTRY') throw error;
    throw new Conflict(
      'The project has a recipe of this name already.',
      { found: name, advice: 'Choose another name, or delete the other recipe first.' },
      'name-taken',
    );
  }
}

async function announce(app: App, id: string, projectId: string, byId: string): Promise<NamedRecipe> {
  await app.events.publish(projectId, { type: 'changed', what: 'runs', id: null, by: byId });
  const row = await findNamedRecipe(app, id);
  if (!row) throw new NotFound();
  return row;
}

interface RecipeSide {
  title: string;
  recipe: Recipe;
  run: Run | null;
}

async function findSide(app: App, projectId: string, ref: string): Promise<RecipeSide> {
  const [kind, id = ''] = ref.split(':');
  if (kind === 'run') {
    const run = await app.db.getRepository(Run).findOneBy({ id, projectId });
    if (!run) throw new NotFound();
    return { title: `Run ${run.number}${run.name ? ` (${run.name})` : ''}`, recipe: run.recipe, run };
  }
  const row = await app.db.getRepository(NamedRecipe).findOneBy({ id, projectId });
  if (!row) throw new NotFound();
  return { title: row.name, recipe: row.recipe, run: null };
}

/** What sets two recipes of a project apart, runs or named ones. @throws NotFound when one is not the project's */
export async function compareRecipes(
  app: App,
  projectId: string,
  refs: { left: string; right: string },
): Promise<RecipeDiff> {
  const left = await findSide(app, projectId, refs.left);
  const right = await findSide(app, projectId, refs.right);
  const names = await nameThings(app, projectId);
  const notes: string[] = [];
  if (left.run && right.run && left.run.inputSha256 !== right.run.inputSha256) {
    notes.push('The two runs did not have the same input: samples, their split, classes, study area or bands differ.');
  }
  if (left.run && right.run && left.run.inputSha256 === right.run.inputSha256) {
    notes.push('The two runs had the same samples, split, classes, study area and bands.');
  }
  return {
    left: { title: left.title },
    right: { title: right.title },
    differences: diffRecipes(left.recipe, right.recipe, (id) => names.get(id) ?? null),
    notes,
  };
}

/** Names of a project's scenes, bands and classes by id. */
async function nameThings(app: App, projectId: string): Promise<Map<string, string>> {
  const scenes = await app.db.getRepository(Scene).find({ where: { projectId }, select: { id: true, name: true } });
  const bands = await app.db
    .getRepository(Band)
    .find({ where: { sceneId: In(scenes.map(({ id }) => id)) }, select: { id: true, name: true } });
  const classes = await app.db
    .getRepository(LandClass)
    .find({ where: { projectId }, select: { id: true, name: true } });
  return new Map([...scenes, ...bands, ...classes].map(({ id, name }) => [id, name]));
}
