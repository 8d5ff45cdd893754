import { sendRequest } from '../../lib/fetch-json.ts';

/** Deletes a sample that still stands at `version`; its history stays and can bring it back. */
export function deleteSample(sampleId: string, version: number): Promise<void> {
  return sendRequest(`/samples/${sampleId}`, { method: 'DELETE', body: { version } });
}
