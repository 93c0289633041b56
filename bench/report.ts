import { readFileSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import { pathToFileURL } from 'node:url';
import * as tf from '@tensorflow/tfjs';
import { pythonVersions } from './python.js';
import type { Row } from './row.js';

// The bench is compiled into another folder and run from the project's.
const root = pathToFileURL(`${process.cwd()}/`);
const folder = new URL('docs/', root);

/** Where and with what the bench ran. */
function environment() {
  const { version } = JSON.parse(readFileSync(new URL('package.json', root), 'utf8'));
  const peer = pythonVersions();
  return {
    date: new Date().toISOString().slice(0, 10),
    machine: `${os.cpus()[0]?.model ?? 'unknown'}, ${os.cpus().length} cores, ${os.type()} ${os.arch()}`,
    loadAverage: os.loadavg()[0]!,
    leadline: version as string,
    node: process.versions.node,
    tfjs: tf.version.tfjs,
    ...(peer ?? {}),
  };
}

/** Writes the rows as a page and as JSON beside it. */
export function writeReport(rows: readonly Row[]): void {
  const where = environment();
  writeFileSync(
    new URL('benchmarks.json', folder),
    `${JSON.stringify({ environment: where, rows }, null, 2)}\n`,
  );
  writeFileSync(new URL('benchmarks.md', folder), page(where, rows));
}

function page(where: ReturnType<typeof environment>, rows: readonly Row[]): string {
  const versions = [
    `leadline ${where.leadline}`,
    `Node ${where.node}`,
    `TensorFlow.js ${where.tfjs}`,
    ...('numpy' in where ? [`Python ${where.python}, NumPy ${where.numpy}, SciPy ${where.scipy}`] : []),
  ];
  const titles = [...new Set(rows.map((row) => row.section))];
  return `# Benchmarks

Written by \`npm run bench\`; the same numbers stand in [benchmarks.json](benchmarks.json). Measured on ${where.date}: ${where.machine}, load average ${where.loadAverage.toFixed(1)} at the end; ${versions.join(', ')}. Everything runs on one thread. Times are processor time of the process, its helper threads included, since a shared machine's wall clock also counts what others do.

The two sides of a row run in turn in one process, A B A B, in alternating order, after a warm-up; NumPy and SciPy run in a process of their own, right before or after, on one thread as well. The table gives medians; the ratio is median over median. Its spread is the quartiles of the ratios round by round (against NumPy and SciPy: of our samples over their median). The ratio of the minima shows what is left when nothing else disturbs. A ratio below 1 means that leadline is faster. It evaluates densities in double precision and rounds once; tfjs operations compute in single precision throughout, SciPy in double.

${titles
  .map((title) =>
    table(
      title,
      rows.filter((row) => row.section === title),
    ),
  )
  .join('\n')}`;
}

function table(title: string, rows: readonly Row[]): string {
  const unit = rows[0]!.unit ?? 'ms';
  const head = [
    'what',
    'backend',
    'peer',
    `leadline, ${unit}`,
    `peer, ${unit}`,
    'ratio',
    'quartiles',
    'of minima',
  ];
  const targets = rows.some((row) => row.target !== undefined);
  const columns = targets ? [...head, 'target'] : head;
  const lines = rows.map((row) => {
    const { own, peer, ratio, quartiles, leastRatio, rounds } = row.comparison;
    const cells = [
      row.what,
      row.backend || '–',
      row.peer,
      digits(own.median),
      digits(peer.median),
      ratio.toFixed(3),
      `${quartiles.map((q) => q.toFixed(3)).join('–')} (${rounds})`,
      leastRatio.toFixed(3),
      ...(targets ? [row.target === undefined ? '' : `≤ ${row.target}`] : []),
    ];
    return `| ${cells.join(' | ')} |`;
  });
  return `## ${title}\n\n| ${columns.join(' | ')} |\n|${columns.map(() => ' --- |').join('')}\n${lines.join('\n')}\n`;
}

function digits(x: number): string {
  return x < 10 ? x.toFixed(2) : x.toFixed(1);
}
