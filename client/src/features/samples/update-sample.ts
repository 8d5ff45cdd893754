import { type UpdateSample, sampleSchema } from '../../../../shared/contracts/sample.ts';
import { fetchJson } from '../../lib/fetch-json.ts';

/** Changes a sample that still stands at `version`; a 409 carries the sample as it stands. */
export function updateSample(sampleId: string, body: UpdateSample) {
  return fetchJson(`/samples/${sampleId}`, sampleSchema, { method: 'PATCH', body });
}
