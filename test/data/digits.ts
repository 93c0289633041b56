import { readFileSync } from 'node:fs';

/** The digits as `[1797, 64]` pixels from 0 to 16, in file order. */
export function readDigits(): { pixels: Float32Array; rows: number } {
  const text = readFileSync(new URL('./digits.csv', import.meta.url), 'utf8').trim();
  const lines = text.split('\n').slice(1);
  const pixels = Float32Array.from(lines.flatMap((line) => line.split(',').slice(0, 64).map(Number)));
  return { pixels, rows: lines.length };
}
