// Measures the library beside its peers and writes docs/benchmarks.md and docs/benchmarks.json.
// `npm run bench`, or `npm run bench -- steps density` for some sections only, which writes nothing.
import * as tf from '@tensorflow/tfjs';
import '@tensorflow/tfjs-backend-wasm';
import { density } from './density.js';
import { familyCosts } from './families.js';
import { randomDraws } from './random.js';
import { writeReport } from './report.js';
import { type Row, rowText } from './row.js';
import { drawGrowth, steps } from './steps.js';

/** Sections, and the backends that each runs on. */
const sections: readonly { name: string; backends: readonly string[]; run: () => Iterable<Row> }[] = [
  { name: 'steps', backends: ['wasm', 'cpu'], run: steps },
  { name: 'draws', backends: ['wasm'], run: drawGrowth },
  { name: 'density', backends: ['wasm', 'cpu'], run: density },
  { name: 'families', backends: ['wasm'], run: familyCosts },
  { name: 'random', backends: ['wasm'], run: randomDraws },
];

const wanted = process.argv.slice(2);
const unknown = wanted.filter((name) => !sections.some((section) => section.name === name));
if (unknown.length > 0) {
  console.error(
    `bench: no section ${unknown.join(', ')}; there are ${sections.map((s) => s.name).join(', ')}`,
  );
  process.exit(1);
}

async function measure(): Promise<void> {
  const rows: Row[] = [];
  for (const { name, backends, run } of sections) {
    if (wanted.length > 0 && !wanted.includes(name)) continue;
    for (const backend of backends) {
      if (!(await tf.setBackend(backend))) throw new Error(`bench: the ${backend} backend must start`);
      const [tensors, known] = [tf.memory().numTensors, rows.length];
      for (const row of run()) {
        console.log(rowText(row));
        rows.push(row);
      }
      const left = tf.memory().numTensors - tensors;
      if (left !== 0) throw new Error(`bench: ${name} must leave no tensors alive; it left ${left}`);
      if (rows.length === known) console.log(`${name}: skipped, since its peer is not installed`);
    }
  }
  if (wanted.length === 0) writeReport(rows);
}

// Caught here, since the wasm backend's own handler prints its whole source before an error.
await measure().catch((error: unknown) => {
  console.error(error);
  process.exitCode = 1;
});
