import { keepPreviousData, queryOptions, useQuery } from '@tanstack/react-query';
import { runVotesSchema } from '../../../../shared/contracts/run.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import type { Place } from '../../lib/project/probe-query.ts';
import { projectKey } from '../../lib/project/project-query.ts';

const readVotes = (runId: string, place: Place, signal: AbortSignal) =>
  fetchJson(`/runs/${runId}/votes`, runVotesSchema, { query: { lon: place.lon, lat: place.lat }, signal });

const runVotesQuery = (projectId: string, runId: string, place: Place) =>
  queryOptions({
    queryKey: projectKey(projectId, 'runs', runId, 'votes', place.lon, place.lat),
    queryFn: ({ signal }) => readVotes(runId, place, signal),
    placeholderData: keepPreviousData,
  });

/** How a run's model votes on the pixel at a place. */
export function useRunVotes(projectId: string, runId: string, place: Place) {
  return useQuery(runVotesQuery(projectId, runId, place));
}
