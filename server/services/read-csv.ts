import { CsvError, parse } from 'csv-parse/sync';

/** A record of a table with the line (or feature) it begins on, from 1. */
export interface TableRecord {
  line: number;
  fields: string[];
}

interface RawRecord {
  record: string[];
  info: { lines: number };
}

/**
 * Reads CSV; the separator is the one of comma, semicolon and tab that the first record has most of. Empty lines and lines that
 * begin with # are passed over.
 * @throws RangeError when a quote is opened and never closed
 */
export function readCsv(text: string): TableRecord[] {
  const source = text.replace(/^\uFEFF/, '');
  const first = source.split(/\r?\n/).find((line) => line.trim() !== '' && !line.startsWith('#')) ?? '';
  const count = (separator: string) => first.split(separator).length;
  const delimiter = [',', ';', '\t'].toSorted((a, b) => count(b) - count(a))[0] ?? ',';
  try {
    const records = parse(source, {
      ...{ delimiter, trim: true, relax_column_count: true, relax_quotes: true, skip_empty_lines: true },
      ...{ comment: '#', comment_no_infix: true, info: true },
    }) as unknown as RawRecord[];
    return records
      .map(({ record, info }) => ({
        // The parser counts lines at a record's end.
        line: info.lines - (record.join('').match(/\n/g)?.length ?? 0),
        fields: record,
      }))
      .filter(({ fields }) => fields.some((field) => field !== ''));
  } catch (error) {
    if (!(error instanceof CsvError)) throw error;
    throw new RangeError(
      error.code === 'CSV_QUOTE_NOT_CLOSED' ? 'a quote is opened that is never closed' : error.message,
    );
  }
}
