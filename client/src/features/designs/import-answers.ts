import { useMutation, useQueryClient } from '@tanstack/react-query';
import { importReportSchema } from '../../../../shared/contracts/reference.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

const importAnswers = (designId: string, csv: string, dryRun: boolean) =>
  fetchJson(`/designs/${designId}/import`, importReportSchema, { method: 'POST', body: { csv, dryRun } });

/** Takes answers from a file as the viewer's own; with `dryRun` only says what would become of each row. */
export function useImportAnswers(projectId: string, designId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: ({ csv, dryRun }: { csv: string; dryRun: boolean }) => importAnswers(designId, csv, dryRun),
    onSuccess: ({ dryRun }) => {
      if (!dryRun) void queryClient.invalidateQueries({ queryKey: projectKey(projectId, 'designs') });
    },
  });
}
