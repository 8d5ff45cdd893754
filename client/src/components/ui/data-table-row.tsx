import { type Row, flexRender } from '@tanstack/react-table';
import type { KeyboardEvent } from 'react';
import { classNames } from '../../lib/class-names.ts';

export const ALIGN = { left: 'text-left', right: 'text-right', center: 'text-center' };

interface DataTableRowProps<T> {
  row: Row<T>;
  index: number;
  lastIndex: number;
  height: number;
  isSelected: boolean;
  isTabStop: boolean;
  onPress: ((row: T) => void) | undefined;
  onMove: (index: number) => void;
}

const PAGE = 10;

/** One row of a DataTable; pressable ones take the arrow keys. */
export function DataTableRow<T>({
  row,
  index,
  lastIndex,
  height,
  isSelected,
  isTabStop,
  onPress,
  onMove,
}: DataTableRowProps<T>) {
  const handleKey = (event: KeyboardEvent<HTMLTableRowElement>) => {
    // Keys pressed in a control inside the row belong to that control.
    if (event.target !== event.currentTarget) return;
    const target = {
      ArrowDown: index + 1,
      ArrowUp: index - 1,
      PageDown: index + PAGE,
      PageUp: index - PAGE,
      Home: 0,
      End: lastIndex,
    }[event.key];
    if (target !== undefined) onMove(target);
    else if (event.key === 'Enter' || event.key === ' ') onPress?.(row.original);
    else return;
    event.preventDefault();
  };
  return (
    <tr
      data-row-index={index}
      aria-rowindex={index + 2}
      aria-selected={onPress ? isSelected : undefined}
      tabIndex={onPress ? (isTabStop ? 0 : -1) : undefined}
      onClick={onPress && ((event) => !isOnControl(event.target) && onPress(row.original))}
      onKeyDown={onPress && handleKey}
      style={{ height }}
      className={classNames(
        'focus-inset',
        onPress && 'cursor-pointer hover:bg-sunken',
        isSelected && 'bg-groundsel-wash hover:bg-groundsel-wash',
      )}
    >
      {row.getVisibleCells().map((cell) => (
        <td
          key={cell.id}
          className={classNames('border-b border-line px-2 py-1', ALIGN[cell.column.columnDef.meta?.align ?? 'left'])}
        >
          {flexRender(cell.column.columnDef.cell, cell.getContext())}
        </td>
      ))}
    </tr>
  );
}

/** A press on a box or button inside the row is that control's own. */
function isOnControl(target: EventTarget): boolean {
  return target instanceof Element && target.closest('button, a, input, label') !== null;
}
