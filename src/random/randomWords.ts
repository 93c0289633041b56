import { checkCount } from './checks.js';
import { fill } from './fill.js';
import { type Stream, wordsOf } from './stream.js';

/**
 * The next `count` 32-bit words of a stream: of each 64 random bits the lower half, then the upper half. What the
 * draws are made of, for tests of the bits themselves.
 */
export function randomWords(stream: Stream, count: number): Int32Array {
  const words = wordsOf('randomWords', stream);
  checkCount('randomWords', 'count', count);
  const out = new Int32Array(count);
  fill(words, 'fillWords', out);
  return out;
}

/** How words of several streams are put in one row, as a test for bits that streams share would see them. */
export type WordSource = 'one stream' | '4 forks' | '8192 forks' | 'bit-reversed';

/**
 * Endless blocks of words: of one stream, of forks in turn (64 bits from each), or of one stream with each 64 bits
 * in reverse order, since tests look harder at the leading bits.
 */
export function* wordBlocks(root: Stream, source: WordSource): Generator<Int32Array> {
  if (source === 'one stream') while (true) yield randomWords(root, 65536);
  if (source === 'bit-reversed') while (true) yield reversed(randomWords(root, 65536));
  const count = source === '4 forks' ? 4 : 8192;
  const forks = Array.from({ length: count }, (_, i) => root.fork(i));
  const each = 2 * Math.ceil(131072 / count);
  while (true) {
    const block = new Int32Array(each * count);
    for (const [fork, words] of forks.map((f) => randomWords(f, each)).entries()) {
      for (let i = 0; i < each; i += 2) {
        block[i * count + 2 * fork] = words[i]!;
        block[i * count + 2 * fork + 1] = words[i + 1]!;
      }
    }
    yield block;
  }
}

function reversed(words: Int32Array): Int32Array {
  const out = new Int32Array(words.length);
  for (let i = 0; i < words.length; i += 2) {
    out[i] = reverse(words[i + 1]!);
    out[i + 1] = reverse(words[i]!);
  }
  return out;
}

function reverse(word: number): number {
  let x = word;
  x = ((x >>> 1) & 0x55555555) | ((x & 0x55555555) << 1);
  x = ((x >>> 2) & 0x33333333) | ((x & 0x33333333) << 2);
  x = ((x >>> 4) & 0x0f0f0f0f) | ((x & 0x0f0f0f0f) << 4);
  x = ((x >>> 8) & 0x00ff00ff) | ((x & 0x00ff00ff) << 8);
  return (x >>> 16) | (x << 16);
}
