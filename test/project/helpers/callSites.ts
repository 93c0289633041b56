import ts from 'typescript';

/** One `console.log(...)` of an example and the output that the comment lines after it promise. */
export interface CallSite {
  /** Line number within the code, from 0. */
  readonly line: number;
  /** Where `console.log` stands in the code. */
  readonly start: number;
  readonly end: number;
  /** The promised lines; empty where no comment line follows. */
  readonly expected: readonly string[];
}

const comment = /^\s*\/\/ ?(.*)$/;

/** Every `console.log` call of `code`, in order. */
export function callSites(code: string): CallSite[] {
  const file = ts.createSourceFile('example.ts', code, ts.ScriptTarget.ES2022, true);
  const lines = code.split('\n');
  const sites: CallSite[] = [];
  function visit(node: ts.Node): void {
    if (ts.isCallExpression(node) && node.expression.getText(file) === 'console.log') {
      const start = node.expression.getStart(file);
      sites.push({
        line: file.getLineAndCharacterOfPosition(start).line,
        start,
        end: node.expression.end,
        expected: commentsAfter(lines, file.getLineAndCharacterOfPosition(node.end).line),
      });
    }
    ts.forEachChild(node, visit);
  }
  visit(file);
  return sites;
}

function commentsAfter(lines: readonly string[], line: number): string[] {
  const found: string[] = [];
  for (const text of lines.slice(line + 1)) {
    const match = comment.exec(text);
    if (!match) break;
    found.push((match[1] ?? '').trimEnd());
  }
  return found;
}

/** The code with the k-th `console.log` replaced by `printer(k)`; no line moves. */
export function redirectCalls(code: string, sites: readonly CallSite[], printer: string): string {
  let result = code;
  for (let k = sites.length - 1; k >= 0; k--) {
    const site = sites[k]!;
    result = `${result.slice(0, site.start)}${printer}(${k})${result.slice(site.end)}`;
  }
  return result;
}
