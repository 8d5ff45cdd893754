import type { App } from '../app-context.ts';
import type { ReferenceDesign } from '../entities/reference-design.ts';
import { requireClosed } from './design-estimates.ts';
import { loadAnsweredPoints, type AnsweredPoint } from './design-settle.ts';

/** The points the map shows as one class and that were found to be of another (or the same). @throws Conflict "not-closed" */
export async function listCellPoints(
  app: App,
  design: ReferenceDesign,
  mappedCode: number,
  referenceClassId: string,
): Promise<AnsweredPoint[]> {
  requireClosed(design);
  const points = await loadAnsweredPoints(app, design.id);
  return points.filter(
    ({ point, settled }) => point.mappedCode === mappedCode && settled?.classId === referenceClassId,
  );
}
