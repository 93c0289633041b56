import { spawnSync } from 'node:child_process';

const interpreter = '/usr/bin/python3';

/** Runs a script on one thread and reads the JSON that it prints; `undefined` where it cannot run. */
export function python<T>(script: string): T | undefined {
  const one = { OMP_NUM_THREADS: '1', OPENBLAS_NUM_THREADS: '1', MKL_NUM_THREADS: '1' };
  const run = spawnSync(interpreter, ['-c', script], { encoding: 'utf8', env: { ...process.env, ...one } });
  return run.status === 0 ? (JSON.parse(run.stdout) as T) : undefined;
}

/** Versions of what the peers run on, or `undefined` where they are missing. */
export function pythonVersions(): { python: string; numpy: string; scipy: string } | undefined {
  return python(`
import json, platform, numpy, scipy
print(json.dumps({'python': platform.python_version(), 'numpy': numpy.__version__, 'scipy': scipy.__version__}))
`);
}
