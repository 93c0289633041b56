// Writes random words to standard output without end: node words.js <source> <seed>.
import { once } from 'node:events';
import { type WordSource, wordBlocks } from '../src/random/randomWords.js';
import { stream } from '../src/random/stream.js';

const [source, seed] = process.argv.slice(2) as [WordSource, string];
// The reader closes the pipe when it has seen enough.
process.stdout.on('error', () => process.exit(0));
for (const block of wordBlocks(stream(Number(seed)), source)) {
  if (!process.stdout.write(new Uint8Array(block.buffer))) await once(process.stdout, 'drain');
}
