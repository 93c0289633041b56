import { spawn } from 'node:child_process';
import { mkdtemp, readFile, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { stream } from '../../src/random/stream.js';

const script = fileURLToPath(new URL('killedRun.ts', import.meta.url));
const root = fileURLToPath(new URL('../..', import.meta.url));
let folder = '';
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'killed-'));
});
afterAll(() => rm(folder, { recursive: true }));

/** Runs the script until it ends, or kills it some milliseconds after it has printed some steps. */
function run(where: string, steps: number, kill?: { afterSteps: number; thenMs: number }) {
  return new Promise<{ lines: string[]; signal: string | null; code: number | null; errors: string }>(
    (resolve) => {
      const child = spawn(process.execPath, ['--import', 'tsx', script, where, `${steps}`], { cwd: root });
      let out = '';
      let errors = '';
      let armed = false;
      child.stdout.on('data', (text) => {
        out += text;
        if (kill && !armed && out.split('\n').length - 2 >= kill.afterSteps) {
          armed = true;
          setTimeout(() => child.kill('SIGKILL'), kill.thenMs);
        }
      });
      child.stderr.on('data', (text) => {
        errors += text;
      });
      // The last line may have been cut by the kill.
      child.on('close', (code, signal) =>
        resolve({ lines: out.split('\n').slice(0, -1), signal, code, errors }),
      );
    },
  );
}

const step = (line: string): number => (JSON.parse(line) as { step: number }).step;

it('a run killed at random moments and resumed equals the uninterrupted one, bit for bit', {
  timeout: 240_000,
}, async () => {
  const steps = 120;
  const whole = join(folder, 'whole');
  const killed = join(folder, 'killed');
  await Promise.all(
    [whole, killed].map((path) => import('node:fs/promises').then((files) => files.mkdir(path))),
  );
  const reference = await run(whole, steps);
  expect(reference.lines.at(-1), reference.errors).toBe('done');
  const expected = new Map(reference.lines.slice(1, -1).map((line) => [step(line), line]));
  expect(expected.size).toBe(steps);

  const draws = stream(73);
  const [afterSteps, thenMs] = [draws.integers(17, [6]).dataSync(), draws.integers(60, [6]).dataSync()];
  const seen = new Map<number, string>();
  const starts: number[] = [];
  let kills = 0;
  for (let i = 0; ; i++) {
    const attempt = i < 6 ? { afterSteps: afterSteps[i]!, thenMs: thenMs[i]! } : undefined;
    const { lines, signal, code, errors } = await run(killed, steps, attempt);
    if (signal === 'SIGKILL') kills++;
    else expect(code, errors).toBe(0);
    starts.push(Number(lines[0]?.replace('from ', '')));
    for (const line of lines.slice(1)) {
      if (line === 'done') continue;
      expect(line).toBe(expected.get(step(line)));
      seen.set(step(line), line);
    }
    if (lines.at(-1) === 'done') break;
  }
  // Otherwise the test has not tested: most runs must have been killed, and have gone on from within.
  expect(kills).toBeGreaterThanOrEqual(4);
  expect(new Set(starts).size).toBeGreaterThanOrEqual(3);
  expect([...seen.keys()].sort((a, b) => a - b)).toEqual([...expected.keys()]);
  for (const file of ['weights', 'run.safetensors']) {
    expect((await readFile(join(killed, file))).equals(await readFile(join(whole, file)))).toBe(true);
  }
});
