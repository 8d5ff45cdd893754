import { IsNull } from 'typeorm';
import type { App } from '../app-context.ts';
import { Block } from '../entities/block.ts';
import { Project } from '../entities/project.ts';
import { Sample } from '../entities/sample.ts';
import { User } from '../entities/user.ts';
import type { Viewer } from '../policies/viewer.ts';
import { assignBlocks } from '../services/block-assignments.ts';
import { cutBlocks } from '../services/block-grid.ts';
import { moveBlock } from '../services/block-moves.ts';
import { addRemark } from '../services/sample-remarks.ts';
import { reviewSamples, submitSamples } from '../services/sample-review.ts';
import type { DemoActors } from './demo-project.ts';

const BLOCK_METERS = 6_000;
const TARGET = 2;
const RETURNS = [
  'The outline takes in the hedge and its shadow. Keep one pixel away from the edge, please.',
  'Is this still the class of the spring scene? It looks cut in late summer. Say so in the note, or move it.',
  'Two covers in one outline: see the spread in shortwave infrared. Please split it.',
];
const ANSWER = 'Cut in August, by the track. I would leave it in its class and lower the confidence. Agreed?';

/** Cuts the island into blocks, gives them out, and takes the labellers' samples through review: most of them accepted. */
export async function shareDemoWork(app: App, projectId: string, people: DemoActors): Promise<void> {
  const project = await app.db.getRepository(Project).findOneByOrFail({ id: projectId });
  const lead = await viewerOf(app, people.lead, 'lead');
  const labellers = [
    await viewerOf(app, people.labellerA, 'labeller'),
    await viewerOf(app, people.labellerB, 'labeller'),
  ];
  await reviewDemoSamples(app, projectId, lead, labellers);
  await cutBlocks(app, project, people.lead, { sizeMeters: BLOCK_METERS, targetPerClass: TARGET });
  const blocks = await app.db.getRepository(Block).find({ where: { projectId }, order: { number: 'ASC' } });
  const last = blocks.at(-1);
  for (const [place, { userId }] of labellers.entries()) {
    const blockIds = blocks.filter((block, i) => i % 2 === place && block !== last).map(({ id }) => id);
    await assignBlocks(app, project, lead, { blockIds, userIds: [userId] });
  }
  // The last one is labelled by both, independently of each other.
  if (last)
    await assignBlocks(app, project, lead, { blockIds: [last.id], userIds: labellers.map(({ userId }) => userId) });
  for (const [i, block] of blocks.slice(0, Math.floor(blocks.length / 2)).entries()) {
    const labeller = labellers[i % 2];
    if (labeller) await moveBlock(app, block, labeller, 'done');
    if (i % 3 !== 2) await moveBlock(app, block, lead, 'checked');
  }
}

/** Of every 24 samples in the order of their numbers one is returned, two are drafts, three wait, and the rest are accepted. */
async function reviewDemoSamples(
  app: App,
  projectId: string,
  lead: Viewer,
  labellers: readonly Viewer[],
): Promise<void> {
  const samples = await app.db
    .getRepository(Sample)
    .find({ where: { projectId, deletedAt: IsNull() }, order: { number: 'ASC' } });
  const place = ({ number }: Sample) => number % 24;
  for (const labeller of labellers) {
    const ready = samples.filter((one) => one.createdById === labeller.userId && place(one) !== 5 && place(one) !== 17);
    if (ready.length > 0) await submitSamples(app, projectId, labeller, { act: 'submit', samples: ready.map(seen) });
  }
  const returned = samples.filter((one) => place(one) === 11);
  const accepted = samples.filter((one) => ![2, 5, 9, 11, 17, 20].includes(place(one)));
  if (accepted.length > 0)
    await reviewSamples(app, projectId, lead, { act: 'accept', samples: accepted.map(seen), comment: '' });
  for (const [i, sample] of returned.entries()) {
    const comment = RETURNS[i % RETURNS.length] ?? '';
    await reviewSamples(app, projectId, lead, { act: 'return', samples: [seen(sample)], comment });
    if (i === 1 && sample.createdById) await addRemark(app, sample, sample.createdById, ANSWER);
  }
}

const seen = ({ id, version }: Sample) => ({ id, version });

async function viewerOf(app: App, userId: string, role: 'lead' | 'labeller'): Promise<Viewer> {
  const { name, email } = await app.db.getRepository(User).findOneByOrFail({ id: userId });
  return { userId, name, email, siteAdmin: false, roles: [role] };
}
