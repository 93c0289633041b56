// Starts the demo on the built package, which it imports by name as a user's project would.
import { spawnSync } from 'node:child_process';
import { existsSync } from 'node:fs';
import { join } from 'node:path';
import { register } from 'tsx/esm/api';

const root = join(import.meta.dirname, '../..');
if (!existsSync(join(root, 'dist/index.js'))) {
  const { status, stdout, stderr } = spawnSync(process.execPath, ['scripts/build.mjs'], {
    cwd: root,
    encoding: 'utf8',
  });
  if (status !== 0) {
    console.error(`demo: the package must be built first; scripts/build.mjs failed:\n${stdout}${stderr}`);
    process.exit(1);
  }
}

// Whoever reads the output may stop early, as head does.
process.stdout.on('error', (error) => {
  if (error.code === 'EPIPE') process.exit(0);
  throw error;
});

register({ tsconfig: join(import.meta.dirname, 'tsconfig.json') });
const { main } = await import('./orchard/main.ts');
try {
  process.exitCode = await main(process.argv.slice(2));
} catch (error) {
  // Left uncaught, it would come with a screenful of the wasm backend's minified source.
  console.error(error);
  process.exitCode = 1;
}
