import { useMemo } from 'react';
import type { Block } from '../../../../shared/contracts/block.ts';
import type { MultiPolygon } from '../../../../shared/contracts/geometry.ts';
import { AreaOutline } from '../../components/map/area-outline.tsx';
import { Button } from '../../components/ui/button.tsx';

/** The blocks in one dotted net, the block in work with its name. */
export function BlockOutlines({ blocks, current }: { blocks: readonly Block[]; current: Block | null }) {
  const net = useMemo<MultiPolygon | null>(
    () =>
      blocks.length > 0
        ? { type: 'MultiPolygon', coordinates: blocks.map(({ geometry }) => geometry.coordinates) }
        : null,
    [blocks],
  );
  return (
    <>
      <AreaOutline geometry={current ? null : net} />
      {current && <AreaOutline key={current.id} geometry={current.geometry} label={`Block ${current.name}`} />}
    </>
  );
}

export interface BlockInWorkProps {
  block: Block;
  viewerId: string;
  nClasses: number;
  isPending: boolean;
  onDone: () => void;
}

/** The block in work: how far the viewer is in it, and the way to say it is done. */
export function BlockInWork({ block, viewerId, nClasses, isPending, onDone }: BlockInWorkProps) {
  const mine = block.assignments.find(({ person }) => person.id === viewerId);
  const isReached = mine?.classesReached !== null && mine?.classesReached !== undefined;
  return (
    <span className="flex items-center gap-2 text-sm whitespace-nowrap text-ink-soft">
      <span
        title={block.isIndependent ? 'Labelled by two people independently: you see your own samples only.' : undefined}
      >
        Block {block.name}
        {mine && `, ${isReached ? `${mine.classesReached} of ${nClasses} classes` : `${mine.samples} drawn`}`}
        {block.isIndependent && ', on your own'}
      </span>
      {block.abilities.finish && (
        <Button size="sm" isPending={isPending} onClick={onDone}>
          Block done
        </Button>
      )}
    </span>
  );
}
