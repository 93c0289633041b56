import { CsvError, type Info, parse } from 'csv-parse/sync';
import { DemoError } from './DemoError.js';

/** A table of finite numbers. */
export interface Table {
  readonly names: readonly string[];
  /** Where each column stands in the file: its number, counted from 1, and its name. */
  readonly places: readonly string[];
  /** One row per line below the header, as long as `names`. */
  readonly rows: readonly Float64Array[];
  /** The number of each row in the file, the header's being 1, as a spreadsheet counts them. */
  readonly numbers: readonly number[];
}

/** Fewer rows than this teach nothing and leave too few to hold out. */
const fewestRows = 50;

interface Record {
  readonly cells: string[];
  /** Its number in the file. */
  readonly row: number;
}

const decimal = /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i;

/**
 * Reads a table of numbers from a CSV text: a header, then rows of as many cells. Commas, semicolons or tabs,
 * quotes where needed. Every complaint names the file, the row and, where there is one, the column.
 *
 * @param ignore - columns to leave out, whatever they hold
 */
export function readCsv(text: string, file: string, ignore: readonly string[] = []): Table {
  const [header, ...body] = split(text, file);
  if (!header) throw new DemoError(`${file}: must hold a header and rows of numbers; got an empty file`);
  const names = header.cells.map((cell) => cell.trim());
  requireHeader(file, header.row, names);
  const missing = ignore.find((name) => !names.includes(name));
  if (missing !== undefined) {
    throw new DemoError(`${file}: --ignore must name columns of the header; it has no "${missing}"`);
  }
  if (body.length === 0) {
    throw new DemoError(`${file}: must hold rows of numbers below the header; got the header only`);
  }
  const kept = names.flatMap((name, at) => (ignore.includes(name) ? [] : [at]));
  const rows = body.map(({ cells, row }) => {
    requireWidth(file, row, cells, names);
    return Float64Array.from(kept, (at) =>
      readNumber(`${file}: row ${row}, ${column(names, at)}`, cells[at]!),
    );
  });
  if (rows.length < fewestRows) {
    throw new DemoError(
      `${file}: must hold at least ${fewestRows} rows below the header; got ${rows.length}`,
    );
  }
  return {
    names: kept.map((at) => names[at]!),
    places: kept.map((at) => column(names, at)),
    rows,
    numbers: body.map(({ row }) => row),
  };
}

function column(names: readonly string[], at: number): string {
  return `column ${at + 1} (${names[at]})`;
}

function split(text: string, file: string): Record[] {
  if (text.includes('\0')) throw new DemoError(`${file}: must be a CSV text file; got binary data`);
  const [first = ''] = text.trimStart().split(/\r?\n/, 1);
  const count = (mark: string) => first.split(mark).length;
  const delimiter = [',', ';', '\t'].reduce((best, mark) => (count(mark) > count(best) ? mark : best));
  const options = {
    bom: true,
    delimiter,
    info: true,
    relax_column_count: true,
    skip_empty_lines: true,
  } as const;
  const records = (to: number) =>
    (parse(text, { ...options, to }) as unknown as { record: string[]; info: Info }[]).map(
      ({ record, info }) => ({ cells: record, row: info.lines }),
    );
  try {
    return records(-1);
  } catch (error) {
    if (!(error instanceof CsvError)) throw error;
    const { code, lines, column: at, records: before } = error as CsvError & Info & { column: number };
    const open = code === 'CSV_QUOTE_NOT_CLOSED';
    // The parser finds that out at the end of the file only.
    const row = open ? ((before > 0 ? records(before).at(-1)?.row : 0) ?? 0) + 1 : lines;
    throw new DemoError(
      `${file}: row ${row}, column ${at + 1}: must have quotes around whole cells only; got ${open ? 'one that is never closed' : 'one inside a cell'}`,
    );
  }
}

function requireNames(file: string, row: number, names: readonly string[]): void {
  for (const [at, name] of names.entries()) {
    const place = `${file}: row ${row}, column ${at + 1}`;
    if (name === '') throw new DemoError(`${place}: the header must name every column; got a blank cell`);
    const before = names.indexOf(name);
    if (before < at) {
      throw new DemoError(`${place}: names must be unique; "${name}" is column ${before + 1}, too`);
    }
  }
}

function requireHeader(file: string, row: number, names: readonly string[]): void {
  requireNames(file, row, names);
  // Wavelengths and the like are fine names; they go up or down.
  const numbers = names.map((name) => (decimal.test(name) ? Number(name) : Number.NaN));
  const sign = Math.sign(numbers[1]! - numbers[0]!);
  const steady = numbers.every((number, at) => at === 0 || Math.sign(number - numbers[at - 1]!) === sign);
  if (!numbers.includes(Number.NaN) && !steady) {
    throw new DemoError(
      `${file}: row ${row}, column 1: must begin a header of names; got numbers in all columns; add a header`,
    );
  }
}

function requireWidth(file: string, row: number, cells: readonly string[], names: readonly string[]): void {
  if (cells.length < names.length) {
    throw new DemoError(
      `${file}: row ${row}, ${column(names, cells.length)}: must have ${names.length} cells like the header; got ${cells.length}, so this one is missing`,
    );
  }
  if (cells.length > names.length) {
    throw new DemoError(
      `${file}: row ${row}, column ${names.length + 1}: must have ${names.length} cells like the header; got ${cells.length}, so this one has no name`,
    );
  }
}

function readNumber(place: string, cell: string): number {
  const text = cell.trim();
  if (text === '') throw new DemoError(`${place}: must be a number; got a blank cell`);
  const value = decimal.test(text) ? Number(text) : Number.NaN;
  // Tensors are 32-bit: what they cannot hold would turn into an infinity later.
  if (!Number.isFinite(Math.fround(value))) {
    const shown = text.length > 24 ? `${text.slice(0, 24)}…` : text;
    throw new DemoError(`${place}: must be a finite number; got ${JSON.stringify(shown)}`);
  }
  return value;
}
