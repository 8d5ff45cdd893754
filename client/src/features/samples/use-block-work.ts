import { useState } from 'react';
import type { Block } from '../../../../shared/contracts/block.ts';
import type { Polygon } from '../../../../shared/contracts/geometry.ts';
import { sayDone } from '../../components/ui/toaster.tsx';
import { openBlocksOf } from '../../lib/project/blocks-query.ts';
import { useMoveBlock } from '../../components/blocks/move-block.ts';

/** The block a labeller is in, and the way to their next one. */
export function useBlockWork(projectId: string, viewerId: string, blocks: readonly Block[]) {
  const mine = openBlocksOf(blocks, viewerId);
  const [chosenId, setChosenId] = useState<string | null>(null);
  const current = mine.find(({ id }) => id === chosenId) ?? mine[0] ?? null;
  const move = useMoveBlock(projectId);
  const goTo = (block: Block | undefined, show: (place: Polygon) => void) => {
    if (!block) return;
    setChosenId(block.id);
    show(block.geometry);
  };
  return {
    current,
    isMoving: move.isPending,
    /** Goes to the block after the one in work, round to the first. */
    next: (show: (place: Polygon) => void) => {
      if (!current) {
        sayDone('No block of yours is open', undefined, 'desk');
        return;
      }
      goTo(mine[(mine.indexOf(current) + 1) % mine.length], show);
    },
    /** Says the block is done and goes on to the next one. */
    finish: (show: (place: Polygon) => void) => {
      if (!current) return;
      const following = mine[(mine.indexOf(current) + 1) % mine.length];
      move.mutate({ block: current, to: 'done' }, { onSuccess: () => following !== current && goTo(following, show) });
    },
  };
}
