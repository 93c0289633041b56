import { CheckpointError } from '../errors.js';
import { sha256 } from './sha256.js';

const blank = '0'.repeat(64);
/** How the checksum begins in the header. Inside a JSON string its quotes would be escaped, so it is unique. */
const mark = new TextEncoder().encode('"sha256":"');

function findDigits(bytes: Uint8Array): number {
  for (let at = 8; at < bytes.length; at++) {
    let i = 0;
    while (i < mark.length && bytes[at + i] === mark[i]) i++;
    if (i === mark.length) return at + i;
  }
  return -1;
}

const write = (bytes: Uint8Array, at: number, digits: string): void =>
  bytes.set(new TextEncoder().encode(digits), at);

/**
 * Makes a file that carries its own checksum: laid out with 64 zeros for it, which are then overwritten by the
 * SHA-256 of that very file. So every byte is covered, the header's length and names included.
 */
export async function sealFile(layOut: (sha256: string) => Uint8Array): Promise<Uint8Array> {
  const bytes = layOut(blank);
  write(bytes, findDigits(bytes), await sha256(bytes));
  return bytes;
}

/** Refuses a file whose checksum, taken as {@link sealFile} does, is not the one it carries. */
export async function verifySeal(where: string, bytes: Uint8Array, digits: string): Promise<void> {
  // Not by slice(), which for a Buffer of Node copies nothing.
  const copy = new Uint8Array(bytes);
  const at = findDigits(copy);
  if (at >= 0) write(copy, at, blank);
  const actual = await sha256(copy);
  if (at >= 0 && actual === digits) return;
  throw new CheckpointError(
    `${where}: the file must match its checksum ${digits}; got ${actual}: it is damaged; use an earlier checkpoint`,
  );
}
