import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import { PRESENCE_BEAT_MS, type Presence, presenceListSchema } from '../../../../shared/contracts/presence.ts';
import { fetchJson, sendRequest } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

/** Says that this desk is open and what is changed at it, and tells who else is here. */
export function usePresence(projectId: string, viewerId: string, editingSampleId: string | null): Presence[] {
  const queryClient = useQueryClient();
  const [deskId] = useState(() => crypto.randomUUID());
  const queryKey = projectKey(projectId, 'presence');
  useEffect(() => {
    const abort = new AbortController();
    const beat = () => {
      fetchJson(`/projects/${projectId}/presence`, presenceListSchema, {
        method: 'POST',
        body: { deskId, editingSampleId },
        signal: abort.signal,
      }).then(
        (list) => queryClient.setQueryData(projectKey(projectId, 'presence'), list),
        // The line is down: the rail says so, and the next beat tries again.
        () => undefined,
      );
    };
    beat();
    const timer = setInterval(beat, PRESENCE_BEAT_MS);
    return () => {
      clearInterval(timer);
      abort.abort();
    };
  }, [projectId, deskId, editingSampleId, queryClient]);
  useEffect(
    () => () => {
      // Whoever could not say goodbye is forgotten when the heartbeat stops.
      sendRequest(`/projects/${projectId}/presence`, { method: 'DELETE', body: { deskId } }).catch(() => undefined);
    },
    [projectId, deskId],
  );
  const list = useQuery({
    queryKey,
    queryFn: ({ signal }) => fetchJson(`/projects/${projectId}/presence`, presenceListSchema, { signal }),
  });
  return (list.data?.people ?? []).filter(({ person }) => person.id !== viewerId);
}
