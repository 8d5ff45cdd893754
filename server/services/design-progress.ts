import type { App } from '../app-context.ts';
import type { ReferenceDesign } from '../entities/reference-design.ts';
import { readProgress } from './design-answers.ts';
import { loadAnsweredPoints } from './design-settle.ts';

export interface DesignProgress {
  points: number;
  complete: number;
  settled: number;
  disputed: number;
  mine: { answered: number; skipped: number; left: number };
}

/** How far a design is. While it is open, whether answers agree is told to nobody. */
export async function measureDesignProgress(
  app: App,
  design: ReferenceDesign,
  userId: string,
): Promise<DesignProgress> {
  const points = await loadAnsweredPoints(app, design.id);
  const isCompared = design.state === 'adjudicating' || design.state === 'closed';
  const { answered, skipped, left } = await readProgress(app, design, userId);
  return {
    points: points.length,
    complete: points.filter(({ point, answers }) => point.isCarried || answers.length >= design.answersPerPoint).length,
    settled: isCompared ? points.filter(({ settled }) => settled !== null).length : 0,
    disputed: isCompared ? points.filter(({ settled, answers }) => settled === null && answers.length > 0).length : 0,
    mine: { answered, skipped, left: design.state === 'open' ? left : 0 },
  };
}
