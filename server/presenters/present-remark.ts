import type { SampleRemark as SampleRemarkContract } from '../../shared/contracts/sample-review.ts';
import type { SampleRemark } from '../entities/sample-remark.ts';
import { presentPerson } from './present-account.ts';

export function presentRemark(remark: SampleRemark): SampleRemarkContract {
  const { id, sampleId, kind, text } = remark;
  return {
    ...{ id, sampleId, kind, text },
    by: presentPerson(remark.by),
    at: remark.createdAt.toISOString(),
    resolvedAt: remark.resolvedAt?.toISOString() ?? null,
    resolvedBy: presentPerson(remark.resolvedBy),
  };
}
