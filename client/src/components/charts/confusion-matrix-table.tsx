import { sum } from 'd3-array';
import { type KeyboardEvent, type ReactNode, useRef, useState } from 'react';
import { classNames } from '../../lib/class-names.ts';
import { formatNumber, formatPercent } from '../../lib/format.ts';
import { ClassSwatch } from '../ui/class-swatch.tsx';
import { ChartFrame } from './chart-frame.tsx';
import { ConfusionMatrixSvg } from './confusion-matrix-svg.tsx';
import { matrixBackground, matrixShade } from './matrix-shading.ts';

export interface MatrixClass {
  id: string;
  name: string;
  /** For the column's head, when the name is long: "broadleaf". Full names stand upright otherwise. */
  shortName?: string;
  colour: string;
  /** Place in the scheme, for its pattern; the place in the matrix otherwise. */
  position?: number;
}

export interface MatrixCell {
  mappedIndex: number;
  referenceIndex: number;
}

export interface ConfusionMatrixTableProps {
  title?: string;
  note?: ReactNode;
  classes: readonly MatrixClass[];
  /** matrix[mapped][reference]. */
  matrix: readonly (readonly number[])[];
  /** Reference units the map left without a class, by reference class: printed as a last row. */
  unmapped?: readonly number[];
  /** What is counted: "pixels", "points". */
  unit: string;
  onCellClick?: (cell: MatrixCell) => void;
  selected?: MatrixCell | null;
  /** Name of the saved files. */
  fileName?: string;
}

/** Rows are the mapped class, columns the reference class; every count printed, shaded by its share of the row. */
export function ConfusionMatrixTable({
  title = 'Confusion matrix',
  note,
  classes,
  matrix,
  unmapped,
  unit,
  onCellClick,
  selected = null,
  fileName,
}: ConfusionMatrixTableProps) {
  const [focus, setFocus] = useState<MatrixCell>({ mappedIndex: 0, referenceIndex: 0 });
  const bodyRef = useRef<HTMLTableSectionElement>(null);
  // Names too long for a column's width are set upright rather than broken.
  const isUpright = classes.some((one) => (one.shortName ?? one.name).split(' ').some((word) => word.length > 7));
  const rowTotals = matrix.map((row) => sum(row));
  const hasUnmapped = unmapped !== undefined && unmapped.some((count) => count > 0);
  const columnTotals = classes.map(
    (_, column) => sum(matrix, (row) => row[column]) + (hasUnmapped ? unmapped[column]! : 0),
  );

  const move = (event: KeyboardEvent) => {
    const step = STEPS[event.key];
    if (!step) return;
    event.preventDefault();
    const last = classes.length - 1;
    const next = {
      mappedIndex: clamp(focus.mappedIndex + step.row, last),
      referenceIndex: clamp(focus.referenceIndex + step.column, last),
    };
    setFocus(next);
    bodyRef.current?.querySelector<HTMLElement>(`[data-cell="${next.mappedIndex}-${next.referenceIndex}"]`)?.focus();
  };

  return (
    <ChartFrame
      title={title}
      isTable
      {...(fileName && { fileName })}
      note={
        <>
          Rows: mapped class. Columns: reference class. Counts: {unit}. Shading: share of the row.
          {onCellClick && ' Select a cell to see its places.'}
          {note && <> {note}</>}
        </>
      }
      data={{
        columns: [
          { name: 'mapped \\ reference' },
          ...classes.map((one) => ({ name: one.name, isNumber: true })),
          { name: 'total', isNumber: true },
        ],
        rows: [
          ...matrix.map((row, index) => [classes[index]?.name, ...row, rowTotals[index]]),
          ...(hasUnmapped ? [['unmapped', ...unmapped, sum(unmapped)]] : []),
          ['total', ...columnTotals, sum(columnTotals)],
        ],
      }}
      svg={<ConfusionMatrixSvg classes={classes} matrix={matrix} />}
    >
      <div className="overflow-x-auto pb-1">
        <table
          role={onCellClick ? 'grid' : undefined}
          aria-label={`${title}, rows mapped class, columns reference class`}
          className="border-separate border-spacing-0.5 text-sm"
        >
          <thead>
            <tr>
              <td />
              {classes.map((one) => (
                <th
                  key={one.id}
                  scope="col"
                  aria-label={one.name}
                  title={one.name}
                  className="px-0.5 pb-1.5 text-center align-bottom text-2xs leading-tight font-medium text-ink-soft"
                >
                  {isUpright ? (
                    <span className="inline-block max-h-36 rotate-180 truncate text-left [writing-mode:vertical-rl]">
                      {one.shortName ?? one.name}
                    </span>
                  ) : (
                    (one.shortName ?? one.name)
                  )}
                </th>
              ))}
              <th scope="col" className="px-1 pb-1 align-bottom text-2xs font-medium text-ink-soft">
                total
              </th>
            </tr>
          </thead>
          <tbody ref={bodyRef}>
            {matrix.map((row, mappedIndex) => (
              <tr key={classes[mappedIndex]?.id}>
                <th scope="row" className="max-w-44 py-1 pr-2 text-left font-medium text-ink-soft">
                  <span className="flex items-center gap-2 leading-tight">
                    <ClassSwatch
                      size="sm"
                      colour={classes[mappedIndex]!.colour}
                      position={classes[mappedIndex]!.position ?? mappedIndex}
                    />
                    {classes[mappedIndex]?.name}
                  </span>
                </th>
                {row.map((count, referenceIndex) => (
                  <Cell
                    key={classes[referenceIndex]?.id}
                    count={count}
                    rowTotal={rowTotals[mappedIndex]!}
                    mapped={classes[mappedIndex]!.name}
                    reference={classes[referenceIndex]!.name}
                    place={{ mappedIndex, referenceIndex }}
                    isTabStop={focus.mappedIndex === mappedIndex && focus.referenceIndex === referenceIndex}
                    isSelected={selected?.mappedIndex === mappedIndex && selected.referenceIndex === referenceIndex}
                    onMove={move}
                    onPress={
                      onCellClick &&
                      ((cell) => {
                        setFocus(cell);
                        onCellClick(cell);
                      })
                    }
                  />
                ))}
                <td className="px-1.5 text-right text-ink-soft">{formatNumber(rowTotals[mappedIndex])}</td>
              </tr>
            ))}
          </tbody>
          <tfoot className="text-ink-soft">
            {hasUnmapped && (
              <tr>
                <th scope="row" className="py-1 pr-2 text-left font-medium">
                  unmapped
                </th>
                {unmapped.map((count, index) => (
                  <td key={classes[index]?.id} className="px-1 text-center">
                    {formatNumber(count)}
                  </td>
                ))}
                <td className="px-1.5 text-right">{formatNumber(sum(unmapped))}</td>
              </tr>
            )}
            <tr>
              <th scope="row" className="py-1 pr-2 text-left text-2xs font-medium">
                total
              </th>
              {columnTotals.map((total, index) => (
                <td key={classes[index]?.id} className="px-1 text-center">
                  {formatNumber(total)}
                </td>
              ))}
              <td className="px-1.5 text-right font-medium text-ink">{formatNumber(sum(columnTotals))}</td>
            </tr>
          </tfoot>
        </table>
      </div>
    </ChartFrame>
  );
}

const STEPS: Record<string, { row: number; column: number }> = {
  ArrowUp: { row: -1, column: 0 },
  ArrowDown: { row: 1, column: 0 },
  ArrowLeft: { row: 0, column: -1 },
  ArrowRight: { row: 0, column: 1 },
  Home: { row: 0, column: -Infinity },
  End: { row: 0, column: Infinity },
};

function clamp(value: number, last: number): number {
  return Math.min(last, Math.max(0, value));
}

interface CellProps {
  count: number;
  rowTotal: number;
  mapped: string;
  reference: string;
  place: MatrixCell;
  isTabStop: boolean;
  isSelected: boolean;
  onMove: (event: KeyboardEvent) => void;
  onPress: ((cell: MatrixCell) => void) | undefined;
}

function Cell({ count, rowTotal, mapped, reference, place, isTabStop, isSelected, onMove, onPress }: CellProps) {
  const isDiagonal = place.mappedIndex === place.referenceIndex;
  const share = rowTotal > 0 ? count / rowTotal : 0;
  const name = `mapped ${mapped}, reference ${reference}: ${formatNumber(count)}, ${formatPercent(share, 1)} of the row`;
  const style =
    count > 0 || isDiagonal
      ? { background: matrixBackground(share, isDiagonal), color: matrixShade(share, isDiagonal).text }
      : { background: 'var(--sunken)', color: 'var(--ink-soft)' };
  const look = classNames(
    'flex h-[30px] w-full min-w-10 items-center justify-center px-1',
    isDiagonal && 'font-semibold shadow-[inset_0_0_0_1.5px_var(--ink)]',
    isSelected && 'shadow-[inset_0_0_0_2px_var(--ink),inset_0_0_0_5px_var(--groundsel)]',
  );
  return (
    <td className="p-0" aria-selected={onPress ? isSelected : undefined}>
      {onPress ? (
        <button
          type="button"
          data-cell={`${place.mappedIndex}-${place.referenceIndex}`}
          aria-label={name}
          tabIndex={isTabStop ? 0 : -1}
          onClick={() => onPress(place)}
          onKeyDown={onMove}
          style={style}
          className={classNames('focus-inset', look)}
        >
          {formatNumber(count)}
        </button>
      ) : (
        <span title={name} style={style} className={look}>
          {formatNumber(count)}
        </span>
      )}
    </td>
  );
}
