import { sum } from 'd3-array';
import { formatNumber } from '../../lib/format.ts';
import type { MatrixClass } from './confusion-matrix-table.tsx';
import { matrixBackground, matrixShade } from './matrix-shading.ts';

const CELL = { width: 46, height: 28 };
const LABEL_WIDTH = 150;
const HEAD_HEIGHT = 96;

/** The confusion matrix as one drawing, for saving. */
export function ConfusionMatrixSvg({
  classes,
  matrix,
}: {
  classes: readonly MatrixClass[];
  matrix: readonly (readonly number[])[];
}) {
  const width = LABEL_WIDTH + (classes.length + 1) * CELL.width + 40;
  const height = HEAD_HEIGHT + classes.length * CELL.height + 34;
  return (
    <svg viewBox={`0 0 ${width} ${height}`} fontSize="12" fontFamily="'Work Sans', sans-serif">
      {classes.map((one, column) => (
        <text
          key={one.id}
          transform={`translate(${LABEL_WIDTH + (column + 0.5) * CELL.width} ${HEAD_HEIGHT - 8}) rotate(-40)`}
          fill="var(--ink-soft)"
        >
          {one.name}
        </text>
      ))}
      {matrix.map((row, mapped) => {
        const total = sum(row);
        const y = HEAD_HEIGHT + mapped * CELL.height;
        return (
          <g key={classes[mapped]?.id}>
            <text x={LABEL_WIDTH - 8} y={y + 18} textAnchor="end" fill="var(--ink)">
              {classes[mapped]?.name}
            </text>
            {row.map((count, reference) => {
              const isDiagonal = mapped === reference;
              const share = total > 0 ? count / total : 0;
              const x = LABEL_WIDTH + reference * CELL.width;
              const isShaded = count > 0 || isDiagonal;
              return (
                <g key={classes[reference]?.id}>
                  <rect
                    x={x + 1}
                    y={y + 1}
                    width={CELL.width - 2}
                    height={CELL.height - 2}
                    style={{ fill: isShaded ? matrixBackground(share, isDiagonal) : 'var(--sunken)' }}
                  />
                  <text
                    x={x + CELL.width / 2}
                    y={y + 18}
                    textAnchor="middle"
                    fontWeight={isDiagonal ? 600 : 400}
                    style={{ fill: isShaded ? matrixShade(share, isDiagonal).text : 'var(--ink-soft)' }}
                  >
                    {formatNumber(count)}
                  </text>
                </g>
              );
            })}
            <text
              x={LABEL_WIDTH + (classes.length + 0.9) * CELL.width}
              y={y + 18}
              textAnchor="end"
              fill="var(--ink-soft)"
            >
              {formatNumber(total)}
            </text>
          </g>
        );
      })}
      <text x={LABEL_WIDTH} y={height - 10} fill="var(--ink-soft)">
        Rows: mapped class. Columns: reference class. Shading: share of the row.
      </text>
    </svg>
  );
}
