/** How a fenced example is to be treated: run and compared, run without output, or only type-checked. */
export type ExampleKind = 'compared' | 'silent' | 'type-checked';

/** A fenced example in the documentation. */
export interface Example {
  readonly path: string;
  /** The line of its first line of code, from 1. */
  readonly line: number;
  readonly code: string;
  readonly language: 'ts' | 'js';
  readonly kind: ExampleKind;
}

const fence = /^(\s*)(`{3,})\s*(\S*)\s*(.*)$/;
const languages: Readonly<Record<string, 'ts' | 'js'>> = {
  ts: 'ts',
  typescript: 'ts',
  js: 'js',
  javascript: 'js',
};
const kinds: Readonly<Record<string, ExampleKind>> = {
  '': 'compared',
  silent: 'silent',
  'no-run': 'type-checked',
};

/** The lines of a source file that stand in documentation comments, without their decoration; others are blank. */
function documentationLines(source: string): string[] {
  let inside = false;
  return source.split('\n').map((line) => {
    let text = line;
    if (!inside) {
      const start = /^\s*\/\*\*(.*)$/.exec(line);
      if (!start) return '';
      inside = true;
      text = ` *${start[1]}`;
    }
    if (text.includes('*/')) {
      inside = false;
      text = text.slice(0, text.indexOf('*/'));
    }
    return text.replace(/^\s*\* ?/, '');
  });
}

/** The TypeScript and JavaScript examples of a Markdown file, or of the documentation comments of a source file. */
export function findExamples(path: string, text: string): Example[] {
  const lines = path.endsWith('.md') ? text.split('\n') : documentationLines(text);
  const examples: Example[] = [];
  let open: { ticks: string; indent: number; line: number; info: [string, string] } | undefined;
  lines.forEach((content, index) => {
    const match = fence.exec(content);
    if (!match) return;
    const [, indent = '', ticks = '', language = '', mark = ''] = match;
    if (!open) {
      open = { ticks, indent: indent.length, line: index + 2, info: [language, mark.trim()] };
      return;
    }
    if (language !== '' || ticks.length < open.ticks.length) return;
    const started = open;
    open = undefined;
    const known = languages[started.info[0]];
    if (!known) return;
    const kind = kinds[started.info[1]];
    if (!kind) {
      throw new Error(
        `${path}:${started.line - 1}: the mark after the language must be no-run or silent; got ${started.info[1]}`,
      );
    }
    const code = lines.slice(started.line - 1, index).map((line) => line.slice(started.indent));
    examples.push({ path, line: started.line, code: code.join('\n'), language: known, kind });
  });
  if (open) throw new Error(`${path}:${open.line - 1}: this fence is never closed`);
  return examples;
}
