import { expect, it } from 'vitest';
import { decodeSafetensors, encodeSafetensors, type StoredTensor } from '../../src/training/safetensors.js';
import { refusal } from './toy.js';

const tensors = new Map<string, StoredTensor>([
  ['a', { dtype: 'F32', shape: [2], bytes: new Uint8Array(new Float32Array([1, -2]).buffer) }],
  ['empty', { dtype: 'F32', shape: [0, 3], bytes: new Uint8Array(0) }],
  ['flag', { dtype: 'BOOL', shape: [3], bytes: Uint8Array.of(1, 0, 1) }],
  ['n', { dtype: 'I32', shape: [], bytes: new Uint8Array(new Int32Array([-7]).buffer) }],
]);

/** A file with a header of one's own. */
function file(header: unknown, dataBytes = 0): Uint8Array {
  const text = new TextEncoder().encode(typeof header === 'string' ? header : JSON.stringify(header));
  const bytes = new Uint8Array(8 + text.length + dataBytes);
  bytes[0] = text.length;
  bytes[1] = text.length >> 8;
  bytes.set(text, 8);
  return bytes;
}

it('lays out length, header and values as the format says', () => {
  const bytes = encodeSafetensors({ metadata: { note: 'é' }, tensors });
  const length = Number(new DataView(bytes.buffer).getBigUint64(0, true));
  expect(length % 8).toBe(0);
  const text = new TextDecoder().decode(bytes.subarray(8, 8 + length));
  expect(text.startsWith('{')).toBe(true);
  expect(JSON.parse(text)).toEqual({
    __metadata__: { note: 'é' },
    a: { dtype: 'F32', shape: [2], data_offsets: [0, 8] },
    empty: { dtype: 'F32', shape: [0, 3], data_offsets: [8, 8] },
    flag: { dtype: 'BOOL', shape: [3], data_offsets: [8, 11] },
    n: { dtype: 'I32', shape: [], data_offsets: [11, 15] },
  });
  expect([...bytes.subarray(8 + length)]).toEqual([0, 0, 128, 63, 0, 0, 0, 192, 1, 0, 1, 249, 255, 255, 255]);
});

it('reads back what it wrote, from the middle of a larger buffer too', () => {
  const bytes = encodeSafetensors({ metadata: { note: 'é' }, tensors });
  const larger = new Uint8Array(bytes.length + 5);
  larger.set(bytes, 3);
  const { metadata, tensors: read } = decodeSafetensors('f', larger.subarray(3, 3 + bytes.length));
  expect(metadata).toEqual({ note: 'é' });
  expect([...read].map(([name, t]) => [name, t.dtype, t.shape, [...t.bytes]])).toEqual(
    [...tensors].map(([name, t]) => [name, t.dtype, t.shape, [...t.bytes]]),
  );
});

const entry = { dtype: 'F32', shape: [1], data_offsets: [0, 4] };
const begin = 'CheckpointError: f: the file must be a whole safetensors file; got ';
const end = '; use an earlier checkpoint';
it.each([
  ['too short', new Uint8Array(5), '5 bytes, too few for a header'],
  [
    'a cut header',
    file({ a: entry }).subarray(0, 30),
    '30 bytes where the header alone takes 62: truncated or damaged',
  ],
  [
    'a huge length',
    new Uint8Array(16).fill(255),
    '16 bytes where the header alone takes 18446744073709551623: truncated or damaged',
  ],
  ['no JSON', file('{"a'), 'a damaged header'],
  ['a list', file([]), 'a damaged header'],
  ['metadata of numbers', file({ __metadata__: { a: 1 } }), 'damaged metadata'],
  ['metadata of no object', file({ __metadata__: 'a' }), 'damaged metadata'],
  ['an entry of null', file({ a: null }), 'a damaged entry for a'],
  ['a negative side', file({ a: { ...entry, shape: [-1] } }, 4), 'a damaged entry for a'],
  ['three offsets', file({ a: { ...entry, data_offsets: [0, 4, 8] } }, 4), 'a damaged entry for a'],
  [
    'another type',
    file({ a: { ...entry, dtype: 'F64' } }, 4),
    'the element type F64 for a, where F32, I32 or BOOL is due',
  ],
  [
    'an inherited type',
    file({ a: { ...entry, dtype: 'toString' } }, 4),
    'the element type toString for a, where F32, I32 or BOOL is due',
  ],
  [
    'a gap',
    file({ a: { ...entry, data_offsets: [4, 8] } }, 8),
    'bytes 4 to 8 for a of type F32 and shape [1]: a damaged header',
  ],
  [
    'a wrong size',
    file({ a: { ...entry, shape: [2] } }, 4),
    'bytes 0 to 4 for a of type F32 and shape [2]: a damaged header',
  ],
  ['missing values', file({ a: entry }, 2), '64 bytes where the header announces 66: truncated or damaged'],
  ['values too many', file({ a: entry }, 6), '68 bytes where the header announces 66: truncated or damaged'],
])('refuses %s', async (_, bytes, got) => {
  expect(await refusal(() => decodeSafetensors('f', bytes))).toBe(begin + got + end);
});
