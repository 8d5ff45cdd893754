import { queryOptions, useQuery } from '@tanstack/react-query';
import { type AccuracyUnit, cellSamplesSchema } from '../../../../shared/contracts/accuracy.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

export interface CellChoice {
  runId: string;
  unit: AccuracyUnit;
  mappedId: string;
  referenceId: string;
}

const getCellSamples = ({ runId, unit, mappedId, referenceId }: CellChoice, signal: AbortSignal) =>
  fetchJson(`/runs/${runId}/accuracy/cell`, cellSamplesSchema, {
    query: { unit, mapped: mappedId, reference: referenceId },
    signal,
  });

/** The held-out samples behind a cell of the matrix, most pixels first. */
const cellSamplesQuery = (projectId: string, cell: CellChoice) =>
  queryOptions({
    queryKey: projectKey(projectId, 'accuracy', cell.runId, cell.unit, 'cell', cell.mappedId, cell.referenceId),
    queryFn: ({ signal }) => getCellSamples(cell, signal),
  });

export function useCellSamples(projectId: string, cell: CellChoice) {
  return useQuery(cellSamplesQuery(projectId, cell));
}
