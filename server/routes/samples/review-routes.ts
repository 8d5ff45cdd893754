import { z } from 'zod';
import { idSchema } from '../../../shared/contracts/common.ts';
import {
  addRemarkSchema,
  resolveRemarkSchema,
  reviewOutcomeSchema,
  reviewSamplesSchema,
  sampleThreadSchema,
  submitSamplesSchema,
} from '../../../shared/contracts/sample-review.ts';
import type { App } from '../../app-context.ts';
import type { SampleRemark } from '../../entities/sample-remark.ts';
import type { Sample } from '../../entities/sample.ts';
import { can } from '../../policies/policy-table.ts';
import type { Viewer } from '../../policies/viewer.ts';
import { presentRemark } from '../../presenters/present-remark.ts';
import { presentSample } from '../../presenters/present-sample.ts';
import { requireShown } from '../../services/block-independence.ts';
import { addRemark, findRemark, listRemarks, resolveRemark } from '../../services/sample-remarks.ts';
import { type MovedSamples, reviewSamples, submitSamples } from '../../services/sample-review.ts';
import { findProjectTarget, projectParams } from '../find-project.ts';
import { route } from '../route.ts';
import { findSampleTarget, sampleParams } from './find-sample.ts';

async function findRemarkTarget(
  app: App,
  params: { remarkId: string },
): Promise<{ projectId: string; madeById: string | null; remark: SampleRemark } | null> {
  const remark = await findRemark(app, params.remarkId);
  return remark && { projectId: remark.sample.projectId, madeById: remark.sample.createdById, remark };
}

const showOutcome = ({ samples, refused }: MovedSamples, viewer: Viewer) => ({
  samples: samples.map((sample) => presentSample(sample, viewer)),
  refused,
});

async function showThread(app: App, sample: Sample, viewer: Viewer) {
  return {
    remarks: (await listRemarks(app, sample.id)).map(presentRemark),
    abilities: { resolve: can('sample.edit', viewer.roles, sample.createdById === viewer.userId) },
  };
}

export const sampleReviewRoutes = [
  route({
    id: 'samples.submit',
    method: 'post',
    path: '/projects/:projectId/samples/submit',
    summary: 'Submit samples to the lead, or take them back; those changed since they were seen are named, not moved',
    access: { kind: 'project', action: 'sample.draw', find: findProjectTarget },
    params: projectParams,
    body: submitSamplesSchema,
    answer: reviewOutcomeSchema,
    async handle({ app, viewer, params, body }) {
      return showOutcome(await submitSamples(app, params.projectId, viewer, body), viewer);
    },
  }),
  route({
    id: 'samples.review',
    method: 'post',
    path: '/projects/:projectId/samples/review',
    summary: 'Accept samples, return them with a comment, or make either undone',
    access: { kind: 'project', action: 'sample.review', find: findProjectTarget },
    params: projectParams,
    body: reviewSamplesSchema,
    answer: reviewOutcomeSchema,
    async handle({ app, viewer, params, body }) {
      return showOutcome(await reviewSamples(app, params.projectId, viewer, body), viewer);
    },
  }),
  route({
    id: 'samples.thread',
    method: 'get',
    path: '/samples/:sampleId/remarks',
    summary: 'The thread of a sample: comments and the steps of its review, oldest first',
    access: { kind: 'project', action: 'sample.read', find: findSampleTarget },
    params: sampleParams,
    answer: sampleThreadSchema,
    async handle({ app, viewer, target: { sample } }) {
      await requireShown(app, sample, viewer.userId);
      return showThread(app, sample, viewer);
    },
  }),
  route({
    id: 'samples.remark',
    method: 'post',
    path: '/samples/:sampleId/remarks',
    summary: 'Say something about a sample',
    access: { kind: 'project', action: 'sample.remark', find: findSampleTarget },
    params: sampleParams,
    body: addRemarkSchema,
    answer: sampleThreadSchema,
    status: 201,
    async handle({ app, viewer, body, target: { sample } }) {
      await requireShown(app, sample, viewer.userId);
      await addRemark(app, sample, viewer.userId, body.text);
      return showThread(app, sample, viewer);
    },
  }),
  route({
    id: 'remarks.resolve',
    method: 'patch',
    path: '/remarks/:remarkId',
    summary: 'Mark a comment as dealt with, or as open again',
    access: { kind: 'project', action: 'sample.edit', find: findRemarkTarget },
    params: z.object({ remarkId: idSchema }),
    body: resolveRemarkSchema,
    answer: sampleThreadSchema,
    async handle({ app, viewer, body, target: { remark } }) {
      await requireShown(app, remark.sample, viewer.userId);
      await resolveRemark(app, remark, viewer.userId, body.resolved);
      return showThread(app, remark.sample, viewer);
    },
  }),
];
