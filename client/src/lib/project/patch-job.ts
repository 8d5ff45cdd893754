import type { Job } from '../../../../shared/contracts/job.ts';

/**
 * Puts a job's progress into what a scene or run query holds, so that bars move without asking the server again.
 *
 * @param data the cached answer: a list (`{scenes: […]}`, `{runs: […]}`) or one object; anything else comes back as it is
 * @param subjectId the scene or run the job works for
 * @returns the same object when nothing in it is the subject
 */
export function patchJob<T>(data: T, subjectId: string, job: Job): T {
  if (!isRecord(data)) return data;
  if (data['id'] === subjectId && 'job' in data) return { ...data, job };
  for (const listName of ['scenes', 'runs']) {
    const list: unknown = data[listName];
    if (!Array.isArray(list)) continue;
    const rows: readonly unknown[] = list;
    if (!rows.some((row) => isRecord(row) && row['id'] === subjectId)) return data;
    return { ...data, [listName]: rows.map((row) => patchJob(row, subjectId, job)) };
  }
  return data;
}

function isRecord(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null;
}
