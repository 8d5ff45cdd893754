import { keepPreviousData, queryOptions, useQuery } from '@tanstack/react-query';
import { runProbeSchema } from '../../../../shared/contracts/run.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import type { Place } from '../../lib/project/probe-query.ts';
import { projectKey } from '../../lib/project/project-query.ts';

const probeRun = (runId: string, place: Place, signal: AbortSignal) =>
  fetchJson(`/runs/${runId}/probe`, runProbeSchema, { query: { lon: place.lon, lat: place.lat }, signal });

/** The mapped class at a place. A class map never changes, so an answer holds for good. */
const runProbeQuery = (projectId: string, runId: string, place: Place) =>
  queryOptions({
    queryKey: projectKey(projectId, 'runs', runId, 'probe', place.lon, place.lat),
    queryFn: ({ signal }) => probeRun(runId, place, signal),
    staleTime: Infinity,
    placeholderData: keepPreviousData,
  });

export function useRunProbe(projectId: string, runId: string, place: Place | null) {
  return useQuery({
    ...runProbeQuery(projectId, runId, place ?? { lon: 0, lat: 0 }),
    enabled: place !== null,
  });
}
