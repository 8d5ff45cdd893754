import { describe, expect, it } from 'vitest';
import { classifierSchema } from '../../../../shared/contracts/run.ts';
import { printValue, readValues, TUNABLE } from '../../../../client/src/features/tuning/tuning-settings.ts';

describe('values of a tuning', () => {
  it('are read as they are printed', () => {
    const values = [1, 0.5, null, true, false, 'balanced'];
    expect(readValues(values.map(printValue).join(', '))).toEqual(values);
    expect(readValues(' 50 ;100,, ')).toEqual([50, 100]);
    expect(readValues('')).toEqual([]);
  });

  it('that the form begins with are ones the classifier takes', () => {
    for (const [kind, settings] of Object.entries(TUNABLE)) {
      for (const { parameter, values } of settings) {
        for (const value of values) {
          const parsed = classifierSchema.safeParse({ kind, [parameter]: value });
          expect(parsed.success, `${kind} ${parameter} ${String(value)}`).toBe(true);
        }
      }
    }
  });
});
