import { randomUUID } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import type { PutAnswer } from '../../shared/contracts/reference.ts';
import { createRng, hashText } from '../analysis/sampling/rng.ts';
import type { App } from '../app-context.ts';
import { ReferenceAnswer } from '../entities/reference-answer.ts';
import { ReferenceDesign } from '../entities/reference-design.ts';
import { ReferencePoint } from '../entities/reference-point.ts';
import { Conflict, InvalidInput, NotFound } from '../errors.ts';

/** What an interpreter may know of a point: its place, and their own answer. */
export interface OwnPoint {
  point: ReferencePoint;
  /** Their own answer or skip. */
  own: ReferenceAnswer | null;
  /** Why the point takes no answer of theirs; null when it does. */
  refusal: string | null;
  /** Place in their own random order, from 1. */
  place: number;
  previousNumber: number | null;
  nextNumber: number | null;
}

export interface OwnProgress {
  answered: number;
  skipped: number;
  left: number;
  total: number;
  secondsPerPoint: number | null;
}

interface Worklist {
  /** In the interpreter's own order. */
  points: ReferencePoint[];
  own: Map<string, ReferenceAnswer>;
  /** Answers of all by point. */
  counts: Map<string, number>;
}

/** The project and point behind /points/:pointId. */
export async function findReferencePoint(
  app: App,
  id: string,
): Promise<{ point: ReferencePoint; design: ReferenceDesign } | null> {
  const point = await app.db.getRepository(ReferencePoint).findOneBy({ id });
  if (!point) return null;
  const design = await app.db
    .getRepository(ReferenceDesign)
    .findOne({ where: { id: point.designId }, relations: { run: true } });
  return design && { point, design };
}

async function countAnswers(app: App, designId: string): Promise<Map<string, number>> {
  const rows = await app.db
    .getRepository(ReferenceAnswer)
    .createQueryBuilder('answer')
    .innerJoin('answer.point', 'point', 'point.designId = :designId', { designId })
    .select('answer.pointId', 'pointId')
    .addSelect('COUNT(*)', 'count')
    .where('answer.classId IS NOT NULL')
    .groupBy('answer.pointId')
    .getRawMany<{ pointId: string; count: string }>();
  return new Map(rows.map(({ pointId, count }) => [pointId, Number(count)]));
}

async function loadWorklist(app: App, design: ReferenceDesign, userId: string): Promise<Worklist> {
  const points = await app.db.getRepository(ReferencePoint).find({
    where: { designId: design.id },
    // Nothing of the map is even read here.
    select: { id: true, number: true, pixelRow: true, pixelColumn: true, lon: true, lat: true, isCarried: true },
    order: { number: 'ASC' },
  });
  // Each interpreter has an order of their own, the same every time.
  createRng(hashText(design.id), hashText(userId)).shuffle(points);
  const answers = await app.db
    .getRepository(ReferenceAnswer)
    .createQueryBuilder('answer')
    .innerJoin('answer.point', 'point', 'point.designId = :designId', { designId: design.id })
    .where('answer.userId = :userId', { userId })
    .getMany();
  return {
    points,
    own: new Map(answers.map((answer) => [answer.pointId, answer])),
    counts: await countAnswers(app, design.id),
  };
}

const hasAnswer = (own: ReferenceAnswer | null | undefined) => own?.classId !== null && own?.classId !== undefined;

function refuse(
  design: Pick<ReferenceDesign, 'state' | 'answersPerPoint'>,
  point: ReferencePoint,
  own: ReferenceAnswer | null | undefined,
  nAnswers: number,
): string | null {
  if (design.state !== 'open') return 'The design is not being interpreted.';
  if (point.isCarried) return 'The class of this point stands from an earlier design.';
  if (!hasAnswer(own) && nAnswers >= design.answersPerPoint) return 'The point has all its answers.';
  return null;
}

function measureProgress(design: ReferenceDesign, { points, own, counts }: Worklist): OwnProgress {
  let [answered, skipped, left] = [0, 0, 0];
  for (const point of points) {
    const mine = own.get(point.id);
    if (hasAnswer(mine)) answered++;
    else {
      if (mine) skipped++;
      if (refuse({ ...design, state: 'open' }, point, mine, counts.get(point.id) ?? 0) === null) left++;
    }
  }
  const seconds = [...own.values()].flatMap(({ seconds: value }) => (value === null ? [] : [value]));
  seconds.sort((a, b) => a - b);
  const middle = seconds.length / 2;
  const median = ((seconds[Math.ceil(middle) - 1] ?? 0) + (seconds[Math.floor(middle)] ?? 0)) / 2;
  return { answered, skipped, left, total: points.length, secondsPerPoint: seconds.length > 0 ? median : null };
}

function describePoint(design: ReferenceDesign, worklist: Worklist, index: number): OwnPoint {
  const { points, own, counts } = worklist;
  const point = points[index];
  if (!point) throw new NotFound();
  const mine = own.get(point.id) ?? null;
  return {
    ...{ point, own: mine, refusal: refuse(design, point, mine, counts.get(point.id) ?? 0), place: index + 1 },
    previousNumber: points[index - 1]?.number ?? null,
    nextNumber: points[index + 1]?.number ?? null,
  };
}

/** The next point that waits for the viewer: those never seen first, then those skipped, longest ago first. */
export async function readNextPoint(app: App, design: ReferenceDesign, userId: string) {
  requireOpen(design);
  const worklist = await loadWorklist(app, design, userId);
  const { points, own, counts } = worklist;
  const waiting = points
    .map((point, index) => ({ index, point, mine: own.get(point.id) }))
    .filter(({ point, mine }) => !hasAnswer(mine) && refuse(design, point, mine, counts.get(point.id) ?? 0) === null)
    .sort((a, b) => (a.mine?.answeredAt.getTime() ?? 0) - (b.mine?.answeredAt.getTime() ?? 0) || a.index - b.index);
  const [next] = waiting;
  return {
    next: next ? describePoint(design, worklist, next.index) : null,
    progress: measureProgress(design, worklist),
  };
}

/** A point by its number, as the viewer may see it. @throws NotFound, or Conflict "not-open" */
export async function readOwnPoint(app: App, design: ReferenceDesign, userId: string, number: number) {
  requireOpen(design);
  const worklist = await loadWorklist(app, design, userId);
  const index = worklist.points.findIndex((point) => point.number === number);
  return { own: describePoint(design, worklist, index), progress: measureProgress(design, worklist) };
}

export function requireOpen({ state }: Pick<ReferenceDesign, 'state'>): void {
  if (state === 'open') return;
  throw new Conflict('The design is not being interpreted.', { found: `it is ${state}`, wanted: 'open' }, 'not-open');
}

/** @throws InvalidInput naming the field whose class the design does not know */
export function requireClasses(
  design: Pick<ReferenceDesign, 'classes'>,
  named: { classId: string; alternateClassId?: string | null | undefined },
): void {
  for (const field of ['classId', 'alternateClassId'] as const) {
    const classId = named[field];
    if (!classId || design.classes.some(({ id }) => id === classId)) continue;
    throw new InvalidInput('The answer names a class the design does not know.', {
      errors: [{ path: field, message: 'This class is not one of the design’s.' }],
    });
  }
}

/** What an answer holds besides the class. */
export interface GivenDetail {
  classId: string | null;
  alternateClassId: string | null;
  confidence: ReferenceAnswer['confidence'];
  note: string;
  source: ReferenceAnswer['source'];
  seconds: number | null;
}

/**
 * Writes an answer or a skip, replacing the person's own; `refused` says why it was not taken. The point is locked, so that
 * it never gets more answers than it wants.
 */
export async function writeAnswer(
  manager: EntityManager,
  designId: string,
  pointId: string,
  userId: string,
  given: GivenDetail,
): Promise<{ outcome: 'taken' | 'replaced' } | { refused: string }> {
  const design = await manager.findOne(ReferenceDesign, {
    where: { id: designId },
    lock: { mode: 'pessimistic_read' },
  });
  const point = await manager.findOne(ReferencePoint, { where: { id: pointId }, lock: { mode: 'pessimistic_write' } });
  if (!design || !point) throw new NotFound();
  const answers = await manager.findBy(ReferenceAnswer, { pointId });
  const own = answers.find((answer) => answer.userId === userId);
  const refusal = refuse(design, point, own, answers.filter(hasAnswer).length);
  if (refusal !== null) return { refused: refusal };
  if (given.classId === null && hasAnswer(own)) return { refused: 'You have answered this point already.' };
  const row = { ...given, seconds: given.seconds ?? own?.seconds ?? null, answeredAt: new Date() };
  if (own) await manager.update(ReferenceAnswer, { id: own.id }, row);
  else await manager.insert(ReferenceAnswer, { id: randomUUID(), pointId, userId, ...row });
  return { outcome: hasAnswer(own) ? 'replaced' : 'taken' };
}

async function write(app: App, design: ReferenceDesign, pointId: string, userId: string, given: GivenDetail) {
  requireOpen(design);
  const result = await app.db.transaction((manager) => writeAnswer(manager, design.id, pointId, userId, given));
  if ('refused' in result) throw new Conflict(result.refused, {}, 'answer-refused');
  await app.events.publish(design.projectId, { type: 'changed', what: 'designs', id: design.id, by: userId });
}

/** Takes the viewer's answer, or replaces it. @throws Conflict "not-open", "answer-refused" */
export async function putAnswer(
  app: App,
  design: ReferenceDesign,
  point: ReferencePoint,
  userId: string,
  { classId, alternateClassId = null, confidence = 'medium', note = '', seconds }: PutAnswer,
): Promise<void> {
  requireClasses(design, { classId, alternateClassId });
  const given = { classId, alternateClassId, confidence, note, source: 'image' as const, seconds: seconds ?? null };
  await write(app, design, point.id, userId, given);
}

/** Puts a point off; it comes again at the end. @throws Conflict "not-open", "answer-refused" */
export async function skipPoint(app: App, design: ReferenceDesign, point: ReferencePoint, userId: string) {
  const given = {
    classId: null,
    alternateClassId: null,
    confidence: 'low',
    note: '',
    source: 'image',
    seconds: null,
  } as const;
  await write(app, design, point.id, userId, given);
}
