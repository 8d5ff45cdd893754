import {
  type ColumnDef,
  type RowData,
  type SortingState,
  getCoreRowModel,
  getFilteredRowModel,
  getSortedRowModel,
  useReactTable,
} from '@tanstack/react-table';
import { useVirtualizer } from '@tanstack/react-virtual';
import { type ReactNode, useMemo, useRef, useState } from 'react';
import { classNames } from '../../lib/class-names.ts';
import { formatNumber } from '../../lib/format.ts';
import { DataTableHead } from './data-table-head.tsx';
import { DataTableRow } from './data-table-row.tsx';
import { TextInput } from './text-input.tsx';

declare module '@tanstack/react-table' {
  // The interface must repeat the library's type parameters to merge with it.
  interface ColumnMeta<TData extends RowData, TValue> {
    /** right for figures. */
    align?: 'left' | 'right' | 'center';
    /** CSS width of the column: "6rem", "30%". */
    width?: string;
    readonly columnTypes?: [TData, TValue];
  }
}

export type DataTableColumn<T> = ColumnDef<T>;

export interface DataTableProps<T> {
  /** Read out as the table's name. */
  label: string;
  rows: readonly T[];
  /** TanStack column definitions; `meta.align` and `meta.width` set the column. Keep the array stable. */
  columns: readonly DataTableColumn<T>[];
  rowId: (row: T) => string;
  /** Makes rows pressable: click, Enter or Space. */
  onRowClick?: (row: T) => void;
  selectedId?: string | null;
  initialSorting?: SortingState;
  /** Shows a filter box with these words in it. */
  filterPlaceholder?: string;
  /** The text of a row the filter looks through; without it, all plain column values. */
  filterText?: (row: T) => string;
  /** More controls beside the filter. */
  toolbar?: ReactNode;
  /** Shown instead of rows when there are none at all. */
  empty?: ReactNode;
  /** CSS height of the scrolling body; beyond ~100 rows only those in sight are drawn. */
  maxHeight?: string;
  rowHeight?: number;
  className?: string;
}

const VIRTUAL_FROM = 100;

/** A sortable, filterable table whose rows may be pressed; arrow keys move between rows. */
export function DataTable<T>({
  label,
  rows,
  columns,
  rowId,
  onRowClick,
  selectedId = null,
  initialSorting = [],
  filterPlaceholder,
  filterText,
  toolbar,
  empty,
  maxHeight = '32rem',
  rowHeight = 36,
  className,
}: DataTableProps<T>) {
  const [sorting, setSorting] = useState<SortingState>(initialSorting);
  const [filter, setFilter] = useState('');
  const [focusedIndex, setFocusedIndex] = useState(0);
  const scrollRef = useRef<HTMLDivElement>(null);
  const data = useMemo(() => [...rows], [rows]);
  const table = useReactTable<T>({
    data,
    columns: columns as DataTableColumn<T>[],
    state: { sorting, globalFilter: filter },
    onSortingChange: setSorting,
    onGlobalFilterChange: setFilter,
    getRowId: rowId,
    getCoreRowModel: getCoreRowModel(),
    getSortedRowModel: getSortedRowModel(),
    getFilteredRowModel: getFilteredRowModel(),
    ...(filterText && {
      globalFilterFn: (row, _columnId, wanted: string) =>
        filterText(row.original).toLowerCase().includes(wanted.trim().toLowerCase()),
      getColumnCanGlobalFilter: () => true,
    }),
  });
  const shown = table.getRowModel().rows;
  const isVirtual = shown.length > VIRTUAL_FROM;
  const virtualizer = useVirtualizer({
    count: shown.length,
    enabled: isVirtual,
    estimateSize: () => rowHeight,
    getScrollElement: () => scrollRef.current,
    overscan: 12,
  });
  const virtualRows = virtualizer.getVirtualItems();
  const drawn = isVirtual ? virtualRows.map((item) => item.index) : shown.map((_, index) => index);
  const padTop = isVirtual ? (virtualRows[0]?.start ?? 0) : 0;
  const padBottom = isVirtual ? virtualizer.getTotalSize() - (virtualRows.at(-1)?.end ?? 0) : 0;
  const nColumns = table.getVisibleLeafColumns().length;

  const moveFocus = (index: number) => {
    const next = Math.max(0, Math.min(shown.length - 1, index));
    setFocusedIndex(next);
    if (isVirtual) virtualizer.scrollToIndex(next);
    // The row may only be drawn after the scroll: focus it in the next frame.
    requestAnimationFrame(() => scrollRef.current?.querySelector<HTMLElement>(`[data-row-index="${next}"]`)?.focus());
  };

  if (rows.length === 0 && empty) return <>{empty}</>;
  return (
    <div className={className}>
      {(filterPlaceholder || toolbar) && (
        <div className="mb-3 flex flex-wrap items-center gap-3">
          {filterPlaceholder && (
            <TextInput
              type="search"
              aria-label={filterPlaceholder}
              placeholder={filterPlaceholder}
              value={filter}
              onChange={(event) => setFilter(event.target.value)}
              className="max-w-64"
            />
          )}
          {toolbar}
          <p role="status" className="ml-auto text-xs text-ink-soft">
            {shown.length === rows.length
              ? `${formatNumber(rows.length)} in all`
              : `${formatNumber(shown.length)} of ${formatNumber(rows.length)}`}
          </p>
        </div>
      )}
      <div ref={scrollRef} className="overflow-auto" style={{ maxHeight }}>
        <table
          role={onRowClick ? 'grid' : undefined}
          aria-label={label}
          aria-rowcount={shown.length + 1}
          className="w-full border-separate border-spacing-0 text-sm"
        >
          <DataTableHead table={table} />
          <tbody>
            {padTop > 0 && <PadRow height={padTop} nColumns={nColumns} />}
            {drawn.map((index) => {
              const row = shown[index];
              if (!row) return null;
              return (
                <DataTableRow
                  key={row.id}
                  row={row}
                  index={index}
                  height={rowHeight}
                  isSelected={row.id === selectedId}
                  isTabStop={index === Math.min(focusedIndex, shown.length - 1)}
                  onPress={onRowClick}
                  onMove={moveFocus}
                  lastIndex={shown.length - 1}
                />
              );
            })}
            {padBottom > 0 && <PadRow height={padBottom} nColumns={nColumns} />}
          </tbody>
        </table>
        {shown.length === 0 && (
          <p className={classNames('py-6 text-center text-ink-soft')}>
            {filter ? `No row has “${filter}” in it.` : 'No rows.'}
          </p>
        )}
      </div>
    </div>
  );
}

function PadRow({ height, nColumns }: { height: number; nColumns: number }) {
  return (
    <tr aria-hidden>
      <td colSpan={nColumns} style={{ height, padding: 0 }} />
    </tr>
  );
}
