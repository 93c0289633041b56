import { createHash } from 'node:crypto';
import { afterEach, expect, it, vi } from 'vitest';
import { sha256, sha256Portable } from '../../src/training/sha256.js';

afterEach(() => vi.unstubAllGlobals());

const pattern = (length: number) => Uint8Array.from({ length }, (_, i) => (i * 167 + (i >> 3)) & 255);

it('gives the published digest of "abc" (FIPS 180-2, appendix B.1)', async () => {
  const abc = new TextEncoder().encode('abc');
  const published = 'ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad';
  expect(sha256Portable(abc)).toBe(published);
  expect(await sha256(abc)).toBe(published);
});

it('agrees with the platform at every length around the block size, and inside a larger buffer', async () => {
  for (let length = 0; length <= 260; length++) {
    const bytes = pattern(length + 3).subarray(3);
    const expected = createHash('sha256').update(bytes).digest('hex');
    expect(sha256Portable(bytes)).toBe(expected);
    expect(await sha256(bytes)).toBe(expected);
  }
  const large = pattern(1_000_003);
  expect(sha256Portable(large)).toBe(createHash('sha256').update(large).digest('hex'));
});

it('works on a page without a secure context', async () => {
  vi.stubGlobal('crypto', {});
  expect(await sha256(pattern(100))).toBe(createHash('sha256').update(pattern(100)).digest('hex'));
});
