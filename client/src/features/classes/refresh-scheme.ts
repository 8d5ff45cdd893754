import type { QueryClient } from '@tanstack/react-query';
import { classesQuery } from '../../lib/project/classes-query.ts';
import { projectKey } from '../../lib/project/project-query.ts';

/** Asks again for the scheme and for what counts its classes; resolves once the scheme has come. */
export async function refreshScheme(queryClient: QueryClient, projectId: string): Promise<void> {
  for (const topic of ['project', 'overview', 'samples'] as const) {
    void queryClient.invalidateQueries({ queryKey: projectKey(projectId, topic) });
  }
  await queryClient.invalidateQueries({ queryKey: classesQuery(projectId).queryKey });
}
