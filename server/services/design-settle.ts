import type { App } from '../app-context.ts';
import { ReferenceAnswer } from '../entities/reference-answer.ts';
import { ReferencePoint } from '../entities/reference-point.ts';

/** An answer that names a class; skipped points have none. */
export type GivenAnswer = ReferenceAnswer & { classId: string };

export interface AnsweredPoint {
  point: ReferencePoint;
  /** Oldest first. */
  answers: GivenAnswer[];
  settled: SettledClass | null;
}

export interface SettledClass {
  classId: string;
  /** Second choices of those whose first choice stands. */
  alternateClassIds: string[];
  by: 'agreement' | 'decision';
}

function isGiven(answer: ReferenceAnswer): answer is GivenAnswer {
  return answer.classId !== null;
}

/** The class that stands for a point: the decision, or what all its answers say; null while there is neither. */
export function settlePoint(point: ReferencePoint, answers: readonly GivenAnswer[]): SettledClass | null {
  if (point.decisionClassId !== null) {
    const alternate = point.decisionAlternateClassId;
    return { classId: point.decisionClassId, alternateClassIds: alternate ? [alternate] : [], by: 'decision' };
  }
  const [first] = answers;
  if (!first || answers.some(({ classId }) => classId !== first.classId)) return null;
  const alternates = answers.flatMap(({ alternateClassId }) => (alternateClassId === null ? [] : [alternateClassId]));
  return { classId: first.classId, alternateClassIds: [...new Set(alternates)], by: 'agreement' };
}

/** All points of a design by number, with what was said of them. */
export async function loadAnsweredPoints(app: App, designId: string): Promise<AnsweredPoint[]> {
  const points = await app.db
    .getRepository(ReferencePoint)
    .find({ where: { designId }, relations: { decidedBy: true }, order: { number: 'ASC' } });
  const answers = await app.db
    .getRepository(ReferenceAnswer)
    .createQueryBuilder('answer')
    .innerJoin('answer.point', 'point', 'point.designId = :designId', { designId })
    .leftJoinAndSelect('answer.user', 'user')
    .orderBy('answer.answeredAt', 'ASC')
    .addOrderBy('answer.id', 'ASC')
    .getMany();
  const byPoint = new Map<string, GivenAnswer[]>();
  for (const answer of answers.filter(isGiven)) {
    const known = byPoint.get(answer.pointId);
    if (known) known.push(answer);
    else byPoint.set(answer.pointId, [answer]);
  }
  return points.map((point) => {
    const given = byPoint.get(point.id) ?? [];
    return { point, answers: given, settled: settlePoint(point, given) };
  });
}
