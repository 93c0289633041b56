import { describe, expect, it } from 'vitest';
import { checkExamples } from './helpers/checkExamples.js';
import { findExamples } from './helpers/findExamples.js';

function markdown(code: string, info = 'ts'): string {
  return `# Title\n\n\`\`\`${info}\n${code}\n\`\`\`\n`;
}

const cases: readonly { title: string; text: string; faults: readonly string[] }[] = [
  { title: 'a right example', text: markdown('console.log(1 + 1);\n// 2'), faults: [] },
  { title: 'output of several lines', text: markdown("console.log('a\\n b');\n// a\n//  b"), faults: [] },
  {
    title: 'a call in a loop',
    text: markdown('for (const k of [1, 2]) {\n  console.log(k);\n  // 1\n  // 2\n}'),
    faults: [],
  },
  {
    title: 'a wrong output',
    text: markdown('const a = 1;\nconsole.log(a);\n// 2'),
    faults: ['doc.md:5: promises\n  // 2\nbut prints\n  // 1'],
  },
  {
    title: 'a second call without its output',
    text: markdown('console.log(1);\n// 1\nconsole.log(2);'),
    faults: ['doc.md:6: promises nothing\nbut prints\n  // 2'],
  },
  {
    title: 'a call that is never reached',
    text: markdown('console.log(1);\n// 1\nif (Date.now() < 0) console.log(2);\n// 2'),
    faults: ['doc.md:6: promises\n  // 2\nbut prints nothing'],
  },
  {
    title: 'no output at all',
    text: markdown('export const a = 1;'),
    faults: ['doc.md:4: an example must show'],
  },
  { title: 'a silent example', text: markdown('export const a = 1;', 'ts silent'), faults: [] },
  {
    title: 'a silent example that prints',
    text: markdown('console.log(1);', 'ts silent'),
    faults: ['doc.md:4: promises nothing\nbut prints\n  // 1'],
  },
  {
    title: 'output from elsewhere',
    text: markdown("const log = console['log'];\nlog(3);\nconsole.log(1);\n// 1"),
    faults: ['something other than its own console.log prints\n  // 3'],
  },
  {
    title: 'an error thrown',
    text: markdown("console.log(1);\n// 1\nthrow new Error('oh');"),
    faults: ['doc.md:6: throws Error: oh'],
  },
  {
    title: 'an error of types',
    text: markdown("const a: number = 'x';\nconsole.log(a);\n// x"),
    faults: ["doc.md:4: Type 'string' is not assignable to type 'number'"],
  },
  {
    title: 'an error of types in an example that cannot run',
    text: markdown("export const a: number = 'x';", 'ts no-run'),
    faults: ["doc.md:4: Type 'string' is not assignable to type 'number'"],
  },
  { title: 'an example that cannot run', text: markdown("throw new Error('oh');", 'ts no-run'), faults: [] },
  {
    title: 'an import from a file',
    text: markdown("import { root } from './root.js';\nconsole.log(root);\n// x", 'js'),
    faults: ["doc.md:4: Cannot find module './root.js'", "must import from 'leadline'"],
  },
];

describe('the check of an example', () => {
  const named = cases.map((one, k) => ({ ...one, path: `doc-${k}.md` }));
  const checks = checkExamples(
    named.flatMap(({ path, text }) => findExamples(path, text)),
    'machinery',
  );

  it.each(named.map((one, k) => ({ ...one, check: checks[k]!.check })))(
    '$title',
    async ({ path, check, faults }) => {
      const found = await check();
      expect(found).toEqual(faults.map((fault) => expect.stringContaining(fault.replace('doc.md', path))));
    },
  );
});

describe('finding examples', () => {
  it('reads documentation comments, and only those', () => {
    const source = [
      '/**',
      ' * @example',
      ' * ```ts',
      ' * const a = {',
      ' *   b: 1,',
      ' * };',
      ' * ```',
      ' */',
      'const text = `',
      '```ts',
      'no',
      '```',
      '`;',
    ].join('\n');
    expect(findExamples('src/a.ts', source)).toEqual([
      { path: 'src/a.ts', line: 4, code: 'const a = {\n  b: 1,\n};', language: 'ts', kind: 'compared' },
    ]);
  });

  it('leaves other languages alone', () => {
    expect(findExamples('doc.md', markdown('npm install', 'sh'))).toEqual([]);
  });

  it('refuses an unknown mark', () => {
    expect(() => findExamples('doc.md', markdown('1', 'ts norun'))).toThrow(
      'doc.md:3: the mark after the language must be no-run or silent; got norun',
    );
  });

  it('refuses a fence that is never closed', () => {
    expect(() => findExamples('doc.md', 'text\n```ts\n1\n')).toThrow('doc.md:2: this fence is never closed');
  });
});
