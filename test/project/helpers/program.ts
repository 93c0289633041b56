import { join } from 'node:path';
import ts from 'typescript';
import { root } from './repository.js';

/** What is wrong at one place of a program. */
export interface Complaint {
  /** The file as it was named to {@link typeCheck}. */
  readonly path: string;
  /** Line number, from 1. */
  readonly line: number;
  readonly message: string;
}

function projectOptions(): ts.CompilerOptions {
  const config = ts.readConfigFile(join(root, 'tsconfig.json'), ts.sys.readFile);
  const { options } = ts.parseJsonConfigFileContent(
    { ...config.config, include: [], files: ['x.ts'] },
    ts.sys,
    root,
  );
  return options;
}

/** One program over `paths`, named from the root, under the project's own compiler options. */
export function createProgram(paths: readonly string[], options: ts.CompilerOptions = {}): ts.Program {
  return ts.createProgram({
    rootNames: paths.map((path) => join(root, path)),
    options: { ...projectOptions(), noErrorTruncation: true, ...options },
  });
}

/**
 * The compiler's complaints about each of `paths`. Snippets may leave a name unused, which would only distract
 * from what they show, so that rule of the project does not count here.
 */
export function typeCheck(paths: readonly string[]): Map<string, Complaint[]> {
  const program = createProgram(paths, {
    noUnusedLocals: false,
    noUnusedParameters: false,
    moduleDetection: ts.ModuleDetectionKind.Force,
    allowJs: true,
    checkJs: true,
  });
  const general = [...program.getOptionsDiagnostics(), ...program.getGlobalDiagnostics()];
  if (general.length > 0) throw new Error(ts.formatDiagnostics(general, formatHost));
  return new Map(paths.map((path) => [path, complaintsAbout(program, path)]));
}

function complaintsAbout(program: ts.Program, path: string): Complaint[] {
  const file = program.getSourceFile(join(root, path));
  if (!file) throw new Error(`${path} is not part of the program`);
  return [...program.getSyntacticDiagnostics(file), ...program.getSemanticDiagnostics(file)].map(
    ({ start = 0, messageText }) => ({
      path,
      line: file.getLineAndCharacterOfPosition(start).line + 1,
      message: ts.flattenDiagnosticMessageText(messageText, '\n'),
    }),
  );
}

const formatHost: ts.FormatDiagnosticsHost = {
  getCurrentDirectory: () => root,
  getCanonicalFileName: (name) => name,
  getNewLine: () => '\n',
};
