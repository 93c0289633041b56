import seedrandom from 'seedrandom';
import { StreamError } from '../errors.js';

/** Length of a piece of label that one step absorbs; with the rest it stays below the 256 that seedrandom keeps apart. */
const piece = 128;

/**
 * Text → ASCII text without '#', one to one: a letter for the type, then every character outside printable
 * ASCII, and '#' and the backslash, as its UTF-16 code. seedrandom uses eight bits of a character only.
 */
function encode(label: string | number): string {
  if (typeof label === 'number') return `n${label}`;
  return `s${label.replace(/[^ -~]|[#\\]/g, (c) => `\\${c.charCodeAt(0).toString(16).padStart(4, '0')}`)}`;
}

/** The last steps of MurmurHash3 (A. Appleby, 2011): each bit of the result hangs on each bit of the word. */
function mixed(word: number): string {
  let h = word;
  h = Math.imul(h ^ (h >>> 16), 0x85ebca6b);
  h = Math.imul(h ^ (h >>> 13), 0xc2b2ae35);
  return ((h ^ (h >>> 16)) >>> 0).toString(16).padStart(8, '0');
}

/** Sixteen hexadecimal digits that differ nearly everywhere where two texts differ anywhere. */
function spread(text: string): string {
  let a = 0x811c9dc5;
  let b = 0x3c6ef372;
  for (let i = 0; i < text.length; i++) {
    const code = text.charCodeAt(i);
    a = Math.imul(a ^ code, 0x01000193);
    b = Math.imul(((b << 13) | (b >>> 19)) ^ code, 0x9e3779b1);
  }
  return mixed(a) + mixed(b);
}

/**
 * Eight words from a text of at most 239 characters. seedrandom's RC4 takes a text and its repetitions for
 * the same key, hence the '#', which stands nowhere else. And of two texts that differ only by one sign being
 * a little up and another as much down it makes the very same stream once in some 100,000 times (a kin of the
 * collisions of M. Matsui, Key collisions of the RC4 stream cipher, 2009): numbers such as 126519 and 126564
 * are such texts. The digits of {@link spread} in front make sure that two keys differ in many places.
 */
function digest(text: string): Int32Array {
  const next = seedrandom(`#${spread(text)}${text}`, { global: false });
  return Int32Array.from({ length: 8 }, () => next.int32());
}

/** Eight 32-bit words as 64 hexadecimal digits: four 64-bit words, each with its leading digit first. */
export function toHex(words: Int32Array): string {
  let text = '';
  for (let i = 0; i < 8; i += 2) {
    for (const word of [words[i + 1]!, words[i]!]) text += (word >>> 0).toString(16).padStart(8, '0');
  }
  return text;
}

/** The inverse of {@link toHex}; `undefined` for anything else. */
export function fromHex(text: unknown): Int32Array | undefined {
  if (typeof text !== 'string' || !/^[0-9a-f]{64}$/.test(text)) return undefined;
  return Int32Array.from({ length: 8 }, (_, i) =>
    Number.parseInt(text.slice(8 * (i ^ 1), 8 * (i ^ 1) + 8), 16),
  );
}

/**
 * The 256-bit seed of the child that `label` names below the seed `parent`, or of a root where there is no
 * parent. Text that is longer than a piece is absorbed piece by piece, each on top of the last.
 */
export function seedWords(caller: string, word: string, label: string | number, parent?: string): Int32Array {
  checkLabel(caller, word, label);
  const text = encode(label);
  let seed = parent ?? 'root';
  let at = 0;
  for (; text.length - at > piece; at += piece) seed = toHex(digest(`${seed}+${text.slice(at, at + piece)}`));
  return digest(`${seed}.${text.slice(at)}`);
}

function checkLabel(caller: string, word: string, label: unknown): void {
  if (typeof label === 'number' && Number.isFinite(label)) return;
  if (typeof label === 'string' && label.length > 0) return;
  const got =
    typeof label === 'number' || label === null
      ? String(label)
      : label === ''
        ? "''"
        : `a value of type ${typeof label}`;
  throw new StreamError(
    `${caller}: ${word} must be a finite number or a text that is not empty; got ${got}; pass for example 1 or 'weights'`,
  );
}
