import { useMemo } from 'react';
import type { Block } from '../../../../shared/contracts/block.ts';
import { Checkbox } from '../../components/ui/checkbox.tsx';
import { DataTable, type DataTableColumn } from '../../components/ui/data-table.tsx';
import { formatNumber } from '../../lib/format.ts';
import { BlockStateTag } from './block-state.tsx';

const STATE_RANK = { open: 0, 'in-work': 1, done: 2, checked: 3 };

export interface BlockTableProps {
  blocks: readonly Block[];
  nClasses: number;
  selectedId: string | null;
  onSelect: (block: Block) => void;
  /** Without it blocks cannot be ticked. */
  onTick?: ((blockId: string, isOn: boolean) => void) | undefined;
  ticked: ReadonlySet<string>;
}

/** The blocks with who works in them and how far they are. */
export function BlockTable({ blocks, nClasses, selectedId, onSelect, onTick, ticked }: BlockTableProps) {
  const columns = useMemo<DataTableColumn<Block>[]>(
    () => [
      ...(onTick
        ? [
            {
              id: 'tick',
              header: '',
              enableSorting: false,
              cell: ({ row: { original } }: { row: { original: Block } }) => (
                <Checkbox
                  isLabelHidden
                  label={`Tick block ${original.name}`}
                  isChecked={ticked.has(original.id)}
                  onChange={(isOn) => onTick(original.id, isOn)}
                />
              ),
              meta: { width: '2rem' },
            },
          ]
        : []),
      { id: 'name', header: 'Block', accessorFn: ({ number }) => number, cell: ({ row }) => row.original.name },
      {
        id: 'state',
        header: 'State',
        accessorFn: ({ state }) => STATE_RANK[state],
        cell: ({ row }) => <BlockStateTag state={row.original.state} />,
      },
      {
        id: 'people',
        header: 'Labellers',
        accessorFn: ({ assignments }) => assignments.map(({ person }) => person.name).join(', '),
        cell: ({ row }) => <People block={row.original} nClasses={nClasses} />,
      },
      {
        id: 'samples',
        header: 'Samples',
        accessorKey: 'sampleCount',
        cell: ({ row }) => formatNumber(row.original.sampleCount),
        meta: { align: 'right' },
      },
    ],
    [nClasses, onTick, ticked],
  );
  return (
    <DataTable
      label="Blocks"
      rows={blocks}
      columns={columns}
      rowId={rowId}
      onRowClick={onSelect}
      selectedId={selectedId}
      maxHeight="100%"
      className="min-h-0 grow"
    />
  );
}

const rowId = (block: Block) => block.id;

function People({ block, nClasses }: { block: Block; nClasses: number }) {
  if (block.assignments.length === 0) return <span className="text-ink-soft">nobody</span>;
  return (
    <ul>
      {block.assignments.map(({ person, doneAt, samples, classesReached }) => (
        <li key={person.id}>
          {person.name}{' '}
          <span className="text-xs text-ink-soft">
            {doneAt
              ? 'done'
              : classesReached === null
                ? `${samples} drawn`
                : `${classesReached} of ${nClasses} classes`}
          </span>
        </li>
      ))}
    </ul>
  );
}
