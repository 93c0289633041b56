import { posix } from 'node:path';
import ts from 'typescript';

/** The parts of src in the order of dependency: each may import from those before it and from itself. */
const layers = [
  'errors.ts',
  'numeric',
  'kernels',
  'tensor',
  'random',
  'support',
  'distributions',
  'maps',
  'divergence',
  'models',
  'bounds',
  'audit',
  'evidence',
  'training',
  'networks',
  'conformance',
  'speed',
  'index.ts',
];

/** Members of the tensor library that draw from its own random state. */
const randomMembers = /^(rand|random\w*|truncatedNormal|multinomial|dropout)$/;

function parse(path: string, text: string): ts.SourceFile {
  return ts.createSourceFile(path, text, ts.ScriptTarget.ES2022, true);
}

function visitAll(node: ts.Node, visit: (node: ts.Node) => void): void {
  visit(node);
  ts.forEachChild(node, (child) => visitAll(child, visit));
}

/** Every module that a file imports: statically, dynamically, as a type or by exporting from it. */
export function importsOf(path: string, text: string): { specifier: string; line: number }[] {
  const file = parse(path, text);
  const found: { specifier: string; line: number }[] = [];
  visitAll(file, (node) => {
    let specifier: ts.Node | undefined;
    if (ts.isImportDeclaration(node) || ts.isExportDeclaration(node)) specifier = node.moduleSpecifier;
    else if (ts.isImportTypeNode(node))
      specifier = ts.isLiteralTypeNode(node.argument) ? node.argument.literal : undefined;
    else if (ts.isCallExpression(node) && node.expression.kind === ts.SyntaxKind.ImportKeyword)
      specifier = node.arguments[0];
    if (!specifier || !ts.isStringLiteralLike(specifier)) return;
    found.push({
      specifier: specifier.text,
      line: file.getLineAndCharacterOfPosition(node.getStart(file)).line + 1,
    });
  });
  return found;
}

function layerOf(path: string): string {
  return path.split('/')[1] ?? '';
}

/** What breaks the order of the layers in one source file, named from the root. */
export function layerFaults(path: string, text: string): string[] {
  const own = layers.indexOf(layerOf(path));
  if (own < 0) return [`${path}: ${layerOf(path)} has no place in the order of the layers`];
  return importsOf(path, text).flatMap(({ specifier, line }) => {
    const place = `${path}:${line}`;
    if (!specifier.startsWith('.'))
      return specifier === 'leadline' ? [`${place}: imports the package itself`] : [];
    const target = layerOf(
      posix.normalize(posix.join(posix.dirname(path), specifier)).replace(/\.js$/, '.ts'),
    );
    const rank = layers.indexOf(target);
    if (rank < 0) return [`${place}: imports ${specifier}, which lies outside the layers`];
    if (rank > own) return [`${place}: ${layers[own]} imports from ${target}, which comes after it`];
    // These formulas are compiled a second time, by a compiler that knows nothing of the other folders.
    if (layers[own] === 'numeric' && rank !== own) return [`${place}: numeric imports from ${target}`];
    return [];
  });
}

/** Every use of a random source other than a stream in one source file. */
export function randomnessFaults(path: string, text: string): string[] {
  const file = parse(path, text);
  const faults: string[] = [];
  visitAll(file, (node) => {
    if (!ts.isPropertyAccessExpression(node)) return;
    const object = node.expression.getText(file);
    const member = node.name.text;
    const ambient =
      (object === 'Math' && member === 'random') ||
      (object === 'tf' && randomMembers.test(member)) ||
      /^getRandomValues|^randomUUID$/.test(member);
    if (!ambient) return;
    const line = file.getLineAndCharacterOfPosition(node.getStart(file)).line + 1;
    faults.push(`${path}:${line}: ${object}.${member} draws outside a stream`);
  });
  return faults;
}
