import { z } from 'zod';
import { idSchema } from '../../../shared/contracts/common.ts';
import type { App } from '../../app-context.ts';
import type { Sample } from '../../entities/sample.ts';
import { findSample } from '../../services/samples.ts';

export const sampleParams = z.object({ sampleId: idSchema });

export interface SampleTarget {
  projectId: string;
  madeById: string | null;
  sample: Sample;
}

/** A deleted sample is still found: it can be restored, and a late change has to be told. */
export async function findSampleTarget(app: App, params: { sampleId: string }): Promise<SampleTarget | null> {
  const sample = await findSample(app, params.sampleId);
  return sample ? { projectId: sample.projectId, madeById: sample.createdById, sample } : null;
}
