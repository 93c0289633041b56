import { isBuiltin } from 'node:module';
import { importsOf } from './imports.js';

/** The part of package.json that says what a user's project will hold. */
export interface Manifest {
  readonly dependencies?: Readonly<Record<string, string>>;
  readonly peerDependencies?: Readonly<Record<string, string>>;
  readonly peerDependenciesMeta?: Readonly<Record<string, { optional?: boolean }>>;
}

function packageOf(specifier: string): string {
  return specifier
    .split('/')
    .slice(0, specifier.startsWith('@') ? 2 : 1)
    .join('/');
}

/** The optional package that an entry point of its own cannot do without. */
const needed: Readonly<Record<string, string>> = { conformance: 'fast-check' };

/**
 * The imports of one source file that could fail for a user: packages that the manifest does not bring, and,
 * unless deferred until they are asked for, optional packages and Node's own modules.
 */
export function packageFaults(path: string, text: string, manifest: Manifest): string[] {
  const optional = (name: string) => manifest.peerDependenciesMeta?.[name]?.optional === true;
  return importsOf(path, text).flatMap(({ specifier, line, deferred }) => {
    if (specifier.startsWith('.')) return [];
    const place = `${path}:${line}`;
    if (isBuiltin(specifier)) return deferred ? [] : [`${place}: ${specifier} does not exist in a browser`];
    const name = packageOf(specifier);
    if (name in (manifest.dependencies ?? {})) return [];
    if (!(name in (manifest.peerDependencies ?? {}))) return [`${place}: ${name} is not a dependency`];
    if (name === needed[path.split('/')[1] ?? '']) return [];
    return optional(name) && !deferred ? [`${place}: ${name} may not be installed`] : [];
  });
}
