// Compiled by AssemblyScript only. Integers without bias: a random 32-bit word times the bound, the upper
// half kept, the few words that would make some results likelier drawn again (D. Lemire, Fast random integer
// generation in an interval, ACM TOMACS 29(1), 2019, algorithm 5).
import { nextWord } from './_randomWords';

// @ts-ignore: decorator
@inline
function below(bound: u32): u32 {
  let product = (nextWord() >> 32) * <u64>bound;
  if (<u32>product < bound) {
    const threshold: u32 = (0 - bound) % bound;
    while (<u32>product < threshold) product = (nextWord() >> 32) * <u64>bound;
  }
  return <u32>(product >> 32);
}

export function fillIntegers(out: usize, n: i32, bound: i32): void {
  for (let end = out + 4 * <usize>n; out < end; out += 4) store<u32>(out, below(<u32>bound));
}

/** A uniformly random order of 0 … n − 1 (Fisher and Yates; Durstenfeld's in-place form, CACM 7, 1964). */
export function fillPermutation(out: usize, n: i32): void {
  for (let i = 0; i < n; i++) {
    const j = <i32>below(<u32>(i + 1));
    // The new element goes to place j and what stood there to the end: no pass to fill the array first.
    store<i32>(out + 4 * <usize>i, load<i32>(out + 4 * <usize>j));
    store<i32>(out + 4 * <usize>j, i);
  }
}

/** The random bits themselves, as 32-bit words: the lower half of each 64-bit word, then the upper half. */
export function fillWords(out: usize, n: i32): void {
  for (let i = 0; i < n; i += 2) {
    const word = nextWord();
    store<u32>(out + 4 * <usize>i, <u32>word);
    if (i + 1 < n) store<u32>(out + 4 * <usize>i, <u32>(word >> 32), 4);
  }
}
