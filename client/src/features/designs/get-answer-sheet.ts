import { queryOptions, useQuery } from '@tanstack/react-query';
import { answerSheetSchema } from '../../../../shared/contracts/reference.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

const getAnswerSheet = (designId: string, signal: AbortSignal) =>
  fetchJson(`/designs/${designId}/sheet`, answerSheetSchema, { signal });

/** Where the points of a design are. */
const answerSheetQuery = (projectId: string, designId: string) =>
  queryOptions({
    queryKey: projectKey(projectId, 'designs', designId, 'sheet'),
    queryFn: ({ signal }) => getAnswerSheet(designId, signal),
  });

export function useAnswerSheet(projectId: string, designId: string) {
  return useQuery(answerSheetQuery(projectId, designId));
}
