export type CsvValue = string | number | null | undefined;

/**
 * Rows as CSV (RFC 4180: CRLF, doubled quotes), with a byte-order mark so that spreadsheets read it as UTF-8.
 * Text that a spreadsheet would run as a formula gets a leading apostrophe.
 *
 * @param header column names
 * @param rows one array a row, in the header's order; null and undefined print as nothing
 */
export function toCsv(header: readonly string[], rows: readonly (readonly CsvValue[])[]): string {
  return `\uFEFF${[header, ...rows].map((row) => `${row.map(cell).join(',')}\r\n`).join('')}`;
}

function cell(value: CsvValue): string {
  if (value === null || value === undefined) return '';
  if (typeof value === 'number') return String(value);
  const safe = /^[=+\-@\t\r]/.test(value) ? `'${value}` : value;
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}
