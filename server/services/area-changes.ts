import type { z } from 'zod';
import { NODATA_CODE, UNCLASSIFIED_CODE } from '../../shared/constants/class-codes.ts';
import type { areaChangeSchema } from '../../shared/contracts/post-processing.ts';
import type { RunClass } from '../entities/run.ts';

/** Area of each class before and after, in the run's order; then what has no class, where there is any. */
export function listAreaChanges(
  classes: readonly RunClass[],
  before: Readonly<Record<string, number>>,
  after: Readonly<Record<string, number>>,
): z.infer<typeof areaChangeSchema>[] {
  const others = [
    { code: UNCLASSIFIED_CODE, name: 'Unclassified', colour: '#808080' },
    { code: NODATA_CODE, name: 'No data or outside the study area', colour: '#000000' },
  ];
  const row = ({ code, name, colour }: { code: number; name: string; colour: string }) => ({
    ...{ code, name, colour },
    beforeHa: before[code] ?? 0,
    afterHa: after[code] ?? 0,
  });
  return [...classes.map(row), ...others.map(row).filter(({ beforeHa, afterHa }) => beforeHa > 0 || afterHa > 0)];
}
