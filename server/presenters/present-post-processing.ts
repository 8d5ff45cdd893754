import type { RunPostProcessing } from '../../shared/contracts/post-processing.ts';
import type { PostProcessingRevision } from '../entities/post-processing-revision.ts';
import type { Run } from '../entities/run.ts';
import { can } from '../policies/policy-table.ts';
import type { Viewer } from '../policies/viewer.ts';
import { requireResult } from '../services/accuracy.ts';
import { listAreaChanges } from '../services/area-changes.ts';
import { presentPerson } from './present-account.ts';
import { presentJob } from './present-job.ts';

export function presentPostProcessing(
  run: Run,
  revisions: readonly PostProcessingRevision[],
  refusal: string | null,
  viewer: Viewer,
): RunPostProcessing {
  const result = requireResult(run);
  const before = result.raw ?? result;
  const mayRead = can('accuracy.read', viewer.roles);
  const overall = ({ overallAccuracy, overallLow, overallHigh }: typeof before) =>
    mayRead ? { overallAccuracy, overallLow, overallHigh } : null;
  return {
    revisions: revisions.map(({ number, steps, job, effects, madeBy, createdAt }) => ({
      ...{ number, steps, effects },
      job: job ? presentJob(job) : null,
      isApplied: number === result.revision,
      madeBy: presentPerson(madeBy),
      createdAt: createdAt.toISOString(),
    })),
    applied: result.revision ?? null,
    areas: listAreaChanges(run.classes, before.areaHaByCode, result.areaHaByCode),
    before: overall(before),
    after: overall(result),
    refusal,
    abilities: { change: can('run.start', viewer.roles) && refusal === null },
  };
}
