import { In } from 'typeorm';
import type { Polygon } from '../../shared/contracts/geometry.ts';
import { type DrawBlock, MAX_BLOCKS, type UpdateBlock } from '../../shared/contracts/block.ts';
import { ellipsoidalPolygonAreaM2 } from '../analysis/sampling/ellipsoidal-area.ts';
import type { App } from '../app-context.ts';
import { Block } from '../entities/block.ts';
import type { Project } from '../entities/project.ts';
import { Conflict, InvalidInput } from '../errors.ts';
import { recordActivity } from './activities.ts';
import { findBlockOverlap } from './block-overlap.ts';
import { placeSamples } from './place-samples.ts';

export function findBlock(app: App, id: string): Promise<Block | null> {
  return app.db.getRepository(Block).findOneBy({ id });
}

export async function announceBlocks(app: App, projectId: string, id: string | null, by: string): Promise<void> {
  await app.events.publish(projectId, { type: 'changed', what: 'blocks', id, by });
}

export interface NewBlock {
  name: string;
  geometry: Polygon;
  targetPerClass: number | null;
}

/** Adds blocks after those there are, or instead of them; samples find their block anew. */
export async function addBlocks(
  app: App,
  project: Project,
  byId: string,
  wanted: readonly NewBlock[],
  { replace, said }: { replace: boolean; said: string },
): Promise<void> {
  await app.db.transaction(async (manager) => {
    await manager.query('SELECT id FROM projects WHERE id = ? FOR UPDATE', [project.id]);
    if (replace) await manager.delete(Block, { projectId: project.id });
    const standing = await manager.find(Block, { where: { projectId: project.id } });
    if (standing.length + wanted.length > MAX_BLOCKS) {
      throw new InvalidInput('There are too many blocks.', {
        found: `${standing.length + wanted.length} blocks`,
        wanted: `at most ${MAX_BLOCKS}`,
        advice: 'Choose a larger block.',
      });
    }
    for (const { name, geometry } of wanted) {
      const met = findBlockOverlap(geometry, standing);
      if (met) {
        throw new InvalidInput(`Block ${name} would overlap block ${met.name}.`, {
          wanted: 'blocks that do not overlap, so that each sample has one',
          errors: [{ path: 'geometry', message: `Leave out what block ${met.name} covers.` }],
        });
      }
      if (standing.some((one) => one.name === name)) {
        throw new InvalidInput(`There is a block ${name} already.`, {
          errors: [{ path: 'name', message: 'Choose another name.' }],
        });
      }
    }
    const last = Math.max(0, ...standing.map(({ number }) => number));
    await manager.insert(
      Block,
      wanted.map(({ name, geometry, targetPerClass }, i) => ({
        ...{ projectId: project.id, number: last + i + 1, name, geometry, targetPerClass },
        ...{ areaHa: ellipsoidalPolygonAreaM2(geometry.coordinates) / 10_000, checkedAt: null, agreement: null },
      })),
    );
    await placeSamples(manager, project.id);
    await recordActivity(manager, project.id, byId, said, 'samples/blocks');
  });
  await announceBlocks(app, project.id, null, byId);
}

export async function drawBlock(
  app: App,
  project: Project,
  byId: string,
  { name, geometry, targetPerClass }: DrawBlock,
): Promise<void> {
  const block = { name, geometry, targetPerClass: targetPerClass ?? null };
  await addBlocks(app, project, byId, [block], { replace: false, said: `drew block ${name}` });
}

/** Renames a block or sets its target, if it still stands at `version`. @throws Conflict when it was changed in between */
export async function updateBlock(
  app: App,
  block: Block,
  byId: string,
  { version, ...change }: UpdateBlock,
): Promise<void> {
  const blocks = app.db.getRepository(Block);
  if (change.name !== undefined && change.name !== block.name) {
    if (await blocks.existsBy({ projectId: block.projectId, name: change.name })) {
      throw new InvalidInput(`There is a block ${change.name} already.`, {
        errors: [{ path: 'name', message: 'Choose another name.' }],
      });
    }
  }
  const result = await blocks.update({ id: block.id, version }, { ...change, version: version + 1 });
  if (result.affected === 0) {
    throw new Conflict('Someone else changed the block in between.', { advice: 'Look at it again.' }, 'stale-version');
  }
  await announceBlocks(app, block.projectId, block.id, byId);
}

/** Removes a block with its assignments; its samples stay, in no block. */
export async function deleteBlock(app: App, block: Block, byId: string): Promise<void> {
  await app.db.transaction(async (manager) => {
    await manager.delete(Block, { id: In([block.id]) });
    await placeSamples(manager, block.projectId);
    await recordActivity(manager, block.projectId, byId, `removed block ${block.name}`, 'samples/blocks');
  });
  await announceBlocks(app, block.projectId, null, byId);
}
