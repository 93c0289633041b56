// The table of the page docs/which-distribution.md, from the library's own objects; run with tsx it writes the table.
import { readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import * as library from '../../src/index.js';
import { scalars, vectors } from '../distributions/samples.js';

const docs = join(import.meta.dirname, '../../docs');
const page = join(docs, 'which-distribution.md');
const [start, end] = ['<!-- table -->', '<!-- end of table -->'];

type Cost = { readonly draw: number; readonly score: number };

/** Costs beside the normal's from the bench. */
function costs(): Map<string, Cost> {
  const { rows } = JSON.parse(readFileSync(join(docs, 'benchmarks.json'), 'utf8')) as {
    rows: { section: string; what: string; comparison: { ratio: number } }[];
  };
  const found = new Map<string, Cost>();
  for (const { section, what, comparison } of rows) {
    if (section !== 'Families beside the normal') continue;
    const [family, part] = what.split(': ') as [string, string];
    const known = found.get(family) ?? { draw: Number.NaN, score: Number.NaN };
    found.set(family, { ...known, [part === 'draws' ? 'draw' : 'score']: comparison.ratio });
  }
  return found;
}

/** The exported families, in alphabetical order, each with a member. */
export function members(): [string, library.Distribution][] {
  return Object.entries({ ...scalars, ...vectors })
    .map(([name, { make, parametrizations }]): [string, library.Distribution] => [
      name,
      make(parametrizations[0]!),
    ])
    .sort(([a], [b]) => a.localeCompare(b));
}

const forms = [
  ['mean', 'mean'],
  ['variance', 'variance'],
  ['mode', 'mode'],
  ['entropy', 'entropy'],
  ['cdf', 'cdf'],
  ['survival', 'survival'],
  ['logCdf', 'log cdf'],
  ['logSurvival', 'log survival'],
  ['quantile', 'quantile'],
  ['upperQuantile', 'upper quantile'],
  ['drawLog', 'log draw'],
] as const;

const common = forms.slice(0, 10).map(([name]) => name);

function formsText(d: library.Distribution): string {
  const has = (name: string): boolean => name in d;
  const more = has('drawLog') ? ', log draw' : '';
  const missing = forms.slice(0, 10).filter(([name]) => !has(name));
  if (missing.length === 0) return `all ten${more}`;
  if (missing.length <= 4) return `all but ${missing.map(([, text]) => text).join(', ')}${more}`;
  return forms
    .filter(([name]) => has(name))
    .map(([, text]) => text)
    .join(', ');
}

/** The table, one row a family. */
export function catalogueTable(): string {
  const cost = costs();
  const all = members();
  const names = all.map(([name]) => name);
  const times = (ratio: number | undefined): string =>
    ratio === undefined || Number.isNaN(ratio) ? '–' : ratio < 9.95 ? ratio.toFixed(1) : ratio.toFixed(0);
  const rows = all.map(([name, d]) => {
    const closed = names.filter((other) => library.hasClosedKl(name, other));
    return `| \`${name}\` | ${d.support.name} | ${d.route} | ${formsText(d)} | ${closed.join(', ') || '–'} | ${times(cost.get(name)?.draw)} | ${times(cost.get(name)?.score)} |`;
  });
  return [
    `The ten forms are ${common.map((name) => `\`${name}\``).join(', ')}.`,
    '',
    '| family | support | route | closed forms | closed divergence from it to | a draw costs | a log density and its gradient cost |',
    '| --- | --- | --- | --- | --- | ---: | ---: |',
    ...rows,
  ].join('\n');
}

/** The page's text with its table put in anew. */
export function pageWithTable(text: string): string {
  const [from, to] = [text.indexOf(start), text.indexOf(end)];
  if (from < 0 || to < from) throw new Error(`${page} must hold ${start} and ${end}`);
  return `${text.slice(0, from + start.length)}\n${catalogueTable()}\n${text.slice(to)}`;
}

/** The committed page. */
export function committedPage(): string {
  return readFileSync(page, 'utf8');
}

if (process.argv[1] && import.meta.url === pathToFileURL(process.argv[1]).href) {
  writeFileSync(page, pageWithTable(committedPage()));
}
