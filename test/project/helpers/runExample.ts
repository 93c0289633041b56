import { format } from 'node:util';
import * as tf from '@tensorflow/tfjs';
import type { CallSite } from './callSites.js';
import type { Example } from './findExamples.js';

/** The name under which a running example finds the function that collects what it prints. */
export const printerName = 'globalThis.printFromExample';

const scope = globalThis as typeof globalThis & {
  printFromExample?: (site: number) => (...values: unknown[]) => void;
};

/**
 * Runs an example by `load`, which imports its redirected code, and lists what differs from what its comments
 * promise: one text for each difference, with file and line. The backend is set back afterwards and variables
 * are disposed of, so that one example does not reach into the next.
 */
export async function runExample(
  example: Example,
  sites: readonly CallSite[],
  load: () => Promise<unknown>,
): Promise<string[]> {
  const printed: string[][] = sites.map(() => []);
  const stray: string[] = [];
  const log = console.log;
  await tf.ready();
  const backend = tf.getBackend();
  scope.printFromExample =
    (site) =>
    (...values) => {
      printed[site]!.push(...toLines(values));
    };
  console.log = (...values: unknown[]) => {
    stray.push(...toLines(values));
  };
  try {
    await load();
  } catch (error) {
    return [
      `${example.path}:${lineOf(error, example)}: throws ${error instanceof Error ? error.stack : error}`,
    ];
  } finally {
    console.log = log;
    delete scope.printFromExample;
    tf.disposeVariables();
    if (tf.getBackend() !== backend) await tf.setBackend(backend);
  }
  return compare(example, sites, printed, stray);
}

function toLines(values: readonly unknown[]): string[] {
  return format(...values)
    .split('\n')
    .map((line) => line.trimEnd());
}

/** The running copy keeps the line numbers of the documentation, so the stack tells the place. */
function lineOf(error: unknown, example: Example): number {
  const stack = error instanceof Error ? (error.stack ?? '') : '';
  const match = /\.cache\/examples\/[^:\n]*:(\d+)/.exec(stack);
  return match ? Number(match[1]) : example.line;
}

function compare(
  example: Example,
  sites: readonly CallSite[],
  printed: readonly string[][],
  stray: readonly string[],
): string[] {
  const place = (line: number) => `${example.path}:${example.line + line}`;
  const differences: string[] = [];
  sites.forEach((site, k) => {
    const actual = printed[k]!;
    if (actual.join('\n') === site.expected.join('\n')) return;
    const promise = site.expected.length > 0 ? `promises\n${indent(site.expected)}` : 'promises nothing';
    const outcome = actual.length > 0 ? `prints\n${indent(actual)}` : 'prints nothing';
    differences.push(`${place(site.line)}: ${promise}\nbut ${outcome}`);
  });
  if (stray.length > 0) {
    differences.push(`${place(0)}: something other than its own console.log prints\n${indent(stray)}`);
  }
  return differences;
}

function indent(lines: readonly string[]): string {
  return lines.map((line) => `  // ${line}`.trimEnd()).join('\n');
}
