import type { App } from '../app-context.ts';
import { ReferenceAnswer } from '../entities/reference-answer.ts';
import type { ReferenceDesign } from '../entities/reference-design.ts';
import { ReferencePoint } from '../entities/reference-point.ts';

export interface DesignProgress {
  points: number;
  complete: number;
  settled: number;
  disputed: number;
  mine: { answered: number; skipped: number; left: number };
}

interface CountedPoint {
  isCarried: number;
  isDecided: number;
  nAnswers: string;
  nClasses: string;
  isMine: string | null;
  isSkipped: string | null;
}

/** How far a design is. While it is open, whether answers agree is told to nobody. */
export async function measureDesignProgress(
  app: App,
  design: ReferenceDesign,
  userId: string,
): Promise<DesignProgress> {
  const rows = await app.db
    .getRepository(ReferencePoint)
    .createQueryBuilder('point')
    .leftJoin(ReferenceAnswer, 'answer', 'answer.pointId = point.id')
    .select('point.isCarried', 'isCarried')
    .addSelect('point.decisionClassId IS NOT NULL', 'isDecided')
    .addSelect('COUNT(answer.classId)', 'nAnswers')
    .addSelect('COUNT(DISTINCT answer.classId)', 'nClasses')
    .addSelect('MAX(answer.userId = :userId AND answer.classId IS NOT NULL)', 'isMine')
    .addSelect('MAX(answer.userId = :userId AND answer.classId IS NULL)', 'isSkipped')
    .where('point.designId = :designId')
    .groupBy('point.id')
    .setParameters({ userId, designId: design.id })
    .getRawMany<CountedPoint>();
  const isCompared = design.state === 'adjudicating' || design.state === 'closed';
  const points = rows.map(({ isCarried, isDecided, nAnswers, nClasses, isMine, isSkipped }) => {
    const isComplete = Number(isCarried) === 1 || Number(nAnswers) >= design.answersPerPoint;
    const isSettled = Number(isDecided) === 1 || Number(nClasses) === 1;
    return {
      ...{ isComplete, isSettled, isMine: Number(isMine) === 1, isSkipped: Number(isSkipped) === 1 },
      isDisputed: !isSettled && Number(nAnswers) > 0,
    };
  });
  const count = (is: (point: (typeof points)[number]) => boolean) => points.filter(is).length;
  return {
    points: points.length,
    complete: count((point) => point.isComplete),
    settled: isCompared ? count((point) => point.isSettled) : 0,
    disputed: isCompared ? count((point) => point.isDisputed) : 0,
    mine: {
      answered: count((point) => point.isMine),
      skipped: count((point) => point.isSkipped),
      left: design.state === 'open' ? count((point) => !point.isMine && !point.isComplete) : 0,
    },
  };
}
