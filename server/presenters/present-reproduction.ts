import type { Reproduction as ReproductionContract } from '../../shared/contracts/reproduction.ts';
import type { Reproduction } from '../entities/reproduction.ts';
import { presentJob } from './present-job.ts';
import { presentPerson } from './present-account.ts';

export function presentReproduction(row: Reproduction): ReproductionContract {
  const { id, runId, verdict, checks, missing, threads, seconds } = row;
  return {
    ...{ id, runId, verdict, checks, missing, threads, seconds },
    job: row.job ? presentJob(row.job) : null,
    askedBy: presentPerson(row.askedBy),
    createdAt: row.createdAt.toISOString(),
  };
}
