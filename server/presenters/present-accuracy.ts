import { MAP_CAUTIONS, PURPOSIVE_CAUTION } from '../../shared/constants/cautions.ts';
import type { Accuracy, AccuracyUnit } from '../../shared/contracts/accuracy.ts';
import type { Run } from '../entities/run.ts';
import type { readAccuracy } from '../services/accuracy.ts';

export function presentAccuracy(
  run: Run,
  unit: AccuracyUnit,
  figures: Awaited<ReturnType<typeof readAccuracy>>,
): Accuracy {
  return { runId: run.id, unit, classes: run.classes, ...figures, cautions: [PURPOSIVE_CAUTION, ...MAP_CAUTIONS] };
}
