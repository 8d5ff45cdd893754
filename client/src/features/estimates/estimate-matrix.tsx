import type { Estimates } from '../../../../shared/contracts/reference.ts';
import { ConfusionMatrixTable, type MatrixCell } from '../../components/charts/confusion-matrix-table.tsx';

export interface EstimateMatrixProps {
  estimates: Estimates;
  positions: ReadonlyMap<string, number>;
  cell: MatrixCell | null;
  onCell: (cell: MatrixCell) => void;
}

/** Counts of reference points: rows are the mapped class, columns the reference class. */
export function EstimateMatrix({ estimates, positions, cell, onCell }: EstimateMatrixProps) {
  const { columns, counts, rows } = estimates;
  const classes = columns.map(({ id, name, colour }) => ({ id, name, colour, position: positions.get(id) ?? 0 }));
  // What the map leaves unclassified is a row of its own below the classes.
  const unmapped = rows.findIndex(({ classId }) => classId === null);
  const matrix = columns.map(({ id }) => counts[rows.findIndex(({ classId }) => classId === id)] ?? []);
  return (
    <ConfusionMatrixTable
      classes={classes}
      matrix={matrix}
      {...(unmapped >= 0 && { unmapped: counts[unmapped] ?? [] })}
      unit="reference points"
      selected={cell}
      onCellClick={onCell}
      fileName="confusion matrix of reference points"
    />
  );
}
