// Everything that has to hold before a change is good, in one command. Each step prints one line when it passes
// and its whole output when it fails; the last line counts vitest's tests plus one for each other step.
import { spawn } from 'node:child_process';
import { existsSync, mkdirSync, readFileSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { countTests } from './count-tests.mjs';

const root = join(import.meta.dirname, '..');
const cache = join(root, '.cache/test');
const results = join(cache, 'vitest.json');
const { name, version } = JSON.parse(readFileSync(join(root, 'package.json'), 'utf8'));
const tarball = join(cache, `${name}-${version}.tgz`);

/** Colors only where someone looks. */
const { FORCE_COLOR: _, ...environment } = process.env;
const env = process.stdout.isTTY ? process.env : { ...environment, NO_COLOR: '1' };

/** A step that hangs has to fail, not to hang the command; the whole of it is meant to take under ten minutes. */
const stepTimeout = 30 * 60 * 1000;

function tool(packageName, command = packageName) {
  const folder = join(root, 'node_modules', packageName);
  const { bin } = JSON.parse(readFileSync(join(folder, 'package.json'), 'utf8'));
  return [process.execPath, join(folder, typeof bin === 'string' ? bin : bin[command])];
}

const steps = [
  {
    title: 'format and lint',
    command: [...tool('@biomejs/biome', 'biome'), 'check', '--error-on-warnings', '--max-diagnostics=none'],
  },
  { title: 'build', command: [process.execPath, 'scripts/build.mjs'], essential: true },
  { title: 'types', command: [...tool('typescript', 'tsc'), '-p', 'tsconfig.json'] },
  { title: 'API docs', command: tool('typedoc') },
  { title: 'pack', command: ['npm', 'pack', '--ignore-scripts', '--silent', '--pack-destination', cache] },
  { title: 'publint', command: [...tool('publint'), 'run', tarball, '--strict'] },
  {
    title: 'types of the package',
    command: [...tool('@arethetypeswrong/cli', 'attw'), tarball, '--profile', 'esm-only', '--no-color'],
  },
  {
    title: 'tests',
    command: [
      ...tool('vitest'),
      'run',
      '--reporter=default',
      '--reporter=json',
      `--outputFile.json=${results}`,
    ],
    count: (passed) => countTests(existsSync(results) ? readFileSync(results, 'utf8') : undefined, passed),
  },
];

const windows = process.platform === 'win32';

/** Ends a step together with the processes that it started: a worker left behind would go on computing. */
function end(child) {
  if (child.exitCode !== null || child.signalCode !== null || child.pid === undefined) return;
  if (windows) child.kill('SIGKILL');
  else process.kill(-child.pid, 'SIGKILL');
}

let running;
for (const [signal, code] of [
  ['SIGINT', 130],
  ['SIGTERM', 143],
]) {
  process.on(signal, () => {
    if (running) end(running);
    process.exit(code);
  });
}

function run([file, ...parameters]) {
  return new Promise((resolve) => {
    const output = [];
    const child = spawn(file, parameters, {
      cwd: root,
      env,
      stdio: ['ignore', 'pipe', 'pipe'],
      detached: !windows,
      shell: windows && file === 'npm',
    });
    running = child;
    const timer = setTimeout(end, stepTimeout, child);
    child.stdout.on('data', (chunk) => output.push(chunk));
    child.stderr.on('data', (chunk) => output.push(chunk));
    child.on('error', (error) => output.push(Buffer.from(String(error))));
    child.on('close', (code, signal) => {
      clearTimeout(timer);
      const ending = signal ? `\nended by ${signal}` : '';
      resolve({ passed: code === 0, output: Buffer.concat(output).toString() + ending });
    });
  });
}

rmSync(cache, { recursive: true, force: true });
mkdirSync(cache, { recursive: true });

const total = { passed: 0, failed: 0, skipped: 0 };
let broken;
for (const { title, command, essential, count } of steps) {
  if (broken) {
    total.failed++;
    console.log(`FAIL  ${title}: not run, because ${broken} failed`);
    continue;
  }
  const start = performance.now();
  const { passed, output } = await run(command);
  const seconds = ((performance.now() - start) / 1000).toFixed(1);
  const counted = count ? count(passed) : { passed: Number(passed), failed: Number(!passed), skipped: 0 };
  for (const key of Object.keys(total)) total[key] += counted[key];
  const detail = count ? `${counted.passed} passed, ${counted.failed} failed, ` : '';
  if (counted.failed > 0) console.log(`${output.trimEnd()}\n`);
  console.log(`${counted.failed > 0 ? 'FAIL' : 'ok  '}  ${title} (${detail}${seconds} s)`);
  if (essential && counted.failed > 0) broken = title;
}

process.exitCode = total.failed > 0 ? 1 : 0;
const skipped = total.skipped > 0 ? `, ${total.skipped} skipped` : '';
console.log(`${total.passed} passed, ${total.failed} failed${skipped}`);
