import { type QueryClient, queryOptions, useQuery } from '@tanstack/react-query';
import type { z } from 'zod';
import { type Sample, sampleListSchema } from '../../../../shared/contracts/sample.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

const listSamples = (projectId: string, signal: AbortSignal) =>
  fetchJson(`/projects/${projectId}/samples`, sampleListSchema, { signal });

/** The project's samples, all scenes together. */
const samplesQuery = (projectId: string) =>
  queryOptions({
    queryKey: projectKey(projectId, 'samples', 'list'),
    queryFn: ({ signal }) => listSamples(projectId, signal),
    select: ({ samples }) => samples,
  });

export function useSamples(projectId: string) {
  return useQuery(samplesQuery(projectId));
}

/** Puts a saved sample into the cached list at once, so that the map does not blink until the list comes again. */
export function placeSample(queryClient: QueryClient, sample: Sample): void {
  changeList(queryClient, sample.projectId, (samples) =>
    samples.some((one) => one.id === sample.id)
      ? samples.map((one) => (one.id === sample.id ? sample : one))
      : [...samples, sample],
  );
}

/** Takes a deleted sample out of the cached list. */
export function dropSample(queryClient: QueryClient, projectId: string, sampleId: string): void {
  changeList(queryClient, projectId, (samples) => samples.filter((one) => one.id !== sampleId));
}

function changeList(queryClient: QueryClient, projectId: string, change: (samples: Sample[]) => Sample[]): void {
  const { queryKey } = samplesQuery(projectId);
  queryClient.setQueryData<z.infer<typeof sampleListSchema>>(queryKey, (data) =>
    data ? { samples: change(data.samples) } : data,
  );
}

/** Asks again for what counts samples; resolves when the list has come. */
export async function refreshSamples(queryClient: QueryClient, projectId: string): Promise<void> {
  for (const topic of ['project', 'overview', 'classes'] as const) {
    void queryClient.invalidateQueries({ queryKey: projectKey(projectId, topic) });
  }
  await queryClient.invalidateQueries({ queryKey: projectKey(projectId, 'samples') });
}
