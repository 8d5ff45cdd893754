import { emptySchema } from '../../../shared/contracts/common.ts';
import {
  augmentDesignSchema,
  closeDesignSchema,
  createDesignSchema,
  designListSchema,
  designPlanSchema,
  designSchema,
  planDesignSchema,
} from '../../../shared/contracts/reference.ts';
import { can } from '../../policies/policy-table.ts';
import { areMapsWithheld } from '../../services/design-blindness.ts';
import { planDesign } from '../../services/design-plan.ts';
import { closeDesign, endInterpretation, openDesign } from '../../services/design-transitions.ts';
import { openStrata } from '../../services/design-strata.ts';
import { augmentDesign, createDesign, deleteDesign, listDesigns } from '../../services/designs.ts';
import { findPlannedRun } from '../../services/planned-run.ts';
import { findProjectTarget, projectParams } from '../find-project.ts';
import { hideWhileInterpreting } from '../hide-while-interpreting.ts';
import { route } from '../route.ts';
import { designParams, findDesignTarget, showDesign } from './find-design.ts';
import { interpretRoutes } from './interpret-routes.ts';
import { resultRoutes } from './result-routes.ts';

const plan = { kind: 'project', action: 'design.plan', find: findDesignTarget } as const;

/** What plans from the mapped areas tells them, so interpreters of an open design are refused. */
const planRoutes = [
  route({
    id: 'designs.plan',
    method: 'post',
    path: '/projects/:projectId/designs/plan',
    summary: 'How many reference points a target takes, how they are shared out, and what to expect; nothing is stored',
    access: { kind: 'project', action: 'design.plan', find: findProjectTarget },
    params: projectParams,
    body: planDesignSchema,
    answer: designPlanSchema,
    async handle({ app, target, body }) {
      const run = await findPlannedRun(app, target.projectId, body.runId);
      return planDesign((await openStrata(app, run, body)).strata, body).plan;
    },
  }),
  route({
    id: 'designs.create',
    method: 'post',
    path: '/projects/:projectId/designs',
    summary: 'Draw a stratified random sample of reference points as a draft',
    access: { kind: 'project', action: 'design.plan', find: findProjectTarget },
    params: projectParams,
    body: createDesignSchema,
    answer: designSchema,
    status: 201,
    async handle({ app, viewer, target, body }) {
      return showDesign(app, viewer, await createDesign(app, target.projectId, viewer.userId, body));
    },
  }),
  route({
    id: 'designs.augment',
    method: 'post',
    path: '/designs/:designId/augment',
    summary: 'Make a draft larger, or begin a larger draft with the points and answers of a closed design',
    access: plan,
    params: designParams,
    body: augmentDesignSchema,
    answer: designSchema,
    async handle({ app, viewer, target, body }) {
      return showDesign(app, viewer, await augmentDesign(app, target.design, viewer.userId, body));
    },
  }),
].map(hideWhileInterpreting);

export const designRoutes = [
  ...planRoutes,
  route({
    id: 'designs.list',
    method: 'get',
    path: '/projects/:projectId/designs',
    summary: 'Reference designs of a project, newest first',
    access: { kind: 'project', action: 'design.read', find: findProjectTarget },
    params: projectParams,
    answer: designListSchema,
    async handle({ app, viewer, params }) {
      const designs = await listDesigns(app, params.projectId);
      return {
        designs: await Promise.all(designs.map((design) => showDesign(app, viewer, design))),
        abilities: { plan: can('design.plan', viewer.roles) },
        mapsWithheld: await areMapsWithheld(app, params.projectId, viewer),
      };
    },
  }),
  route({
    id: 'designs.read',
    method: 'get',
    path: '/designs/:designId',
    summary: 'A reference design with its progress',
    access: { kind: 'project', action: 'design.read', find: findDesignTarget },
    params: designParams,
    answer: designSchema,
    handle: ({ app, viewer, target }) => showDesign(app, viewer, target.design),
  }),
  route({
    id: 'designs.delete',
    method: 'delete',
    path: '/designs/:designId',
    summary: 'Delete a draft',
    access: plan,
    params: designParams,
    answer: 'none',
    async handle({ app, viewer, target }) {
      await deleteDesign(app, target.design, viewer.userId);
      return undefined;
    },
  }),
  route({
    id: 'designs.open',
    method: 'post',
    path: '/designs/:designId/open',
    summary: 'Freeze a draft with a digest and open it to interpretation',
    access: plan,
    params: designParams,
    body: emptySchema,
    answer: designSchema,
    async handle({ app, viewer, target }) {
      return showDesign(app, viewer, await openDesign(app, target.design, viewer.userId));
    },
  }),
  route({
    id: 'designs.adjudicate',
    method: 'post',
    path: '/designs/:designId/adjudicate',
    summary: 'End interpretation, so that answers may be compared and disagreements decided',
    access: plan,
    params: designParams,
    body: emptySchema,
    answer: designSchema,
    async handle({ app, viewer, target }) {
      return showDesign(app, viewer, await endInterpretation(app, target.design, viewer.userId));
    },
  }),
  route({
    id: 'designs.close',
    method: 'post',
    path: '/designs/:designId/close',
    summary: 'Close an adjudicated design; its estimates can then be read',
    access: plan,
    params: designParams,
    body: closeDesignSchema,
    answer: designSchema,
    async handle({ app, viewer, target, body }) {
      return showDesign(app, viewer, await closeDesign(app, target.design, viewer.userId, body));
    },
  }),
  ...interpretRoutes,
  ...resultRoutes,
];
