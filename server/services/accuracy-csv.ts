import { stringify } from 'csv-stringify/sync';
import type { Accuracy, Estimate } from '../../shared/contracts/accuracy.ts';
import type { Run } from '../entities/run.ts';

type Cell = string | number | null;

/**
 * A line that spreadsheets and readers of CSV alike take as a remark. Spreadsheets split it at commas all the same, so a name in it must
 * not start a formula behind one.
 */
function remark(text: string): string {
  const line = text.replace(/\s+/g, ' ').trim();
  return `# ${line.replace(/([,;]\s*"?\s*)(?=[=+@-])/g, "$1'")}\n`;
}

function table(rows: Cell[][]): string {
  return stringify(rows, { escape_formulas: true });
}

const cells = ({ value, low, high }: Estimate): Cell[] => [value, low, high];

/** The accuracy of a run as CSV: confusion matrix, figures of each class, overall figures, and how they were obtained. */
export function writeAccuracyCsv(run: Run, projectName: string, accuracy: Accuracy): string {
  const { classes, matrix, unit, unmapped, perClass, overall, kappa } = accuracy;
  const names = classes.map(({ name }) => name);
  const columnTotals = perClass.map(({ referenceCount }) => referenceCount);
  return [
    remark(`Accuracy of run ${run.number}${run.name ? ` (${run.name})` : ''}, ${projectName}`),
    remark(`Counted by ${unit}: ${accuracy.total} in ${accuracy.polygonCount} held-out polygons.`),
    remark('Confusion matrix: rows are the mapped class, columns the reference class.'),
    table([
      ['mapped \\ reference', ...names, 'total'],
      ...matrix.map((row, i) => [names[i] ?? '', ...row, perClass[i]?.mappedCount ?? 0]),
      ['total', ...columnTotals, accuracy.total],
      ['not mapped (in no figure)', ...unmapped, unmapped.reduce((sum, n) => sum + n, 0)],
    ]),
    '\n',
    remark('Figures of each class, 95 % intervals; an empty field is a figure that cannot be computed.'),
    table([
      [
        ...['class', 'code', 'mapped', 'reference', 'correct', 'held-out polygons'],
        ...['user’s accuracy', 'user’s low', 'user’s high'],
        ...['producer’s accuracy', 'producer’s low', 'producer’s high', 'F1', 'warning'],
      ],
      ...perClass.map((row, i): Cell[] => [
        ...[names[i] ?? '', classes[i]?.code ?? null],
        ...[row.mappedCount, row.referenceCount, row.correctCount, row.heldOutPolygons],
        ...[...cells(row.users), ...cells(row.producers), row.f1, row.warning],
      ]),
    ]),
    '\n',
    remark('Overall figures'),
    table([
      ['figure', 'value', '95 % low', '95 % high', 'standard error'],
      ['overall accuracy', ...cells(overall), null],
      ['kappa', ...cells(kappa), kappa.standardError],
      ['quantity disagreement', accuracy.quantityDisagreement, null, null, null],
      ['allocation disagreement', accuracy.allocationDisagreement, null, null, null],
    ]),
    '\n',
    remark(`How: ${overall.method}`),
    remark(kappa.caution),
    remark('Quantity and allocation disagreement are shares of the matrix’s own total (Pontius & Millones 2011).'),
    ...accuracy.cautions.map(remark),
  ].join('');
}
