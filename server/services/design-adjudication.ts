import type { PutDecision } from '../../shared/contracts/reference.ts';
import type { App } from '../app-context.ts';
import { ReferenceDesign } from '../entities/reference-design.ts';
import { ReferencePoint } from '../entities/reference-point.ts';
import { Conflict, NotFound } from '../errors.ts';
import { requireClasses } from './design-answers.ts';
import { loadAnsweredPoints, settlePoint, type AnsweredPoint } from './design-settle.ts';

/** @throws Conflict "still-interpreting" before interpretation has ended */
export function requireInterpreted({ state }: Pick<ReferenceDesign, 'state'>): void {
  if (state === 'adjudicating' || state === 'closed') return;
  throw new Conflict(
    'Answers are compared once interpretation has ended, so that nobody answers knowing what others said.',
    { found: `the design is ${state}`, advice: 'End interpretation first.' },
    'still-interpreting',
  );
}

const needsDecision = ({ point, answers }: AnsweredPoint) =>
  !point.isCarried && settlePoint({ ...point, decisionClassId: null } as ReferencePoint, answers) === null;

/** Points whose answers differ, and points nobody answered, with their decisions. @throws Conflict "still-interpreting" */
export async function listDisagreements(app: App, design: ReferenceDesign): Promise<AnsweredPoint[]> {
  requireInterpreted(design);
  return (await loadAnsweredPoints(app, design.id)).filter(needsDecision);
}

/**
 * Decides a disputed or unanswered point.
 * @throws Conflict "still-interpreting", "design-closed", or "not-disputed" where the answers agree
 */
export async function decidePoint(
  app: App,
  design: ReferenceDesign,
  pointId: string,
  byId: string,
  { classId, alternateClassId = null, note = '' }: PutDecision,
): Promise<AnsweredPoint> {
  requireClasses(design, { classId, alternateClassId });
  await app.db.transaction(async (manager) => {
    const current = await manager.findOne(ReferenceDesign, {
      where: { id: design.id },
      lock: { mode: 'pessimistic_write' },
    });
    if (!current) throw new NotFound();
    requireInterpreted(current);
    if (current.state === 'closed') throw new Conflict('The design is closed.', {}, 'design-closed');
    const disputed = (await loadAnsweredPoints(app, design.id)).filter(needsDecision);
    if (!disputed.some(({ point }) => point.id === pointId)) {
      throw new Conflict('The answers of this point agree; there is nothing to decide.', {}, 'not-disputed');
    }
    const decision = { decisionClassId: classId, decisionAlternateClassId: alternateClassId, decisionNote: note };
    await manager.update(ReferencePoint, { id: pointId }, { ...decision, decidedById: byId, decidedAt: new Date() });
  });
  await app.events.publish(design.projectId, { type: 'changed', what: 'designs', id: design.id, by: byId });
  const row = (await loadAnsweredPoints(app, design.id)).find(({ point }) => point.id === pointId);
  if (!row) throw new NotFound();
  return row;
}
