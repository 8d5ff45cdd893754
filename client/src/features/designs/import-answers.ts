import { useMutation, useQueryClient } from '@tanstack/react-query';
import { importReportSchema } from '../../../../shared/contracts/reference.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';
import { upload } from '../../lib/upload.ts';

const isCsv = (file: File) => /\.(csv|txt|tsv)$/i.test(file.name);

async function importAnswers(designId: string, file: File, dryRun: boolean) {
  if (isCsv(file)) {
    const body = { csv: await file.text(), dryRun };
    return fetchJson(`/designs/${designId}/import`, importReportSchema, { method: 'POST', body });
  }
  const form = new FormData();
  form.set('dryRun', String(dryRun));
  form.set('files', file);
  return upload(`/designs/${designId}/import-file`, form, importReportSchema);
}

/** Takes answers from a file as the viewer's own; with `dryRun` only says what would become of each row. */
export function useImportAnswers(projectId: string, designId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: ({ file, dryRun }: { file: File; dryRun: boolean }) => importAnswers(designId, file, dryRun),
    onSuccess: ({ dryRun }) => {
      if (!dryRun) void queryClient.invalidateQueries({ queryKey: projectKey(projectId, 'designs') });
    },
  });
}
