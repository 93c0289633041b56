// Runs Debian's `dieharder -a` on words of the library's streams: of one stream, of 4 and of 8,192 forks in turn,
// and of one stream with the bits in reverse order; three fixed seeds each.
//
//   node bench/dieharder.mjs                       all twelve, those already done left out
//   node bench/dieharder.mjs 'one stream' 1        one of them
//   node bench/dieharder.mjs --report              only writes the page anew
//
// Each finished run is kept in docs/random-bits.json; the page docs/random-bits.md is written from that.
import { spawn, spawnSync } from 'node:child_process';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';

const root = join(import.meta.dirname, '..');
const results = join(root, 'docs/random-bits.json');
const page = join(root, 'docs/random-bits.md');
const program = join(root, '.cache/words/bench/words.js');
const sources = ['one stream', '4 forks', '8192 forks', 'bit-reversed'];
const seeds = [1, 2, 3];
const verdicts = ['PASSED', 'WEAK', 'FAILED'];

const read = () => (existsSync(results) ? JSON.parse(readFileSync(results, 'utf8')) : []);

function count(tests) {
  return Object.fromEntries(verdicts.map((v) => [v, tests.filter((t) => t.verdict === v).length]));
}

/** One full run; dieharder's table has a line per test, its parameter, sizes, p-value and verdict. */
function run(source, seed) {
  const started = Date.now();
  const words = spawn(process.execPath, [program, source, String(seed)], {
    stdio: ['ignore', 'pipe', 'inherit'],
  });
  const dieharder = spawn('dieharder', ['-a', '-g', '200'], { stdio: [words.stdout, 'pipe', 'inherit'] });
  let text = '';
  dieharder.stdout.on('data', (chunk) => {
    text += chunk;
  });
  return new Promise((resolve, reject) => {
    dieharder.on('error', reject);
    dieharder.on('close', (code) => {
      words.kill();
      const tests = text
        .split('\n')
        .map((line) => line.split('|').map((cell) => cell.trim()))
        .filter((cells) => cells.length === 6 && verdicts.includes(cells[5]))
        .map(([test, parameter, , , p, verdict]) => ({
          test,
          parameter: Number(parameter),
          p: Number(p),
          verdict,
        }));
      if (code !== 0 || tests.length === 0)
        reject(new Error(`dieharder ended with ${code} and ${tests.length} results`));
      else resolve({ source, seed, minutes: Math.round((Date.now() - started) / 6000) / 10, tests });
    });
  });
}

function report() {
  const all = read();
  const rows = sources.flatMap((source) =>
    seeds.map((seed) => {
      const found = all.find((r) => r.source === source && r.seed === seed);
      if (!found) return `| ${source} | ${seed} | not run | | | |`;
      const { PASSED, WEAK, FAILED } = count(found.tests);
      return `| ${source} | ${seed} | ${PASSED} | ${WEAK} | ${FAILED} | ${found.minutes} |`;
    }),
  );
  const odd = all.flatMap((r) =>
    r.tests
      .filter((t) => t.verdict !== 'PASSED')
      .map((t) => `- ${r.source}, seed ${r.seed}: ${t.test} (${t.parameter}), p = ${t.p}, ${t.verdict}`),
  );
  const tests = all.reduce((sum, r) => sum + r.tests.length, 0);
  // dieharder calls p below 0.005 or above 0.995 weak, and p below 1e-6 or above 1 − 1e-6 failed.
  const chance = [
    `Of ${tests} results in all, about ${Math.round(tests * 0.01)} are weak by chance alone (p < 0.005 or p > 0.995); failed`,
    `(p < 1e-6 or p > 1 − 1e-6) would be one with odds of ${(tests * 2e-6).toExponential(1)}.`,
  ];
  writeFileSync(
    page,
    `# Random bits

What \`dieharder -a\` (Debian) finds in the 32-bit words of the library's streams: of one stream; of 4 and of 8,192
forks of one stream in turn, 64 bits from each, which shows what forks have in common; and of one stream with each 64
bits in reverse order. Every result is in [random-bits.json](random-bits.json). \`node bench/dieharder.mjs\` runs what
is missing; it needs the Debian package \`dieharder\`.

| words of | seed | passed | weak | failed | minutes |
| --- | --- | --- | --- | --- | --- |
${rows.join('\n')}

${tests > 0 ? chance.join('\n') : 'No run has been finished yet.'}
${odd.length > 0 ? `\nNot passed:\n\n${odd.join('\n')}\n` : ''}`,
  );
}

const arguments_ = process.argv.slice(2);
if (arguments_[0] === '--report') {
  report();
} else {
  if (spawnSync('dieharder', ['-l']).error) {
    console.error(
      'dieharder is missing: install the Debian package of that name (apt-get install dieharder)',
    );
    process.exit(1);
  }
  for (const [command, args] of [
    [process.execPath, [join(root, 'scripts/build-kernels.mjs')]],
    [
      join(root, 'node_modules/.bin/tsc'),
      ['-p', join(root, 'bench/tsconfig.json'), '--outDir', join(root, '.cache/words')],
    ],
  ]) {
    // A compiler that complains about some other file has still written this program.
    spawnSync(command, args, { stdio: 'inherit' });
  }
  if (!existsSync(program)) throw new Error(`${program} was not built`);
  const wanted =
    arguments_.length > 0
      ? [[arguments_[0], Number(arguments_[1] ?? 1)]]
      : seeds.flatMap((seed) => sources.map((source) => [source, seed]));
  for (const [source, seed] of wanted) {
    if (!sources.includes(source) || !seeds.includes(seed)) {
      throw new Error(
        `source must be one of ${sources.join(', ')} and seed one of ${seeds.join(', ')}; got ${source}, ${seed}`,
      );
    }
    if (arguments_.length === 0 && read().some((r) => r.source === source && r.seed === seed)) continue;
    const result = await run(source, seed);
    const others = read().filter((r) => r.source !== source || r.seed !== seed);
    writeFileSync(results, `${JSON.stringify([...others, result])}\n`);
    report();
    console.log(source, seed, count(result.tests), `${result.minutes} min`);
  }
}
