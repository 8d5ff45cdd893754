import { describe, expect, it } from 'vitest';
import { readCsv } from '../../server/services/read-csv.ts';

describe('readCsv', () => {
  it('reads quoted separators, doubled quotes and line breaks as RFC 4180 has them', () => {
    expect(readCsv('a,b\r\n"x, ""y""","two\nlines"\r\n3,\r\n')).toEqual([
      { line: 1, fields: ['a', 'b'] },
      { line: 2, fields: ['x, "y"', 'two\nlines'] },
      { line: 4, fields: ['3', ''] },
    ]);
  });

  it('takes the separator of the heading, and passes over a byte order mark, remarks and empty lines', () => {
    expect(readCsv('\uFEFF# made, by; hand "\nnumber;note\n\n1;a,b\n')).toEqual([
      { line: 2, fields: ['number', 'note'] },
      { line: 4, fields: ['1', 'a,b'] },
    ]);
    expect(readCsv('a\tb\n1\t2')).toEqual([
      { line: 1, fields: ['a', 'b'] },
      { line: 2, fields: ['1', '2'] },
    ]);
  });

  it('refuses a quote that is never closed', () => {
    expect(() => readCsv('a,b\n1,"x\n2,y\n')).toThrow('never closed');
  });

  it('keeps a note that has a line beginning with #', () => {
    expect(readCsv('number,note\n1,"two\n# lines"\n')[1]?.fields).toEqual(['1', 'two\n# lines']);
  });

  it('gives nothing for an empty file', () => {
    expect(readCsv('')).toEqual([]);
    expect(readCsv('\n\n')).toEqual([]);
  });
});
