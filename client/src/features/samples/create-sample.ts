import { type CreateSample, sampleSchema } from '../../../../shared/contracts/sample.ts';
import { fetchJson } from '../../lib/fetch-json.ts';

/** Saves a new sample; sent again with the same id, it answers with the sample already there. */
export function createSample(projectId: string, body: CreateSample) {
  return fetchJson(`/projects/${projectId}/samples`, sampleSchema, { method: 'POST', body });
}
