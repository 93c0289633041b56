// Builds dist/ from nothing: the compiled kernels first, since the sources import them, then JavaScript and types.
import { spawnSync } from 'node:child_process';
import { rmSync } from 'node:fs';
import { createRequire } from 'node:module';
import { join } from 'node:path';

const root = join(import.meta.dirname, '..');
const compiler = createRequire(import.meta.url).resolve('typescript/bin/tsc');

function run(...parameters) {
  const { status, error } = spawnSync(process.execPath, parameters, { cwd: root, stdio: 'inherit' });
  if (error) throw error;
  if (status !== 0) process.exit(status ?? 1);
}

run('scripts/build-kernels.mjs');
rmSync(join(root, 'dist'), { recursive: true, force: true });
run(compiler, '-p', 'tsconfig.build.json');
