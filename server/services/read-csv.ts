/** A record of a CSV file with the line it begins on, from 1. */
export interface CsvRecord {
  line: number;
  fields: string[];
}

/**
 * Reads CSV as RFC 4180 has it: fields in quotes may hold separators, line breaks and doubled quotes; empty lines and
 * lines that begin with # are passed over. The separator is the one of comma, semicolon and tab that the first record has
 * most of.
 * @throws RangeError naming the line on which a quote is opened and never closed
 */
export function readCsv(text: string): CsvRecord[] {
  const source = text.replace(/^\uFEFF/, '');
  const first = source.split(/\r?\n/).find((line) => line.trim() !== '' && !line.startsWith('#')) ?? '';
  const count = (separator: string) => first.split(separator).length;
  const separator = [',', ';', '\t'].toSorted((a, b) => count(b) - count(a))[0] ?? ',';
  const records: CsvRecord[] = [];
  let [at, line] = [0, 1];
  while (at < source.length) {
    const start = line;
    const fields: string[] = [];
    const isRemark = source[at] === '#';
    for (;;) {
      let field = '';
      if (!isRemark && source[at] === '"') {
        at++;
        for (;;) {
          if (at >= source.length) throw new RangeError(`The quote opened on line ${start} is never closed.`);
          const char = source[at++] ?? '';
          if (char === '\n') line++;
          if (char !== '"') field += char;
          else if (source[at] === '"') {
            field += '"';
            at++;
          } else break;
        }
      }
      while (at < source.length && source[at] !== '\n' && (isRemark || source[at] !== separator)) {
        if (source[at] !== '\r') field += source[at];
        at++;
      }
      fields.push(field.trim());
      if (at >= source.length || source[at] === '\n') break;
      at++;
    }
    at++;
    line++;
    if (!isRemark && fields.some((field) => field !== '')) records.push({ line: start, fields });
  }
  return records;
}
