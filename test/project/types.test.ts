import { describe, expect, it } from 'vitest';
import { typeCheck } from './helpers/program.js';
import { filesBelow, read } from './helpers/repository.js';

const wrong = filesBelow('test/types/wrong', /\.ts$/);
const right = filesBelow('test/types/right', /\.ts$/);
const complaints = typeCheck([...wrong, ...right]);

/** The texts of the `// expects: ` lines at the top of a wrong program. */
function expectations(path: string): string[] {
  const found: string[] = [];
  for (const line of read(path).split('\n')) {
    const match = /^\/\/ expects: (.+)$/.exec(line);
    if (!match?.[1]) break;
    found.push(match[1].trim());
  }
  return found;
}

describe('a wrong program does not compile, and for the reason it names', () => {
  it('there are wrong programs', () => expect(wrong.length).toBeGreaterThan(0));

  it.each(wrong)('%s', (path) => {
    const expected = expectations(path);
    const found = complaints.get(path) ?? [];
    expect(
      expected,
      `${path} must start with a line "// expects: <part of the compiler's message>"`,
    ).not.toEqual([]);
    const missing = expected.filter((text) => !found.some(({ message }) => message.includes(text)));
    const surplus = found.filter(({ message }) => !expected.some((text) => message.includes(text)));
    const told = found.map(({ line, message }) => `${path}:${line}: ${message}`).join('\n') || 'it compiles';
    expect({ missing, surplus: surplus.map(({ line }) => line) }, told).toEqual({ missing: [], surplus: [] });
  });
});

describe('a right program compiles', () => {
  it('there are right programs', () => expect(right.length).toBeGreaterThan(0));

  it.each(right)('%s', (path) => {
    expect(complaints.get(path)).toEqual([]);
  });
});
