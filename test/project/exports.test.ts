import ts from 'typescript';
import { describe, expect, it } from 'vitest';
import { createProgram } from './helpers/program.js';
import { root } from './helpers/repository.js';

const entries = ['src/index.ts', 'src/conformance/index.ts', 'src/numeric/index.ts'];
const program = createProgram(entries);
const checker = program.getTypeChecker();

function surface(path: string) {
  const file = program.getSourceFile(`${root}${path}`);
  const module = file && checker.getSymbolAtLocation(file);
  if (!file || !module) throw new Error(`${path} must be a module with exports`);
  const values = checker
    .getExportsOfModule(module)
    .map((symbol) => ({
      name: symbol.name,
      target: symbol.flags & ts.SymbolFlags.Alias ? checker.getAliasedSymbol(symbol) : symbol,
    }))
    .filter(({ target }) => target.flags & ts.SymbolFlags.Value);
  return { path, file, values };
}

describe.each(entries.map(surface))('the public surface of $path', ({ file, values }) => {
  it('holds named exports from other files and nothing else', () => {
    const others = file.statements.filter(
      (statement) =>
        !(
          ts.isExportDeclaration(statement) &&
          statement.moduleSpecifier &&
          statement.exportClause &&
          ts.isNamedExports(statement.exportClause)
        ),
    );
    expect(others.map((statement) => statement.getText(file))).toEqual([]);
    expect(values.map(({ name }) => name)).not.toContain('default');
  });

  it('exports values', () => expect(values.length).toBeGreaterThan(0));

  it.each(values)('$name has an @example in its documentation', ({ name, target }) => {
    const examples = target.getJsDocTags(checker).filter((tag) => tag.name === 'example');
    const texts = examples.map((tag) => ts.displayPartsToString(tag.text));
    expect(texts.join('\n'), `${name} needs an @example with a fenced block`).toContain('```ts\n');
  });
});
