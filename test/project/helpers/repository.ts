import { readdirSync, readFileSync } from 'node:fs';
import { join, relative, sep } from 'node:path';
import { fileURLToPath } from 'node:url';

/** The folder that holds package.json. */
export const root = fileURLToPath(new URL('../../..', import.meta.url));

/** The text of a file, named from the root. */
export function read(path: string): string {
  return readFileSync(join(root, path), 'utf8');
}

/** Every file below `folder` whose name passes, named from the root with forward slashes, in sorted order. */
export function filesBelow(folder: string, accept: RegExp): string[] {
  return readdirSync(join(root, folder), { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile() && accept.test(entry.name))
    .map((entry) => relative(root, join(entry.parentPath, entry.name)).split(sep).join('/'))
    .sort();
}

/** The TypeScript sources that people write: neither generated nor in AssemblyScript. */
export function sourceFiles(): string[] {
  return filesBelow('src', /\.ts$/).filter((path) => !/^src\/kernels\/(generated|assembly)\//.test(path));
}
