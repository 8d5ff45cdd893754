import type { Block as BlockContract } from '../../shared/contracts/block.ts';
import { can } from '../policies/policy-table.ts';
import type { Viewer } from '../policies/viewer.ts';
import type { BlockRow } from '../services/block-list.ts';

export function presentBlock({ block, state, parts, sampleCount }: BlockRow, viewer: Viewer): BlockContract {
  const { id, projectId, number, name, geometry, areaHa, targetPerClass, version } = block;
  const isLead = can('block.manage', viewer.roles);
  const mine = parts.find(({ assignment }) => assignment.userId === viewer.userId)?.assignment;
  const areAllDone = parts.length > 0 && parts.every(({ assignment }) => assignment.doneAt);
  const mayReopen = Boolean(mine?.doneAt) && !block.checkedAt && !(parts.length > 1 && areAllDone);
  return {
    ...{ id, projectId, number, name, geometry, areaHa, targetPerClass, version, state, sampleCount },
    assignments: parts.map(({ assignment, ...progress }) => ({
      person: { id: assignment.userId, name: assignment.user.name },
      doneAt: assignment.doneAt?.toISOString() ?? null,
      ...progress,
    })),
    isIndependent: parts.length > 1 && !areAllDone,
    abilities: {
      finish: mine !== undefined && !mine.doneAt && can('block.work', viewer.roles),
      reopen: mayReopen || (isLead && parts.some(({ assignment }) => assignment.doneAt)),
      check: isLead && areAllDone,
    },
  };
}
