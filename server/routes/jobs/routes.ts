import { z } from 'zod';
import { idSchema } from '../../../shared/contracts/common.ts';
import { jobSchema } from '../../../shared/contracts/job.ts';
import { jobLogSchema, orderQueueSchema, queueSchema, setPrioritySchema } from '../../../shared/contracts/queue.ts';
import type { App } from '../../app-context.ts';
import type { Job } from '../../entities/job.ts';
import { presentJob } from '../../presenters/present-job.ts';
import { can } from '../../policies/policy-table.ts';
import {
  cancelJob,
  findJob,
  hideOthers,
  orderQueue,
  printJobLog,
  readJobLog,
  readQueue,
  setPriority,
} from '../../services/queue.ts';
import { findProjectTarget, projectParams } from '../find-project.ts';
import { route } from '../route.ts';

const jobParams = z.object({ jobId: idSchema });

async function findJobTarget(app: App, params: { jobId: string }): Promise<{ projectId: string; job: Job } | null> {
  const job = await findJob(app, params.jobId);
  return job ? { projectId: job.projectId, job } : null;
}

export const jobRoutes = [
  route({
    id: 'jobs.queue',
    method: 'get',
    path: '/projects/:projectId/queue',
    summary: 'What works and what waits, in the order of its turns; of other projects only that something is there',
    access: { kind: 'project', action: 'run.read', find: findProjectTarget },
    params: projectParams,
    answer: queueSchema,
    async handle({ app, viewer, params }) {
      return {
        entries: hideOthers(await readQueue(app), params.projectId),
        projectLimit: app.config.jobs.perProject,
        abilities: { prioritise: can('run.start', viewer.roles), cancel: can('run.stop', viewer.roles) },
      };
    },
  }),
  route({
    id: 'jobs.prioritise',
    method: 'put',
    path: '/jobs/:jobId/priority',
    summary: 'Which of the project’s own waiting jobs goes first',
    access: { kind: 'project', action: 'run.start', find: findJobTarget },
    params: jobParams,
    body: setPrioritySchema,
    answer: jobSchema,
    handle: async ({ app, viewer, target, body }) =>
      presentJob(await setPriority(app, target.job, body.priority, viewer.userId)),
  }),
  route({
    id: 'jobs.log',
    method: 'get',
    path: '/jobs/:jobId/log',
    summary: 'What a job did, in words',
    access: { kind: 'project', action: 'run.read', find: findJobTarget },
    params: jobParams,
    answer: jobLogSchema,
    async handle({ app, params }) {
      const entries = await readJobLog(app, params.jobId);
      return { entries: entries.map(({ at, level, text }) => ({ at: at.toISOString(), level, text })) };
    },
  }),
  route({
    id: 'jobs.log-text',
    method: 'get',
    path: '/jobs/:jobId/log.txt',
    summary: 'The log as a text file',
    access: { kind: 'project', action: 'run.read', find: findJobTarget },
    params: jobParams,
    answer: { mediaType: 'text/plain' },
    async handle({ app, params, res }) {
      res.attachment('log.txt');
      res.type('text/plain; charset=utf-8');
      res.setHeader('Cache-Control', 'private, no-cache');
      res.send(printJobLog(await readJobLog(app, params.jobId)));
      return undefined;
    },
  }),
  route({
    id: 'jobs.site-queue',
    method: 'get',
    path: '/site/queue',
    summary: 'What works and what waits over all projects',
    access: { kind: 'site-admin' },
    answer: queueSchema,
    handle: ({ app }) => answerSiteQueue(app),
  }),
  route({
    id: 'jobs.order-site-queue',
    method: 'put',
    path: '/site/queue/order',
    summary: 'Put waiting jobs before all others, in this order; an empty list gives everyone a fair turn again',
    access: { kind: 'site-admin' },
    body: orderQueueSchema,
    answer: queueSchema,
    async handle({ app, body }) {
      await orderQueue(app, body.jobIds);
      return answerSiteQueue(app);
    },
  }),
  route({
    id: 'jobs.cancel',
    method: 'post',
    path: '/jobs/:jobId/cancel',
    summary: 'Stop a run, a reproduction or a tuning that waits or works',
    access: { kind: 'project', action: 'run.stop', find: findJobTarget },
    params: jobParams,
    answer: jobSchema,
    handle: async ({ app, viewer, target }) => presentJob(await cancelJob(app, target.job, viewer.userId)),
  }),
];

async function answerSiteQueue(app: App) {
  const rows = await readQueue(app);
  return {
    entries: rows.map(({ entry }) => entry),
    projectLimit: app.config.jobs.perProject,
    abilities: { prioritise: true, cancel: false },
  };
}
