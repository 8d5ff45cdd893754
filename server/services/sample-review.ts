import { In, type EntityManager } from 'typeorm';
import type { z } from 'zod';
import type { SampleState } from '../../shared/contracts/sample.ts';
import type {
  RemarkKind,
  ReviewOutcome,
  reviewSamplesSchema,
  SubmitSamples,
} from '../../shared/contracts/sample-review.ts';
import type { App } from '../app-context.ts';
import { SampleRemark } from '../entities/sample-remark.ts';
import { Sample } from '../entities/sample.ts';
import { can } from '../policies/policy-table.ts';
import type { Viewer } from '../policies/viewer.ts';
import { recordActivity } from './activities.ts';
import { findIndependentBlocks } from './block-independence.ts';
import { sendReturnLetters } from './return-letter.ts';
import { countOpenRemarks } from './sample-remarks.ts';

interface Move {
  from: readonly SampleState[];
  to: SampleState;
  kind: RemarkKind;
  /** Begins the line of the diary: "submitted 3 samples". */
  verb: string;
}

/** The steps between whoever drew a sample and the lead. */
const MOVES = {
  submit: { from: ['draft', 'returned'], to: 'submitted', kind: 'submitted', verb: 'submitted' },
  withdraw: { from: ['submitted'], to: 'draft', kind: 'withdrawn', verb: 'took back' },
  accept: { from: ['submitted', 'returned'], to: 'accepted', kind: 'accepted', verb: 'accepted' },
  return: { from: ['submitted', 'accepted'], to: 'returned', kind: 'returned', verb: 'returned' },
  reopen: { from: ['accepted', 'returned'], to: 'submitted', kind: 'reopened', verb: 'took up again' },
} as const satisfies Record<string, Move>;

export interface MovedSamples {
  samples: Sample[];
  refused: ReviewOutcome['refused'];
}

/** Submits the viewer's samples, or takes them back. */
export function submitSamples(
  app: App,
  projectId: string,
  viewer: Viewer,
  input: SubmitSamples,
): Promise<MovedSamples> {
  return moveSamples(app, projectId, viewer, input.act, input.samples, '');
}

/** Accepts or returns samples; whoever drew the returned ones is told by one letter. */
export async function reviewSamples(
  app: App,
  projectId: string,
  viewer: Viewer,
  input: z.output<typeof reviewSamplesSchema>,
): Promise<MovedSamples> {
  const outcome = await moveSamples(app, projectId, viewer, input.act, input.samples, input.comment);
  if (input.act === 'return') await sendReturnLetters(app, projectId, viewer, outcome.samples, input.comment);
  return outcome;
}

/**
 * Moves those samples that still are as the viewer saw them, all in one transaction; the others are named with the reason.
 * Rows are locked in the order of their ids, so that two people reviewing at once wait for each other.
 */
async function moveSamples(
  app: App,
  projectId: string,
  viewer: Viewer,
  act: keyof typeof MOVES,
  seen: readonly { id: string; version: number }[],
  comment: string,
): Promise<MovedSamples> {
  const move: Move = MOVES[act];
  const hidden = new Set(await findIndependentBlocks(app, projectId, viewer.userId));
  const { moved, refused } = await app.db.transaction(async (manager) => {
    const rows = await manager.find(Sample, {
      where: { projectId, id: In(seen.map(({ id }) => id)) },
      order: { id: 'ASC' },
      lock: { mode: 'pessimistic_write' },
    });
    const standing = new Map(rows.map((row) => [row.id, row]));
    const moved = new Map<string, Sample>();
    const refused: ReviewOutcome['refused'] = [];
    for (const { id, version } of seen) {
      const sample = standing.get(id);
      const isMine = sample?.createdById === viewer.userId;
      if (!sample || sample.deletedAt || (!isMine && sample.blockId && hidden.has(sample.blockId))) {
        refused.push({ id, number: null, reason: 'gone' });
        continue;
      }
      const refuse = (reason: 'changed' | 'state' | 'not-yours') => refused.push({ id, number: sample.number, reason });
      if (!can('sample.edit', viewer.roles, isMine)) refuse('not-yours');
      else if (sample.version !== version) refuse('changed');
      else if (!move.from.includes(sample.state)) refuse('state');
      else moved.set(id, sample);
    }
    const ids = [...moved.keys()];
    if (ids.length > 0) {
      await manager.update(Sample, { id: In(ids) }, { state: move.to });
      await manager.insert(
        SampleRemark,
        ids.map((sampleId) => remarkOf(sampleId, move.kind, viewer.userId, comment)),
      );
      if (act === 'accept') {
        await manager.query(
          "UPDATE sample_remarks SET resolvedAt = NOW(6), resolvedById = ? WHERE kind = 'returned' AND resolvedAt IS NULL AND sampleId IN (?)",
          [viewer.userId, ids],
        );
      }
      await countOpenRemarks(manager, ids);
      const count = ids.length === 1 ? `sample ${[...moved.values()][0]?.number}` : `${ids.length} samples`;
      await recordActivity(manager, projectId, viewer.userId, `${move.verb} ${count}`, 'samples');
    }
    return { moved: ids, refused };
  });
  if (moved.length > 0) {
    const id = moved.length === 1 ? (moved[0] ?? null) : null;
    await app.events.publish(projectId, { type: 'changed', what: 'samples', id, by: viewer.userId });
  }
  const samples = await app.db
    .getRepository(Sample)
    .find({ where: { id: In(moved) }, relations: { createdBy: true }, order: { number: 'ASC' } });
  return { samples, refused };
}

function remarkOf(sampleId: string, kind: RemarkKind, byId: string, text: string) {
  return { sampleId, kind, byId, text, resolvedAt: null, resolvedById: null };
}

/** What was accepted and is changed afterwards waits for the lead again, and its thread says why. */
export async function resubmitAccepted(manager: EntityManager, sampleId: string, byId: string): Promise<void> {
  const result = await manager.update(Sample, { id: sampleId, state: 'accepted' }, { state: 'submitted' });
  if (result.affected) await manager.insert(SampleRemark, remarkOf(sampleId, 'changed-after-acceptance', byId, ''));
}
