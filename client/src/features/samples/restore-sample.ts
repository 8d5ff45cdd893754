import { sampleSchema } from '../../../../shared/contracts/sample.ts';
import { fetchJson } from '../../lib/fetch-json.ts';

/** Makes an earlier version of a sample the one that stands, deleted or not; history gains a version. */
export function restoreSample(sampleId: string, versionNumber: number) {
  return fetchJson(`/samples/${sampleId}/restore`, sampleSchema, { method: 'POST', body: { versionNumber } });
}
