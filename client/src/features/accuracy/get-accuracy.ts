import { keepPreviousData, queryOptions, useQuery } from '@tanstack/react-query';
import { type AccuracyUnit, accuracySchema } from '../../../../shared/contracts/accuracy.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

const getAccuracy = (runId: string, unit: AccuracyUnit, signal: AbortSignal) =>
  fetchJson(`/runs/${runId}/accuracy`, accuracySchema, { query: { unit }, signal });

/** Confusion matrix and figures of a finished run. */
const accuracyQuery = (projectId: string, runId: string, unit: AccuracyUnit) =>
  queryOptions({
    queryKey: projectKey(projectId, 'accuracy', runId, unit),
    queryFn: ({ signal }) => getAccuracy(runId, unit, signal),
    placeholderData: keepPreviousData,
  });

export function useAccuracy(projectId: string, runId: string, unit: AccuracyUnit) {
  return useQuery(accuracyQuery(projectId, runId, unit));
}
