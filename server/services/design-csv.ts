import { stringify } from 'csv-stringify/sync';
import type { DesignFigure, Estimates } from '../../shared/contracts/reference.ts';
import type { ReferenceDesign } from '../entities/reference-design.ts';
import type { AnsweredPoint } from './design-settle.ts';

type Cell = string | number | null;

function table(rows: Cell[][]): string {
  return stringify(rows, { escape_formulas: true });
}

/** A figure as a row: what, of which class, its numbers, and how it was computed. */
function toRow(figure: string, className: string, { how, cautious, ...of }: DesignFigure): Cell[] {
  return [
    ...[figure, className, of.value, of.standardError, of.low, of.high, cautious?.low ?? null, cautious?.high ?? null],
    ...[of.n, of.isFragile ? 'yes' : 'no', how.formula, how.source],
    how.inputs.map(({ name, value }) => `${name}: ${value ?? 'undefined'}`).join(' | '),
  ];
}

/** All figures of a design as CSV, one a row with formula, source and inputs; then strata, matrices and cautions. */
export function writeEstimatesCsv(estimates: Estimates): string {
  const { design, rows, columns, perClass, eitherLabel } = estimates;
  const nameOf = new Map(columns.map(({ id, name }) => [id, name]));
  const matrix = (cells: readonly (readonly number[])[]): Cell[][] => [
    ['mapped \\ reference', ...columns.map(({ name }) => name)],
    ...cells.map((row, i) => [rows[i]?.name ?? '', ...row]),
  ];
  return [
    table(
      [
        [
          ...['figure', 'class', 'value', 'standard error', '95 % low', '95 % high', 'cautious low', 'cautious high'],
          ...['points', 'few points', 'formula', 'source', 'inputs'],
        ],
        toRow('overall accuracy', '', estimates.overall),
        toRow('kappa', '', estimates.kappa),
        toRow('quantity disagreement', '', estimates.quantityDisagreement),
        toRow('allocation disagreement', '', estimates.allocationDisagreement),
        ...perClass.flatMap((row) => [
          toRow('user’s accuracy', row.name, row.users),
          toRow('producer’s accuracy', row.name, row.producers),
          toRow('F1', row.name, row.f1),
          toRow('area share', row.name, row.areaShare),
          toRow('area, ha', row.name, row.areaHa),
          ['mapped area, ha', row.name, row.mappedAreaHa],
          ['estimated less mapped area, ha', row.name, row.differenceHa],
        ]),
        toRow('overall accuracy, either label', '', eitherLabel.overall),
        ...eitherLabel.perClass.flatMap(({ classId, users, producers }) => [
          toRow('user’s accuracy, either label', nameOf.get(classId) ?? '', users),
          toRow('producer’s accuracy, either label', nameOf.get(classId) ?? '', producers),
        ]),
      ].map((row) => [...row, ...new Array<Cell>(13 - row.length).fill(null)]),
    ),
    '\n',
    table([
      ['stratum', 'code', 'pixels', 'area, ha', 'weight', 'points drawn', 'points used'],
      ...design.strata.map(({ name, code, pixels, areaHa, weight, drawn, used }) => [
        ...[name, code, pixels, areaHa, weight, drawn, used],
      ]),
    ]),
    '\n',
    table([['Points counted: rows are the mapped class, columns the reference class']]),
    table(matrix(estimates.counts)),
    '\n',
    table([['Estimated shares of the area: rows are the mapped class, columns the reference class']]),
    estimates.proportions ? table(matrix(estimates.proportions)) : table([[estimates.problem]]),
    '\n',
    table([['SHA-256 of the design', estimates.digest], ['seed', design.seed], [estimates.kappa.caution]].map(pad)),
    table(estimates.cautions.map((caution) => [caution])),
  ].join('');
}

function pad(row: Cell[]): Cell[] {
  return [row[0] ?? null, row[1] ?? null];
}

/**
 * The points as CSV. Before the design is closed it is an answer sheet: where the points are, and empty columns, in the
 * order of their random numbers; afterwards it holds what the map and the interpreters say.
 */
export function writePointsCsv(design: ReferenceDesign, points: readonly AnsweredPoint[]): string {
  if (design.state !== 'closed') {
    return table([
      ['number', 'lon', 'lat', 'class_code', 'alternate_code', 'confidence', 'note'],
      ...points.map(({ point: { number, lon, lat } }): Cell[] => [number, lon, lat, '', '', '', '']),
    ]);
  }
  const codeOf = new Map(design.classes.map(({ id, code }) => [id, code]));
  const nameOf = new Map(design.classes.map(({ id, name }) => [id, name]));
  const people = [
    ...new Map(points.flatMap(({ answers }) => answers).map(({ userId, user }) => [userId, user])).entries(),
  ];
  const code = (id: string | null | undefined): Cell => (id ? (codeOf.get(id) ?? null) : null);
  return table([
    [
      ...['number', 'lon', 'lat', 'stratum', 'mapped_code', 'class_code', 'class', 'alternate_code', 'settled_by'],
      ...people.flatMap(([, user], i) => {
        const who = user?.name ?? `interpreter ${i + 1}`;
        return [`${who}: class_code`, `${who}: alternate_code`, `${who}: confidence`, `${who}: note`];
      }),
      ...['decided by', 'decision note'],
    ],
    ...points.map(({ point, answers, settled }): Cell[] => [
      ...[point.number, point.lon, point.lat, design.strata[point.stratum]?.name ?? '', point.mappedCode],
      ...[code(settled?.classId), settled ? (nameOf.get(settled.classId) ?? null) : null],
      ...[code(settled?.alternateClassIds[0]), settled?.by ?? 'unsettled'],
      ...people.flatMap(([userId]): Cell[] => {
        const answer = answers.find((given) => given.userId === userId);
        return answer
          ? [code(answer.classId), code(answer.alternateClassId), answer.confidence, answer.note]
          : [null, null, null, null];
      }),
      ...[point.decidedBy?.name ?? null, point.decisionNote],
    ]),
  ]);
}
