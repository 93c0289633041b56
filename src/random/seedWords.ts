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

/**
 * Eight words from a text of at most 256 characters. The '#' stands at the start and nowhere else, since
 * seedrandom takes a text and its repetitions for the same key. The second pass spreads what is left of the
 * likeness of two similar texts after the first.
 */
function digest(text: string): Int32Array {
  let key = text;
  let words = new Int32Array(8);
  for (let pass = 0; pass < 2; pass++) {
    const next = seedrandom(`#${key}`, { global: false });
    words = Int32Array.from({ length: 8 }, () => next.int32());
    key = `${toHex(words)}!`;
  }
  return words;
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
