import { render, screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { describe, expect, it, vi } from 'vitest';
import { DataTable, type DataTableColumn } from '../../../client/src/components/ui/data-table.tsx';

interface Sample {
  id: string;
  className: string;
  areaHa: number;
}

const rows: Sample[] = [
  { id: 'a', className: 'Saltmarsh', areaHa: 3.7 },
  { id: 'b', className: 'Arable', areaHa: 12 },
  { id: 'c', className: 'Tidal flat', areaHa: 0.9 },
];
const columns: DataTableColumn<Sample>[] = [
  { accessorKey: 'className', header: 'Class' },
  { accessorKey: 'areaHa', header: 'Area, ha', meta: { align: 'right' } },
];
const firstCells = () =>
  screen
    .getAllByRole('row')
    .slice(1)
    .map((row) => row.querySelector('td')?.textContent);

describe('a data table', () => {
  it('sorts by a column and says so', async () => {
    render(<DataTable label="Samples" rows={rows} columns={columns} rowId={(row) => row.id} />);
    await userEvent.click(screen.getByRole('button', { name: 'Class' }));
    expect(firstCells()).toEqual(['Arable', 'Saltmarsh', 'Tidal flat']);
    expect(screen.getByRole('columnheader', { name: 'Class' })).toHaveAttribute('aria-sort', 'ascending');
  });

  it('filters, tells how many are left, and says when none is', async () => {
    render(
      <DataTable
        label="Samples"
        rows={rows}
        columns={columns}
        rowId={(row) => row.id}
        filterPlaceholder="Filter samples"
      />,
    );
    const box = screen.getByRole('searchbox', { name: 'Filter samples' });
    await userEvent.type(box, 'flat');
    expect(firstCells()).toEqual(['Tidal flat']);
    expect(screen.getByRole('status')).toHaveTextContent('1 of 3');
    await userEvent.type(box, 'xx');
    expect(screen.getByText('No row has “flatxx” in it.')).toBeInTheDocument();
  });

  it('opens a row by mouse and by keyboard, and moves between rows with the arrows', async () => {
    const open = vi.fn();
    render(
      <DataTable
        label="Samples"
        rows={rows}
        columns={columns}
        rowId={(row) => row.id}
        onRowClick={open}
        selectedId="b"
      />,
    );
    const [, first, second] = screen.getAllByRole('row');
    expect(second).toHaveAttribute('aria-selected', 'true');
    await userEvent.click(first);
    expect(open).toHaveBeenLastCalledWith(rows[0]);
    first.focus();
    await userEvent.keyboard('{ArrowDown}');
    await waitFor(() => expect(second).toHaveFocus());
    await userEvent.keyboard('{Enter}');
    expect(open).toHaveBeenLastCalledWith(rows[1]);
    expect(first).toHaveAttribute('tabindex', '-1');
  });

  it('leaves a button inside a row its own keys', async () => {
    const open = vi.fn();
    const act = vi.fn();
    render(
      <DataTable
        label="Samples"
        rows={rows.slice(0, 1)}
        rowId={(row) => row.id}
        onRowClick={open}
        columns={[
          {
            id: 'act',
            header: 'Act',
            cell: () => <button onClick={(event) => (event.stopPropagation(), act())}>Mend</button>,
          },
        ]}
      />,
    );
    screen.getByRole('button', { name: 'Mend' }).focus();
    await userEvent.keyboard('{Enter}');
    expect(act).toHaveBeenCalledOnce();
    expect(open).not.toHaveBeenCalled();
  });

  it('shows what to do when there is nothing', () => {
    render(
      <DataTable label="Samples" rows={[]} columns={columns} rowId={(row) => row.id} empty={<p>Draw the first.</p>} />,
    );
    expect(screen.getByText('Draw the first.')).toBeInTheDocument();
    expect(screen.queryByRole('table')).toBeNull();
  });

  it('draws only the rows in sight of ten thousand, and says how many there are', () => {
    const many = Array.from({ length: 10_000 }, (_, index) => ({
      id: String(index),
      className: 'Arable',
      areaHa: index,
    }));
    render(<DataTable label="Samples" rows={many} columns={columns} rowId={(row) => row.id} />);
    expect(screen.getAllByRole('row', { hidden: true }).length).toBeLessThan(100);
    expect(screen.getByRole('table')).toHaveAttribute('aria-rowcount', '10001');
  });
});
