import { posix } from 'node:path';
import { importsOf } from './imports.js';

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

function layerOf(path: string): string {
  return path.split('/')[1] ?? '';
}

/** What breaks the order of the layers in one source file, named from the root. */
export function layerFaults(path: string, text: string): string[] {
  const own = layers.indexOf(layerOf(path));
  if (own < 0) return [`${path}: ${layerOf(path)} has no place in the order of the layers`];
  return importsOf(path, text).flatMap(({ specifier, line }) => {
    if (!specifier.startsWith('.')) return [];
    const place = `${path}:${line}`;
    const target = posix.join(posix.dirname(path), specifier).replace(/\.js$/, '.ts');
    const rank = target.startsWith('src/') ? layers.indexOf(layerOf(target)) : -1;
    if (rank < 0) return [`${place}: imports ${specifier}, which lies outside the layers`];
    if (rank > own) return [`${place}: ${layers[own]} imports from ${layerOf(target)}, which comes after it`];
    // What needs an optional package stays behind its own entry point.
    if (layerOf(target) === 'conformance' && layers[own] !== 'conformance')
      return [`${place}: ${layers[own]} imports from conformance, an entry point of its own`];
    // These formulas are compiled a second time, by a compiler that knows nothing of the other folders.
    if (layers[own] === 'numeric' && rank !== own)
      return [`${place}: numeric imports from ${layerOf(target)}`];
    return [];
  });
}
