import ts from 'typescript';
import { read } from '../project/helpers/repository.js';

/** The values that a module of the sources passes on from another one, by name. */
export function publicFunctionsOf(path: string, from: string): string[] {
  const source = ts.createSourceFile(path, read(path), ts.ScriptTarget.ES2022, true);
  return source.statements
    .filter(ts.isExportDeclaration)
    .filter(
      (s) => s.moduleSpecifier && ts.isStringLiteral(s.moduleSpecifier) && s.moduleSpecifier.text === from,
    )
    .flatMap((s) => (s.exportClause && ts.isNamedExports(s.exportClause) ? [...s.exportClause.elements] : []))
    .filter((element) => !element.isTypeOnly)
    .map((element) => element.name.text);
}
