import { classNames } from '../../lib/class-names.ts';
import { formatNumber } from '../../lib/format.ts';
import type { ChartData } from './chart-frame.tsx';

/** A chart's figures as a plain table. */
export function ChartTable({ label, data }: { label: string; data: ChartData }) {
  return (
    <div className="max-h-96 overflow-auto">
      <table aria-label={label} className="w-full border-separate border-spacing-0 text-sm">
        <thead>
          <tr>
            {data.columns.map((column) => (
              <th
                key={column.name}
                scope="col"
                className={classNames(
                  'sticky top-0 border-b border-edge bg-card px-2 py-1 font-medium text-ink-soft',
                  column.isNumber ? 'text-right' : 'text-left',
                )}
              >
                {column.name}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {data.rows.map((row, index) => (
            <tr key={index}>
              {row.map((value, place) => {
                const column = data.columns[place];
                return (
                  <td
                    key={place}
                    className={classNames(
                      'border-b border-line px-2 py-1',
                      column?.isNumber && 'text-right whitespace-nowrap',
                    )}
                  >
                    {typeof value === 'number' ? formatNumber(value, column?.decimals ?? 0) : (value ?? '–')}
                  </td>
                );
              })}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
