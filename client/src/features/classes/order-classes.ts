import { useMutation, useQueryClient } from '@tanstack/react-query';
import type { z } from 'zod';
import { landClassListSchema } from '../../../../shared/contracts/land-class.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { classesQuery } from '../../lib/project/classes-query.ts';
import { placeInOrder } from './place-in-order.ts';

function orderClasses(projectId: string, ids: readonly string[]) {
  return fetchJson(`/projects/${projectId}/classes/order`, landClassListSchema, { method: 'PUT', body: { ids } });
}

/** Puts the scheme in a new order; shown at once and taken back when the server refuses. */
export function useOrderClasses(projectId: string) {
  const queryClient = useQueryClient();
  const { queryKey } = classesQuery(projectId);
  return useMutation({
    mutationFn: (ids: readonly string[]) => orderClasses(projectId, ids),
    // Two moves in quick succession must arrive in the order they were made.
    scope: { id: `order-classes-${projectId}` },
    onMutate: async (ids) => {
      await queryClient.cancelQueries({ queryKey });
      const before = queryClient.getQueryData<z.infer<typeof landClassListSchema>>(queryKey);
      if (before) queryClient.setQueryData(queryKey, { classes: placeInOrder(before.classes, ids) });
      return { before };
    },
    onError: (_error, _ids, context) => {
      if (context?.before) queryClient.setQueryData(queryKey, context.before);
    },
    onSettled: () => {
      // The last of several moves asks; the ones before it would show an order already left behind.
      if (queryClient.isMutating({ mutationKey: ['order-classes', projectId] }) <= 1) {
        void queryClient.invalidateQueries({ queryKey });
      }
    },
    mutationKey: ['order-classes', projectId],
  });
}
