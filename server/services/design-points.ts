import { randomUUID } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import type { DrawnPoint } from '../analysis/sampling/draw-points.ts';
import { createRng, hashText } from '../analysis/sampling/rng.ts';
import { ReferenceAnswer } from '../entities/reference-answer.ts';
import type { ReferenceDesign } from '../entities/reference-design.ts';
import { ReferencePoint } from '../entities/reference-point.ts';
import type { Run } from '../entities/run.ts';
import { NotFound } from '../errors.ts';
import { centreOf } from './design-places.ts';
import type { AnsweredPoint } from './design-settle.ts';
import { placeScene } from './run-scene.ts';

const INSERT_ROWS = 500;

export function toDrawnPoint({ stratum, drawOrder, pixelRow, pixelColumn }: ReferencePoint): DrawnPoint {
  return { stratum, order: drawOrder, row: pixelRow, column: pixelColumn };
}

const keyOf = (stratum: number, order: number) => `${stratum}/${order}`;

/**
 * Stores drawn points. They are numbered in random order, so that a number tells nothing of the stratum; those of `before`
 * keep their numbers, and the others follow from `lastNumber` on.
 */
export async function insertPoints(
  manager: EntityManager,
  design: ReferenceDesign,
  run: Run,
  { drawn, mapped }: { drawn: readonly DrawnPoint[]; /** What the map shows at each. */ mapped: readonly number[] },
  before: readonly AnsweredPoint[] = [],
  lastNumber = before.length,
): Promise<void> {
  const placed = placeScene(run.scene);
  if (!placed) throw new NotFound();
  const known = new Map(before.map((row) => [keyOf(row.point.stratum, row.point.drawOrder), row]));
  const fresh = drawn.filter(({ stratum, order }) => !known.has(keyOf(stratum, order)));
  const order = fresh.map((_, i) => i);
  createRng(design.seed, hashText(`numbers after ${lastNumber}`)).shuffle(order);
  const numberOf = new Map(order.map((place, i) => [fresh[place], lastNumber + i + 1]));
  const rows = drawn.map((point, i) => {
    const pixel = { pixelRow: point.row, pixelColumn: point.column };
    const [lon, lat] = centreOf(placed, pixel);
    const old = known.get(keyOf(point.stratum, point.order));
    return {
      ...{ id: randomUUID(), designId: design.id, number: old?.point.number ?? numberOf.get(point) ?? 0 },
      ...{ stratum: point.stratum, drawOrder: point.order, ...pixel, lon, lat },
      mappedCode: mapped[i] ?? 0,
      ...carryDecision(old),
    };
  });
  for (let from = 0; from < rows.length; from += INSERT_ROWS) {
    await manager.insert(ReferencePoint, rows.slice(from, from + INSERT_ROWS));
  }
}

/** What stood in the design before stands in the one that carries it on. */
function carryDecision(old: AnsweredPoint | undefined) {
  if (!old?.settled) return { isCarried: false, decisionNote: '' };
  const { decisionClassId, decisionAlternateClassId, decisionNote, decidedById, decidedAt } = old.point;
  return { isCarried: true, decisionClassId, decisionAlternateClassId, decisionNote, decidedById, decidedAt };
}

/** Copies the answers of settled points to the points of the same number in another design. */
export async function copySettledAnswers(
  manager: EntityManager,
  designId: string,
  before: readonly AnsweredPoint[],
): Promise<void> {
  const points = await manager.find(ReferencePoint, { where: { designId, isCarried: true } });
  const idOf = new Map(points.map(({ id, number }) => [number, id]));
  const rows = before.flatMap(({ point, answers }) => {
    const pointId = idOf.get(point.number);
    if (pointId === undefined) return [];
    return answers.map(({ userId, classId, alternateClassId, confidence, note, source, seconds, answeredAt }) => ({
      ...{ id: randomUUID(), pointId, userId, classId, alternateClassId },
      ...{ confidence, note, source, seconds, answeredAt },
    }));
  });
  for (let from = 0; from < rows.length; from += INSERT_ROWS) {
    await manager.insert(ReferenceAnswer, rows.slice(from, from + INSERT_ROWS));
  }
}
