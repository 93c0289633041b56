import ts from 'typescript';

/** One module that a file imports. */
export interface Import {
  readonly specifier: string;
  /** Line number, from 1. */
  readonly line: number;
  /** Whether it is imported only when the program gets there, by `import()`. */
  readonly deferred: boolean;
}

/** The syntax tree of a file. */
export function parse(path: string, text: string): ts.SourceFile {
  return ts.createSourceFile(path, text, ts.ScriptTarget.ES2022, true);
}

/** Calls `visit` with a node and everything below it. */
export function visitAll(node: ts.Node, visit: (node: ts.Node) => void): void {
  visit(node);
  ts.forEachChild(node, (child) => visitAll(child, visit));
}

/** The line of a node, from 1. */
export function lineOf(node: ts.Node, file: ts.SourceFile): number {
  return file.getLineAndCharacterOfPosition(node.getStart(file)).line + 1;
}

function specifierOf(node: ts.Node): ts.Node | undefined {
  if (ts.isImportDeclaration(node) || ts.isExportDeclaration(node)) return node.moduleSpecifier;
  if (ts.isImportTypeNode(node))
    return ts.isLiteralTypeNode(node.argument) ? node.argument.literal : undefined;
  return isDeferred(node) ? node.arguments[0] : undefined;
}

function isDeferred(node: ts.Node): node is ts.CallExpression {
  return ts.isCallExpression(node) && node.expression.kind === ts.SyntaxKind.ImportKeyword;
}

/** Every module that a file imports: at its top, deferred, as a type or by exporting from it. */
export function importsOf(path: string, text: string): Import[] {
  const file = parse(path, text);
  const found: Import[] = [];
  visitAll(file, (node) => {
    const specifier = specifierOf(node);
    if (!specifier || !ts.isStringLiteralLike(specifier)) return;
    found.push({ specifier: specifier.text, line: lineOf(node, file), deferred: isDeferred(node) });
  });
  return found;
}
