import type { BlockState } from '../../shared/contracts/block.ts';
import type { App } from '../app-context.ts';
import { BlockAssignment } from '../entities/block-assignment.ts';
import { Block } from '../entities/block.ts';
import { LandClass } from '../entities/land-class.ts';

export interface PartProgress {
  assignment: BlockAssignment;
  samples: number;
  submitted: number;
  accepted: number;
  returned: number;
  classesReached: number | null;
}
export interface BlockRow {
  block: Block;
  state: BlockState;
  parts: PartProgress[];
  sampleCount: number;
}
interface CountRow {
  blockId: string;
  createdById: string | null;
  classId: string;
  state: string;
  n: string;
}

/** Blocks by number with how far each person is in each; three queries whatever their number. */
export async function listBlocks(app: App, projectId: string): Promise<{ rows: BlockRow[]; nClasses: number }> {
  const blocks = await app.db.getRepository(Block).find({ where: { projectId }, order: { number: 'ASC' } });
  const assignments = await app.db.getRepository(BlockAssignment).find({
    where: { block: { projectId } },
    relations: { user: true },
    order: { createdAt: 'ASC', userId: 'ASC' },
  });
  const counts = await app.db.query<CountRow[]>(
    `SELECT blockId, createdById, classId, state, COUNT(*) AS n FROM samples
     WHERE projectId = ? AND deletedAt IS NULL AND blockId IS NOT NULL
     GROUP BY blockId, createdById, classId, state`,
    [projectId],
  );
  const nClasses = await app.db.getRepository(LandClass).countBy({ projectId });
  const rows = blocks.map((block) => {
    const inBlock = counts.filter(({ blockId }) => blockId === block.id);
    const parts = assignments
      .filter(({ blockId }) => blockId === block.id)
      .map((assignment) => measurePart(block, assignment, inBlock));
    return { block, parts, sampleCount: sum(inBlock), state: stateOf(block, parts, inBlock.length > 0) };
  });
  return { rows, nClasses };
}

function measurePart(block: Block, assignment: BlockAssignment, counts: readonly CountRow[]): PartProgress {
  const mine = counts.filter(({ createdById }) => createdById === assignment.userId);
  const inState = (state: string) => sum(mine.filter((row) => row.state === state));
  const perClass = new Map<string, number>();
  for (const { classId, n } of mine) perClass.set(classId, (perClass.get(classId) ?? 0) + Number(n));
  const target = block.targetPerClass;
  return {
    assignment,
    samples: sum(mine),
    submitted: inState('submitted'),
    accepted: inState('accepted'),
    returned: inState('returned'),
    classesReached: target === null ? null : [...perClass.values()].filter((n) => n >= target).length,
  };
}

function stateOf({ checkedAt }: Block, parts: readonly PartProgress[], hasSamples: boolean): BlockState {
  if (checkedAt) return 'checked';
  if (parts.length > 0 && parts.every(({ assignment }) => assignment.doneAt)) return 'done';
  return hasSamples || parts.some(({ assignment }) => assignment.doneAt) ? 'in-work' : 'open';
}

function sum(rows: readonly CountRow[]): number {
  return rows.reduce((total, { n }) => total + Number(n), 0);
}
