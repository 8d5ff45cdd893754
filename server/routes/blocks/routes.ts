import { z } from 'zod';
import {
  assignBlocksSchema,
  blockAgreementSchema,
  blockListSchema,
  cutBlocksSchema,
  drawBlockSchema,
  moveBlockSchema,
  settleBlockSchema,
  updateBlockSchema,
} from '../../../shared/contracts/block.ts';
import { idSchema } from '../../../shared/contracts/common.ts';
import type { App } from '../../app-context.ts';
import type { Block } from '../../entities/block.ts';
import { Conflict } from '../../errors.ts';
import { can } from '../../policies/policy-table.ts';
import type { Viewer } from '../../policies/viewer.ts';
import { presentBlock } from '../../presenters/present-block.ts';
import { assignBlocks } from '../../services/block-assignments.ts';
import { cutBlocks } from '../../services/block-grid.ts';
import { listBlocks } from '../../services/block-list.ts';
import { moveBlock } from '../../services/block-moves.ts';
import { settleDisagreement } from '../../services/block-settle.ts';
import { deleteBlock, drawBlock, findBlock, updateBlock } from '../../services/blocks.ts';
import { findProjectTarget, projectParams } from '../find-project.ts';
import { route } from '../route.ts';

const blockParams = z.object({ blockId: idSchema });

async function findBlockTarget(
  app: App,
  params: { blockId: string },
): Promise<{ projectId: string; block: Block } | null> {
  const block = await findBlock(app, params.blockId);
  return block && { projectId: block.projectId, block };
}

async function showBlocks(app: App, projectId: string, viewer: Viewer) {
  const { rows, nClasses } = await listBlocks(app, projectId);
  return {
    blocks: rows.map((row) => presentBlock(row, viewer)),
    nClasses,
    abilities: { manage: can('block.manage', viewer.roles) },
  };
}

export const blockRoutes = [
  route({
    id: 'blocks.list',
    method: 'get',
    path: '/projects/:projectId/blocks',
    summary: 'Blocks of a project by number, with their people and how far each is',
    access: { kind: 'project', action: 'block.read', find: findProjectTarget },
    params: projectParams,
    answer: blockListSchema,
    handle: ({ app, viewer, params }) => showBlocks(app, params.projectId, viewer),
  }),
  route({
    id: 'blocks.cut',
    method: 'post',
    path: '/projects/:projectId/blocks/grid',
    summary: 'Cut the study area into square blocks',
    access: { kind: 'project', action: 'block.manage', find: findProjectTarget },
    params: projectParams,
    body: cutBlocksSchema,
    answer: blockListSchema,
    status: 201,
    async handle({ app, viewer, body, target: { project } }) {
      await cutBlocks(app, project, viewer.userId, body);
      return showBlocks(app, project.id, viewer);
    },
  }),
  route({
    id: 'blocks.draw',
    method: 'post',
    path: '/projects/:projectId/blocks',
    summary: 'Add a block with an outline of its own',
    access: { kind: 'project', action: 'block.manage', find: findProjectTarget },
    params: projectParams,
    body: drawBlockSchema,
    answer: blockListSchema,
    status: 201,
    async handle({ app, viewer, body, target: { project } }) {
      await drawBlock(app, project, viewer.userId, body);
      return showBlocks(app, project.id, viewer);
    },
  }),
  route({
    id: 'blocks.assign',
    method: 'post',
    path: '/projects/:projectId/blocks/assign',
    summary: 'Give blocks to nobody, to one labeller, or to two who label independently',
    access: { kind: 'project', action: 'block.manage', find: findProjectTarget },
    params: projectParams,
    body: assignBlocksSchema,
    answer: blockListSchema,
    async handle({ app, viewer, body, target: { project } }) {
      await assignBlocks(app, project, viewer, body);
      return showBlocks(app, project.id, viewer);
    },
  }),
  route({
    id: 'blocks.update',
    method: 'patch',
    path: '/blocks/:blockId',
    summary: 'Rename a block or set its target',
    access: { kind: 'project', action: 'block.manage', find: findBlockTarget },
    params: blockParams,
    body: updateBlockSchema,
    answer: blockListSchema,
    async handle({ app, viewer, body, target: { block } }) {
      await updateBlock(app, block, viewer.userId, body);
      return showBlocks(app, block.projectId, viewer);
    },
  }),
  route({
    id: 'blocks.delete',
    method: 'delete',
    path: '/blocks/:blockId',
    summary: 'Remove a block; its samples stay',
    access: { kind: 'project', action: 'block.manage', find: findBlockTarget },
    params: blockParams,
    answer: 'none',
    async handle({ app, viewer, target: { block } }) {
      await deleteBlock(app, block, viewer.userId);
      return undefined;
    },
  }),
  route({
    id: 'blocks.move',
    method: 'post',
    path: '/blocks/:blockId/state',
    summary: 'Say one is done with a block, take that back, or check it',
    access: { kind: 'project', action: 'block.work', find: findBlockTarget },
    params: blockParams,
    body: moveBlockSchema,
    answer: blockListSchema,
    async handle({ app, viewer, body, target: { block } }) {
      await moveBlock(app, block, viewer, body.to);
      return showBlocks(app, block.projectId, viewer);
    },
  }),
  route({
    id: 'blocks.agreement',
    method: 'get',
    path: '/blocks/:blockId/agreement',
    summary: 'How the two labellers of a block agreed when both were done',
    access: { kind: 'project', action: 'block.read', find: findBlockTarget },
    params: blockParams,
    answer: blockAgreementSchema,
    async handle({ target: { block } }) {
      if (block.agreement) return block.agreement;
      throw new Conflict(
        'There is no agreement to see yet.',
        { wanted: 'a block with two labellers who are both done' },
        'not-done',
      );
    },
  }),
  route({
    id: 'blocks.settle',
    method: 'post',
    path: '/blocks/:blockId/settle',
    summary: 'Keep one of two samples that differ; the other leaves the map',
    access: { kind: 'project', action: 'block.manage', find: findBlockTarget },
    params: blockParams,
    body: settleBlockSchema,
    answer: 'none',
    async handle({ app, viewer, body, target: { block } }) {
      await settleDisagreement(app, block, viewer.userId, body);
      return undefined;
    },
  }),
];
