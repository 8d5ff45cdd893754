import { type Table, flexRender } from '@tanstack/react-table';
import { ArrowDown, ArrowUp, ArrowUpDown } from 'lucide-react';
import { classNames } from '../../lib/class-names.ts';
import { ALIGN } from './data-table-row.tsx';

const ARIA_SORT = { asc: 'ascending', desc: 'descending' } as const;

/** The sticky header of a DataTable; headers of sortable columns are buttons. */
export function DataTableHead<T>({ table }: { table: Table<T> }) {
  return (
    <thead>
      {table.getHeaderGroups().map((group) => (
        <tr key={group.id}>
          {group.headers.map((header) => {
            const { column } = header;
            const sorted = column.getIsSorted();
            const align = column.columnDef.meta?.align ?? 'left';
            const title = header.isPlaceholder ? null : flexRender(column.columnDef.header, header.getContext());
            return (
              <th
                key={header.id}
                scope="col"
                aria-sort={sorted ? ARIA_SORT[sorted] : undefined}
                style={{ width: column.columnDef.meta?.width }}
                className={classNames(
                  'sticky top-0 z-10 border-b border-edge bg-paper px-2 py-1.5 align-bottom font-medium text-ink-soft',
                  ALIGN[align],
                )}
              >
                {column.getCanSort() ? (
                  <button
                    type="button"
                    onClick={column.getToggleSortingHandler()}
                    className={classNames(
                      'group inline-flex items-center align-bottom gap-1 hover:text-ink',
                      align === 'right' && 'flex-row-reverse',
                      sorted && 'text-ink',
                    )}
                  >
                    {title}
                    <SortMark sorted={sorted} />
                  </button>
                ) : (
                  title
                )}
              </th>
            );
          })}
        </tr>
      ))}
    </thead>
  );
}

function SortMark({ sorted }: { sorted: false | 'asc' | 'desc' }) {
  if (sorted === 'asc') return <ArrowUp aria-hidden className="size-3.5" />;
  if (sorted === 'desc') return <ArrowDown aria-hidden className="size-3.5" />;
  return (
    <ArrowUpDown aria-hidden className="size-3.5 opacity-0 group-hover:opacity-60 group-focus-visible:opacity-60" />
  );
}
