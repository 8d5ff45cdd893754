import { ArrowDown, ArrowUp, GripVertical, MoreHorizontal, Pencil, Trash2 } from 'lucide-react';
import { type KeyboardEvent, useRef } from 'react';
import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import { classDigit } from '../../components/layout/class-keys.tsx';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import { IconButton } from '../../components/ui/icon-button.tsx';
import { Kbd } from '../../components/ui/kbd.tsx';
import { Menu, MenuItem, MenuLine } from '../../components/ui/menu.tsx';
import { TargetBar } from '../../components/ui/progress-bar.tsx';
import { classNames } from '../../lib/class-names.ts';
import { formatNumber } from '../../lib/format.ts';

type Step = 1 | -1 | 'first' | 'last';

interface SchemeRowProps {
  landClass: LandClass;
  target: number | null;
  canManage: boolean;
  /** Where a dragged row would go, drawn as a line. */
  dropSide: 'above' | 'below' | null;
  isDragged: boolean;
  isFirst: boolean;
  isLast: boolean;
  onDragStart: () => void;
  onDragOver: () => void;
  onDrop: () => void;
  onDragEnd: () => void;
  onMove: (step: Step) => void;
  onEdit: () => void;
  onDelete: () => void;
}

const STEPS: Record<string, Step> = { ArrowUp: -1, ArrowDown: 1, Home: 'first', End: 'last' };

/** One class of the scheme: grip, digit key, code, swatch with name and definition, tally, acts. */
export function SchemeRow(props: SchemeRowProps) {
  const { landClass, target, canManage, dropSide, onMove } = props;
  const digit = classDigit(landClass.position);
  const rowRef = useRef<HTMLTableRowElement>(null);
  const moveByKey = (event: KeyboardEvent) => {
    const step = STEPS[event.key];
    if (!step) return;
    event.preventDefault();
    onMove(step);
  };
  return (
    <tr
      ref={rowRef}
      onDragOver={(event) => {
        event.preventDefault();
        props.onDragOver();
      }}
      onDrop={(event) => {
        event.preventDefault();
        props.onDrop();
      }}
      className={classNames(
        '[&>*]:border-b [&>*]:border-line [&>*]:px-2 [&>*]:py-2.5 [&>*]:align-top',
        dropSide === 'above' && '[&>*]:shadow-[inset_0_2px_0_var(--groundsel-deep)]',
        dropSide === 'below' && '[&>*]:shadow-[inset_0_-2px_0_var(--groundsel-deep)]',
        props.isDragged && 'opacity-50',
      )}
    >
      {canManage && (
        <td className="px-0!">
          <button
            type="button"
            draggable
            aria-label={`Move ${landClass.name}: arrow keys, or drag`}
            title="Drag, or press the arrow keys"
            onKeyDown={moveByKey}
            onDragStart={(event) => {
              event.dataTransfer.effectAllowed = 'move';
              event.dataTransfer.setData('text/plain', landClass.name);
              if (rowRef.current) event.dataTransfer.setDragImage(rowRef.current, 12, 16);
              props.onDragStart();
            }}
            onDragEnd={props.onDragEnd}
            className="flex h-6 w-7 cursor-grab! items-center justify-center rounded text-ink-soft hover:bg-sunken hover:text-ink active:cursor-grabbing!"
          >
            <GripVertical aria-hidden className="size-4" />
          </button>
        </td>
      )}
      <td>{digit ? <Kbd className="mt-0.5">{digit}</Kbd> : <span className="text-ink-soft">–</span>}</td>
      <td className="text-right">{landClass.code}</td>
      <th scope="row" className="text-left font-normal">
        <span className="flex gap-3">
          <ClassSwatch colour={landClass.colour} position={landClass.position} className="mt-0.5" />
          <span className="min-w-0">
            <span className="block font-medium">{landClass.name}</span>
            <span className="block max-w-[46rem] text-sm whitespace-pre-line text-ink-soft">
              {landClass.definition || 'No definition yet.'}
            </span>
          </span>
        </span>
      </th>
      <td className="text-right whitespace-nowrap">
        {formatNumber(landClass.sampleCount)}
        {target !== null && (
          <>
            <span className="text-ink-soft"> of {formatNumber(target)}</span>
            <TargetBar done={landClass.sampleCount} target={target} className="mt-1.5 ml-auto w-20" />
          </>
        )}
      </td>
      {canManage && (
        <td className="pr-0! whitespace-nowrap text-right">
          <span className="-my-1 inline-flex">
            <IconButton label={`Edit ${landClass.name}`} size="sm" icon={<Pencil />} onClick={props.onEdit} />
            <Menu trigger={<IconButton label={`More about ${landClass.name}`} size="sm" icon={<MoreHorizontal />} />}>
              <MenuItem icon={<ArrowUp />} isDisabled={props.isFirst} onSelect={() => onMove(-1)}>
                Move up
              </MenuItem>
              <MenuItem icon={<ArrowDown />} isDisabled={props.isLast} onSelect={() => onMove(1)}>
                Move down
              </MenuItem>
              <MenuLine />
              <MenuItem icon={<Trash2 />} isDanger onSelect={props.onDelete}>
                Delete class…
              </MenuItem>
            </Menu>
          </span>
        </td>
      )}
    </tr>
  );
}
