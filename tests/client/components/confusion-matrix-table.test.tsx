import { render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { describe, expect, it, vi } from 'vitest';
import { ConfusionMatrixTable } from '../../../client/src/components/charts/confusion-matrix-table.tsx';
import { THIN_SPACE } from '../../../client/src/lib/format.ts';

const classes = [
  { id: 'w', name: 'Open water', colour: '#294483' },
  { id: 'p', name: 'Improved pasture', colour: '#C9DC67' },
  { id: 'a', name: 'Arable', colour: '#D18543' },
];
const matrix = [
  [74, 1, 0],
  [0, 93, 3],
  [0, 15, 84],
];
const show = (more = {}) => render(<ConfusionMatrixTable classes={classes} matrix={matrix} unit="points" {...more} />);

describe('a confusion matrix', () => {
  it('says which side is which', () => {
    show();
    expect(screen.getByText(/Rows: mapped class\. Columns: reference class\. Counts: points/)).toBeInTheDocument();
    expect(screen.getByRole('table')).toHaveAccessibleName(
      'Confusion matrix, rows mapped class, columns reference class',
    );
  });

  it('names every cell by both classes, count and share of the row', () => {
    show({ onCellClick: vi.fn() });
    expect(
      screen.getByRole('button', {
        name: `mapped Arable, reference Improved pasture: 15, 15.2${THIN_SPACE}% of the row`,
      }),
    ).toHaveTextContent('15');
  });

  it('hands a pressed cell on as mapped and reference, not the other way round', async () => {
    const press = vi.fn();
    show({ onCellClick: press });
    await userEvent.click(screen.getByRole('button', { name: /mapped Arable, reference Improved pasture/ }));
    expect(press).toHaveBeenCalledWith({ mappedIndex: 2, referenceIndex: 1 });
  });

  it('prints totals of rows and columns, unmapped units among the columns', () => {
    show({ unmapped: [2, 0, 1] });
    const rows = screen.getAllByRole('row');
    expect(within(rows[3]).getAllByRole('cell').at(-1)).toHaveTextContent('99');
    const total = within(rows.at(-1)!)
      .getAllByRole('cell')
      .map((cell) => cell.textContent);
    expect(total).toEqual(['76', '109', '88', '273']);
    expect(screen.getByRole('rowheader', { name: 'unmapped' })).toBeInTheDocument();
  });

  it('has one tab stop, and arrow keys walk the cells', async () => {
    show({ onCellClick: vi.fn() });
    const stops = screen.getAllByRole('button', { name: /^mapped/ }).filter((cell) => cell.tabIndex === 0);
    expect(stops).toHaveLength(1);
    stops[0].focus();
    await userEvent.keyboard('{ArrowDown}{ArrowDown}{ArrowRight}');
    expect(screen.getByRole('button', { name: /mapped Arable, reference Improved pasture/ })).toHaveFocus();
    await userEvent.keyboard('{End}{ArrowDown}');
    expect(screen.getByRole('button', { name: /mapped Arable, reference Arable/ })).toHaveFocus();
  });

  it('has no press and no grid where cells lead nowhere', () => {
    show();
    expect(screen.queryByRole('grid')).toBeNull();
    expect(screen.queryByRole('button', { name: /^mapped/ })).toBeNull();
  });

  it('shades a row without any units as nothing, not as NaN', () => {
    show({ matrix: [[0, 0, 0], ...matrix.slice(1)] });
    expect(document.body.innerHTML).not.toContain('NaN');
  });
});
