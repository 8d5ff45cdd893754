import { useMutation, useQueryClient } from '@tanstack/react-query';
import { type Block, type BlockMove, blockListSchema } from '../../../../shared/contracts/block.ts';
import { sayDone, sayProblem } from '../ui/toaster.tsx';
import { fetchJson } from '../../lib/fetch-json.ts';
import { blocksQuery } from '../../lib/project/blocks-query.ts';
import { projectKey } from '../../lib/project/project-query.ts';

const SAID: Record<BlockMove, (name: string) => string> = {
  done: (name) => `You are done with block ${name}`,
  'in-work': (name) => `Block ${name} is in work again`,
  checked: (name) => `Block ${name} is checked`,
  unchecked: (name) => `Block ${name} is to be checked again`,
};
const BACK: Record<BlockMove, BlockMove> = {
  done: 'in-work',
  'in-work': 'done',
  checked: 'unchecked',
  unchecked: 'checked',
};

/** Says that one is done with a block, opens it again, or checks it. */
export function useMoveBlock(projectId: string) {
  const queryClient = useQueryClient();
  const move = useMutation({
    mutationFn: ({ block, to }: { block: Block; to: BlockMove; isUndo?: boolean }) =>
      fetchJson(`/blocks/${block.id}/state`, blockListSchema, { method: 'POST', body: { to } }),
    onSuccess: (list, { block, to, isUndo }) => {
      queryClient.setQueryData(blocksQuery(projectId).queryKey, list);
      void queryClient.invalidateQueries({ queryKey: projectKey(projectId, 'samples') });
      void queryClient.invalidateQueries({ queryKey: projectKey(projectId, 'overview') });
      const after = list.blocks.find(({ id }) => id === block.id);
      const canUndo = !isUndo && to !== 'in-work' && (to !== 'done' || after?.abilities.reopen);
      sayDone(
        SAID[to](block.name),
        canUndo ? { onUndo: () => move.mutate({ block, to: BACK[to], isUndo: true }) } : undefined,
      );
    },
    onError: sayProblem,
  });
  return move;
}
