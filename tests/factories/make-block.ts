import type { App } from '../../server/app-context.ts';
import { BlockAssignment } from '../../server/entities/block-assignment.ts';
import { Block } from '../../server/entities/block.ts';
import type { Project } from '../../server/entities/project.ts';
import type { Polygon } from '../../shared/contracts/geometry.ts';

let made = 0;

/** A block given to people, straight into the database; samples there are do not find it by themselves. */
export async function makeBlock(
  app: App,
  project: Project,
  geometry: Polygon,
  people: readonly { id: string }[],
  overrides: Partial<Block> = {},
): Promise<Block> {
  made++;
  const blocks = app.db.getRepository(Block);
  const block = await blocks.save(
    blocks.create({
      ...{ projectId: project.id, number: made, name: `Block ${made}`, geometry, areaHa: 1 },
      ...{ targetPerClass: null, checkedAt: null, agreement: null, ...overrides },
    }),
  );
  for (const { id } of people) {
    await app.db.getRepository(BlockAssignment).insert({ blockId: block.id, userId: id, doneAt: null });
  }
  return block;
}
