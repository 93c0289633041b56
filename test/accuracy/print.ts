// npm run accuracy: compares every formula with its reference values, prints the table and writes it to docs/.
// `npm run accuracy -- --scipy` measures SciPy's column again too, which takes minutes.
import { execFileSync } from 'node:child_process';
import { readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { type AccuracyRow, familyRows, numericRows } from './table.js';

const docs = join(import.meta.dirname, '../../docs');
const peerFile = join(docs, 'accuracy-scipy.json');

/** SciPy's float32 results at the same points, worst error by row; measured again where SciPy is there. */
function peers(): Record<string, string> {
  try {
    if (!process.argv.includes('--scipy')) throw new Error('measured with --scipy');
    const script = join(import.meta.dirname, '../reference/scipy_float32.py');
    const text = execFileSync('/usr/bin/python3', [script], { encoding: 'utf8', maxBuffer: 2 ** 26 });
    writeFileSync(peerFile, text);
  } catch (error) {
    const why = error instanceof Error ? error.message.split('\n')[0] : String(error);
    console.warn(`SciPy's column is the committed one: ${why}`);
  }
  return JSON.parse(readFileSync(peerFile, 'utf8')) as Record<string, string>;
}

const scipy = peers();

function peerOf({ name, result }: AccuracyRow): string {
  return scipy[`${name}: ${result}`] ?? '–';
}

function table(rows: readonly AccuracyRow[]): string {
  const line = (row: AccuracyRow): string =>
    `| ${row.name} | ${row.result} | ${row.points} | ${row.worst.toFixed(4)} | ${row.mean.toFixed(4)} | ${row.inside} | ${peerOf(row)} | ${row.at} |`;
  return [
    '| function | result | points | worst | mean | before rounding | SciPy float32 | worst at |',
    '| --- | --- | ---: | ---: | ---: | ---: | ---: | --- |',
    ...rows.map(line),
  ].join('\n');
}

const special = await numericRows();
const own = familyRows();
const rows = [...special, ...own];
const points = rows.reduce((sum, row) => sum + row.points, 0);
const most = rows.reduce((a, b) => (b.worst > a.worst ? b : a));
const text = `# Accuracy, function by function

Errors in units in the last place of a float32, against mpmath: ${rows.length} functions and derivatives, ${points} values,
the worst ${most.worst.toFixed(4)} (${most.name}, ${most.result}). "Before rounding" is the error of the double inside; "worst
at" gives the arguments. Where a sum crosses zero, 2^-50 of its terms is allowed, and beside a change of parametrization
what its own rounding does; see [accuracy and gradients](accuracy.md). SciPy's column is the worst error of its float32
result at the same points, and how many are infinite or not a number and should not be (– where it has no such function; derivatives it has none of). Written by \`npm run accuracy\`;
a test refuses a change that worsens a row.

## Special functions

${table(special)}

## Scalar families

${table(own)}
`;
writeFileSync(join(docs, 'accuracy-table.md'), text);
writeFileSync(
  join(docs, 'accuracy-table.json'),
  `[\n${rows.map((row) => JSON.stringify(row)).join(',\n')}\n]\n`,
);
console.log(text);
