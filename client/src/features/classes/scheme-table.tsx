import { useState } from 'react';
import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import { moveId } from './place-in-order.ts';
import { SchemeRow } from './scheme-row.tsx';

interface SchemeTableProps {
  classes: readonly LandClass[];
  /** Samples asked for a class; null when there is no target. */
  target: number | null;
  canManage: boolean;
  onEdit: (landClass: LandClass) => void;
  onDelete: (landClass: LandClass) => void;
  onOrder: (ids: string[]) => void;
}

/** The class scheme in its order; the lead drags rows, or moves them with the arrow keys on a row's grip. */
export function SchemeTable({ classes, target, canManage, onEdit, onDelete, onOrder }: SchemeTableProps) {
  const [draggedId, setDraggedId] = useState<string | null>(null);
  const [overId, setOverId] = useState<string | null>(null);
  const [announced, setAnnounced] = useState('');
  const ids = classes.map(({ id }) => id);

  const moveTo = (landClass: LandClass, to: number) => {
    const next = moveId(ids, landClass.id, to);
    if (next.every((id, index) => id === ids[index])) return;
    setAnnounced(`${landClass.name} is now at place ${next.indexOf(landClass.id) + 1} of ${next.length}`);
    onOrder(next);
  };
  const drop = (onto: LandClass) => {
    const dragged = classes.find(({ id }) => id === draggedId);
    if (dragged) moveTo(dragged, ids.indexOf(onto.id));
    setDraggedId(null);
    setOverId(null);
  };
  return (
    <>
      <table aria-label="Class scheme" className="w-full text-sm">
        <thead>
          <tr className="text-left text-ink-soft [&>th]:border-b [&>th]:border-edge [&>th]:px-2 [&>th]:pb-1.5 [&>th]:font-medium">
            {canManage && (
              <th scope="col" className="w-8">
                <span className="sr-only">Order</span>
              </th>
            )}
            <th scope="col" className="w-12">
              Key
            </th>
            <th scope="col" className="w-14 text-right">
              Code
            </th>
            <th scope="col">Class</th>
            <th scope="col" className="w-32 text-right">
              Samples
            </th>
            {canManage && (
              <th scope="col" className="w-20">
                <span className="sr-only">Change</span>
              </th>
            )}
          </tr>
        </thead>
        <tbody>
          {classes.map((landClass, index) => (
            <SchemeRow
              key={landClass.id}
              landClass={landClass}
              target={target}
              canManage={canManage}
              dropSide={
                overId === landClass.id && draggedId !== null && draggedId !== landClass.id
                  ? ids.indexOf(draggedId) < index
                    ? 'below'
                    : 'above'
                  : null
              }
              isDragged={draggedId === landClass.id}
              onDragStart={() => setDraggedId(landClass.id)}
              onDragOver={() => setOverId(landClass.id)}
              onDrop={() => drop(landClass)}
              onDragEnd={() => {
                setDraggedId(null);
                setOverId(null);
              }}
              onMove={(step) => moveTo(landClass, step === 'first' ? 0 : step === 'last' ? ids.length : index + step)}
              isFirst={index === 0}
              isLast={index === classes.length - 1}
              onEdit={() => onEdit(landClass)}
              onDelete={() => onDelete(landClass)}
            />
          ))}
        </tbody>
      </table>
      <p aria-live="polite" className="sr-only">
        {announced}
      </p>
    </>
  );
}
