/** The first 32 bits of the fractional parts of the cube roots of the first 64 primes (FIPS 180-4, 4.2.2). */
const roundConstants = fractionalBits(64, 1 / 3);
/** The same of the square roots of the first 8 primes (FIPS 180-4, 5.3.3). */
const initialState = fractionalBits(8, 1 / 2);

function fractionalBits(count: number, power: number): Uint32Array {
  const bits = new Uint32Array(count);
  for (let candidate = 2, found = 0; found < count; candidate++) {
    let prime = true;
    for (let divisor = 2; divisor * divisor <= candidate; divisor++)
      if (candidate % divisor === 0) prime = false;
    if (!prime) continue;
    const root = candidate ** power;
    bits[found++] = Math.floor((root - Math.floor(root)) * 2 ** 32);
  }
  return bits;
}

const rotate = (x: number, by: number): number => (x >>> by) | (x << (32 - by));

function compress(state: Uint32Array, view: DataView, at: number, schedule: Uint32Array): void {
  for (let i = 0; i < 16; i++) schedule[i] = view.getUint32(at + 4 * i);
  for (let i = 16; i < 64; i++) {
    const x = schedule[i - 15]!;
    const y = schedule[i - 2]!;
    const small0 = rotate(x, 7) ^ rotate(x, 18) ^ (x >>> 3);
    const small1 = rotate(y, 17) ^ rotate(y, 19) ^ (y >>> 10);
    schedule[i] = schedule[i - 16]! + small0 + schedule[i - 7]! + small1;
  }
  let [a, b, c, d, e, f, g, h] = state as unknown as [
    number,
    number,
    number,
    number,
    number,
    number,
    number,
    number,
  ];
  for (let i = 0; i < 64; i++) {
    const big1 = rotate(e, 6) ^ rotate(e, 11) ^ rotate(e, 25);
    const first = (h + big1 + ((e & f) ^ (~e & g)) + roundConstants[i]! + schedule[i]!) | 0;
    const big0 = rotate(a, 2) ^ rotate(a, 13) ^ rotate(a, 22);
    const second = (big0 + ((a & b) ^ (a & c) ^ (b & c))) | 0;
    h = g;
    g = f;
    f = e;
    e = (d + first) | 0;
    d = c;
    c = b;
    b = a;
    a = (first + second) | 0;
  }
  for (const [i, word] of [a, b, c, d, e, f, g, h].entries()) state[i] = state[i]! + word;
}

/** SHA-256 in plain TypeScript, for pages without a secure context, where the platform offers none. */
export function sha256Portable(bytes: Uint8Array): string {
  const state = initialState.slice();
  const schedule = new Uint32Array(64);
  const whole = bytes.length & ~63;
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  for (let at = 0; at < whole; at += 64) compress(state, view, at, schedule);
  const rest = bytes.length - whole;
  const tail = new Uint8Array(rest + 9 <= 64 ? 64 : 128);
  tail.set(bytes.subarray(whole));
  tail[rest] = 0x80;
  const tailView = new DataView(tail.buffer);
  tailView.setUint32(tail.length - 8, Math.floor(bytes.length / 2 ** 29));
  tailView.setUint32(tail.length - 4, bytes.length << 3);
  for (let at = 0; at < tail.length; at += 64) compress(state, tailView, at, schedule);
  return Array.from(state, (word) => word.toString(16).padStart(8, '0')).join('');
}

/** SHA-256 in lower-case hexadecimal (FIPS 180-4), by the platform where it offers it. */
export async function sha256(bytes: Uint8Array): Promise<string> {
  const subtle = globalThis.crypto?.subtle;
  if (!subtle) return sha256Portable(bytes);
  const digest = new Uint8Array(await subtle.digest('SHA-256', bytes as Uint8Array<ArrayBuffer>));
  return Array.from(digest, (byte) => byte.toString(16).padStart(2, '0')).join('');
}
