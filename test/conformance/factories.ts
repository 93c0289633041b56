import ts from 'typescript';
import { createProgram } from '../project/helpers/program.js';
import { root } from '../project/helpers/repository.js';

/** The exported functions of an options object whose result is a distribution, found by their types. */
export function factoriesOf(path: string): string[] {
  const program = createProgram([path]);
  const checker = program.getTypeChecker();
  const file = program.getSourceFile(`${root}${path}`);
  const module = file && checker.getSymbolAtLocation(file);
  if (!file || !module) throw new Error(`${path} must be a module with exports`);
  return checker
    .getExportsOfModule(module)
    .filter((symbol) => {
      const target = symbol.flags & ts.SymbolFlags.Alias ? checker.getAliasedSymbol(symbol) : symbol;
      if (!(target.flags & ts.SymbolFlags.Function)) return false;
      return checker
        .getTypeOfSymbolAtLocation(target, file)
        .getCallSignatures()
        .some((signature) => {
          const made = checker.getReturnTypeOfSignature(signature);
          const has = (name: string) => checker.getPropertyOfType(made, name) !== undefined;
          const combines = signature.parameters.some((parameter) => {
            const type = checker.getTypeOfSymbolAtLocation(parameter, file);
            return checker.getPropertyOfType(type, 'logDensity') !== undefined;
          });
          // What takes a distribution, such as product, changes one and is no family.
          return has('draw') && has('logDensity') && has('arrayShape') && !combines;
        });
    })
    .map(({ name }) => name);
}
