import { mkdirSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { type CallSite, callSites, redirectCalls } from './callSites.js';
import type { Example } from './findExamples.js';
import { typeCheck } from './program.js';
import { root } from './repository.js';
import { printerName, runExample } from './runExample.js';

/** An example with the function that lists everything wrong with it; an empty list means it is right. */
export interface CheckedExample {
  readonly title: string;
  check(): Promise<string[]>;
}

/**
 * Writes the examples below .cache, inside the package, so that they can import it by name; type-checks all of
 * them in one program; and returns one check for each. Every copy starts with as many empty lines as put its
 * code at its line in the documentation.
 */
export function checkExamples(examples: readonly Example[], folder: string): CheckedExample[] {
  const cache = `.cache/examples/${folder}`;
  rmSync(join(root, cache), { recursive: true, force: true });
  mkdirSync(join(root, cache, 'run'), { recursive: true });
  const copies = examples.map((example) => {
    const name = `${example.path.replace(/[^A-Za-z0-9]+/g, '-')}-${example.line}.${example.language}`;
    const sites = callSites(example.code);
    const copy = { example, sites, original: `${cache}/${name}`, running: join(root, cache, 'run', name) };
    const above = '\n'.repeat(example.line - 1);
    writeFileSync(join(root, copy.original), above + example.code);
    writeFileSync(copy.running, above + redirectCalls(example.code, sites, printerName));
    return copy;
  });
  const complaints = typeCheck(copies.map((copy) => copy.original));
  return copies.map(({ example, sites, original, running }) => ({
    title: `${example.path}:${example.line}`,
    async check() {
      const wrong = [
        ...(complaints.get(original) ?? []).map(({ line, message }) => `${example.path}:${line}: ${message}`),
        ...faultsOfForm(example, sites),
      ];
      if (wrong.length > 0 || example.kind === 'type-checked') return wrong;
      return runExample(example, sites, () => import(/* @vite-ignore */ pathToFileURL(running).href));
    },
  }));
}

function faultsOfForm(example: Example, sites: readonly CallSite[]): string[] {
  const faults: string[] = [];
  if (/\bfrom\s+['"]\.{1,2}\//.test(example.code)) {
    faults.push(`${example.path}:${example.line}: an example must import from 'leadline', not from a file`);
  }
  if (example.kind !== 'compared') return faults;
  if (!sites.some((site) => site.expected.length > 0)) {
    faults.push(
      `${example.path}:${example.line}: an example must show its output as comment lines after console.log; ` +
        'mark the fence silent if it prints nothing, no-run if it cannot run',
    );
  }
  return faults;
}
