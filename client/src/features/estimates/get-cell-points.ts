import { queryOptions, useQuery } from '@tanstack/react-query';
import { cellPointsSchema } from '../../../../shared/contracts/reference.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

export interface CellOfDesign {
  designId: string;
  mappedCode: number;
  referenceId: string;
}

const getCellPoints = ({ designId, mappedCode, referenceId }: CellOfDesign, signal: AbortSignal) =>
  fetchJson(`/designs/${designId}/cell`, cellPointsSchema, {
    query: { mapped: mappedCode, reference: referenceId },
    signal,
  });

/** The reference points behind a cell of the matrix. */
const cellPointsQuery = (projectId: string, cell: CellOfDesign) =>
  queryOptions({
    queryKey: projectKey(projectId, 'designs', cell.designId, 'cell', cell.mappedCode, cell.referenceId),
    queryFn: ({ signal }) => getCellPoints(cell, signal),
  });

export function useCellPoints(projectId: string, cell: CellOfDesign) {
  return useQuery(cellPointsQuery(projectId, cell));
}
