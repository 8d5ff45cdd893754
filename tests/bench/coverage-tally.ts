import type { Interval } from '../../server/analysis/accuracy/interval.ts';

export interface CoverageRow {
  figure: string;
  method: string;
  /** Designs that gave an interval. */
  nIntervals: number;
  /** Designs that gave none (undefined, no spread, too few units). */
  nNone: number;
  /** Share of the intervals that hold the true value; NaN without any. */
  coverage: number;
  /** Share of the intervals lying wholly below and wholly above the true value. */
  below: number;
  above: number;
  meanWidth: number;
}

/** Counts how often intervals hold the true value. */
export function createTally(): {
  add(figure: string, method: string, truth: number, interval: Interval | null): void;
  rows(): CoverageRow[];
} {
  const rows = new Map<string, { figure: string; method: string; n: number; none: number; below: number; above: number; width: number }>(); // prettier-ignore
  return {
    add(figure, method, truth, interval) {
      const key = `${figure}|${method}`;
      const row = rows.get(key) ?? { figure, method, n: 0, none: 0, below: 0, above: 0, width: 0 };
      rows.set(key, row);
      if (!interval) {
        row.none++;
        return;
      }
      row.n++;
      row.width += interval.high - interval.low;
      // Rounding must not turn an end of exactly 0 or 1 into a miss.
      if (interval.high < truth - 1e-12) row.below++;
      if (interval.low > truth + 1e-12) row.above++;
    },
    rows: () =>
      [...rows.values()].map(({ figure, method, n, none, below, above, width }) => ({
        figure,
        method,
        nIntervals: n,
        nNone: none,
        coverage: (n - below - above) / n,
        below: below / n,
        above: above / n,
        meanWidth: width / n,
      })),
  };
}

/** Prints rows, a line each. */
export function printCoverage(title: string, rows: readonly CoverageRow[]): void {
  console.log(`\n${title}`);
  let figure = '';
  for (const row of rows) {
    if (row.figure !== figure) console.log(`  ${(figure = row.figure)}`);
    const percent = (share: number): string => `${(100 * share).toFixed(1)} %`.padStart(7);
    console.log(
      `    ${row.method.padEnd(38)} ${percent(row.coverage)}  too low ${percent(row.below)}  too high ${percent(row.above)}` +
        `  width ${row.meanWidth.toFixed(4)}${row.nNone > 0 ? `  none ${row.nNone}` : ''}`,
    );
  }
}
