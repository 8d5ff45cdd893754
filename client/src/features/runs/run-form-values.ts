import type { Control } from 'react-hook-form';
import type { z } from 'zod';
import type { startRunSchema } from '../../../../shared/contracts/run.ts';

export type RunFormInput = z.input<typeof startRunSchema>;
export type RunFormOutput = z.output<typeof startRunSchema>;
export type RunFormControl = Control<RunFormInput, unknown, RunFormOutput>;
