import { describe, expect, it } from 'vitest';
import { DemoError } from '../../docs/examples/orchard/DemoError.js';
import { readCsv } from '../../docs/examples/orchard/readCsv.js';

const names = ['a', 'b', 'c'];
const good = Array.from({ length: 50 }, (_, i) => [`${i}`, `${i / 4}`, `-${i}e-1`]);

/** A file of fifty rows with some of its cells changed; row 2 is the first below the header. */
function file(change: (rows: string[][]) => void = () => {}, header = names): string {
  const rows = good.map((row) => [...row]);
  change(rows);
  return [header, ...rows].map((row) => `${row.join(',')}\n`).join('');
}

const put = (row: number, at: number, cell: string) => file((rows) => rows[row - 2]!.splice(at, 1, cell));

function complaint(text: string, ignore?: string[]): string {
  try {
    readCsv(text, 'my.csv', ignore);
  } catch (error) {
    expect(error).toBeInstanceOf(DemoError);
    return (error as Error).message;
  }
  return 'none';
}

describe('a file that cannot be used is refused in one line', () => {
  it.each([
    ['text', put(5, 1, 'wet'), 'row 5, column 2 (b): must be a finite number; got "wet"'],
    ['NaN', put(5, 1, 'NaN'), 'row 5, column 2 (b): must be a finite number; got "NaN"'],
    [
      'an infinity',
      put(51, 0, '-Infinity'),
      'row 51, column 1 (a): must be a finite number; got "-Infinity"',
    ],
    ['more than 32 bits hold', put(2, 2, '1e39'), 'row 2, column 3 (c): must be a finite number; got "1e39"'],
    ['a hexadecimal', put(2, 2, '0x10'), 'row 2, column 3 (c): must be a finite number; got "0x10"'],
    ['a decimal comma', put(4, 0, '"3,5"'), 'row 4, column 1 (a): must be a finite number; got "3,5"'],
    [
      'a long text',
      put(4, 0, 'x'.repeat(99)),
      `row 4, column 1 (a): must be a finite number; got "${'x'.repeat(24)}…"`,
    ],
    ['a blank cell', put(3, 2, ''), 'row 3, column 3 (c): must be a number; got a blank cell'],
    ['a cell of blanks', put(3, 2, '  '), 'row 3, column 3 (c): must be a number; got a blank cell'],
    [
      'a short row',
      file((rows) => rows[5]!.pop()),
      'row 7, column 3 (c): must have 3 cells like the header; got 2, so this one is missing',
    ],
    [
      'a long row',
      file((rows) => rows[5]!.push('1')),
      'row 7, column 4: must have 3 cells like the header; got 4, so this one has no name',
    ],
    [
      'a quote left open',
      put(6, 1, '"2'),
      'row 6, column 2: must have quotes around whole cells only; got one that is never closed',
    ],
    [
      'a quote left open in the header',
      file(undefined, ['"a', 'b', 'c']),
      'row 1, column 1: must have quotes around whole cells only; got one that is never closed',
    ],
    [
      'a quote in a cell',
      put(6, 1, '2"3"'),
      'row 6, column 2: must have quotes around whole cells only; got one inside a cell',
    ],
    [
      'a nameless column',
      file(undefined, ['a', ' ', 'c']),
      'row 1, column 2: the header must name every column; got a blank cell',
    ],
    [
      'a name twice',
      file(undefined, ['a', 'b', 'a']),
      'row 1, column 3: names must be unique; "a" is column 1, too',
    ],
    [
      'no header',
      file(undefined, ['0.3', '0.7', '0.5']),
      'row 1, column 1: must begin a header of names; got numbers in all columns; add a header',
    ],
  ])('%s', (_, text, expected) => {
    expect(complaint(text)).toBe(`my.csv: ${expected}`);
  });

  it.each([
    ['nothing', '', 'must hold a header and rows of numbers; got an empty file'],
    ['blank lines', '\n\n', 'must hold a header and rows of numbers; got an empty file'],
    ['the header only', 'a,b,c\n', 'must hold rows of numbers below the header; got the header only'],
    ['too few rows', file((rows) => rows.pop()), 'must hold at least 50 rows below the header; got 49'],
    ['binary data', 'PK\u0003\u0004\0\0', 'must be a CSV text file; got binary data'],
  ])('%s', (_, text, expected) => {
    expect(complaint(text)).toBe(`my.csv: ${expected}`);
  });

  it('a column to ignore that is not there', () => {
    expect(complaint(file(), ['d'])).toBe('my.csv: --ignore must name columns of the header; it has no "d"');
  });

  it('counts rows as a spreadsheet does, blank lines included', () => {
    const text = put(5, 1, 'wet').replace('\n2,', '\n\n\n2,');
    expect(complaint(text)).toContain('row 7, column 2 (b)');
  });
});

describe('a file that can be used', () => {
  const expected = good.map((row) => row.map(Number));
  const rowsOf = (text: string, ignore?: string[]) =>
    readCsv(text, 'my.csv', ignore).rows.map((row) => [...row]);

  it.each([
    ['commas', file()],
    ['semicolons', file().replaceAll(',', ';')],
    ['tabs', file().replaceAll(',', '\t')],
    ['quotes', file().replace(/[^,\n]+/g, '"$&"')],
    ['carriage returns', file().replaceAll('\n', '\r\n')],
    ['a byte order mark', `\uFEFF${file()}`],
    ['no last line end', file().trimEnd()],
  ])('is read with %s', (_, text) => {
    expect(readCsv(text, 'my.csv').names).toEqual(names);
    expect(rowsOf(text)).toEqual(expected);
    expect(readCsv(text, 'my.csv').numbers).toEqual(expected.map((_, i) => i + 2));
  });

  it('may be headed by wavelengths', () => {
    expect(readCsv(file(undefined, ['700', '710', '720']), 'my.csv').names).toEqual(['700', '710', '720']);
  });

  it('may hold anything in ignored columns, and keeps the places of the others', () => {
    const table = readCsv(put(5, 1, 'wet'), 'my.csv', ['b']);
    expect(table.names).toEqual(['a', 'c']);
    expect(table.places).toEqual(['column 1 (a)', 'column 3 (c)']);
    expect(table.rows.map((row) => [...row])).toEqual(expected.map(([a, , c]) => [a, c]));
  });
});
