import type { QueryClient } from '@tanstack/react-query';
import { projectKey } from '../../lib/project/project-query.ts';

/** Asks again for the scenes and for what counts them; resolves once the scenes have come. */
export async function refreshScenes(queryClient: QueryClient, projectId: string): Promise<void> {
  for (const topic of ['project', 'overview'] as const) {
    void queryClient.invalidateQueries({ queryKey: projectKey(projectId, topic) });
  }
  await queryClient.invalidateQueries({ queryKey: projectKey(projectId, 'scenes') });
}
