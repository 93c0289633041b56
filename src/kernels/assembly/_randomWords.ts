// Compiled by AssemblyScript only. The source of all random bits: xoshiro256++ (D. Blackman and S. Vigna,
// Scrambled linear pseudorandom number generators, ACM TOMS 47(4), 2021, figure 4). Its 256 bits of state
// are four little-endian 64-bit words, so a caller saves a stream by copying 32 bytes.
//
// Words are made in blocks and taken from there; `closeStream` goes back to the place right behind the last word
// that was taken. In long blocks two halves are made at once, which gives the same words.
import { jump, LEAP } from './_randomJump';

const SHORTEST: usize = 16;
const LONGEST: usize = <usize>(2 * LEAP);

const buffer: usize = memory.data(2 * 512 * 8, 16);
/** The generator where the block starts and where it ends. */
const origin: usize = memory.data(32, 16);
const ahead: usize = memory.data(32, 16);
const half: usize = memory.data(32, 16);
let size: usize = 0;

/** The next word and the end of those that are there. */
let next: usize = 0;
let end: usize = 0;

/** To be called before words are taken. */
export function openStream(state: usize): void {
  memory.copy(ahead, state, 32);
  memory.copy(origin, state, 32);
  next = buffer;
  end = buffer;
  size = SHORTEST;
}

/** Leaves the state right behind the last word that was taken. */
export function closeStream(state: usize): void {
  const taken = (next - buffer) >> 3;
  if (next == end) memory.copy(state, ahead, 32);
  else if (taken >= <usize>LEAP && end - buffer == 8 * LONGEST) {
    memory.copy(state, half, 32);
    advance(state, taken - <usize>LEAP, 0);
  } else {
    memory.copy(state, origin, 32);
    advance(state, taken, 0);
  }
}

/** Makes `n` words, at `out` unless that is 0. */
function advance(state: usize, n: usize, out: usize): void {
  let s0 = load<u64>(state);
  let s1 = load<u64>(state, 8);
  let s2 = load<u64>(state, 16);
  let s3 = load<u64>(state, 24);
  for (let i: usize = 0; i < n; i++) {
    if (out != 0) store<u64>(out + (i << 3), rotl(s0 + s3, 23) + s0);
    const t = s1 << 17;
    s2 ^= s0;
    s3 ^= s1;
    s1 ^= s2;
    s0 ^= s3;
    s2 ^= t;
    s3 = rotl(s3, 45);
  }
  store<u64>(state, s0);
  store<u64>(state, s1, 8);
  store<u64>(state, s2, 16);
  store<u64>(state, s3, 24);
}

// @ts-ignore: decorator
@inline
function rotated(x: v128, k: i32): v128 {
  return v128.or(i64x2.shl(x, k), i64x2.shr_u(x, 64 - k));
}

/** A block of the longest size: one lane makes its first half, the other, LEAP words ahead, its second half. */
function advanceTwice(): void {
  memory.copy(half, ahead, 32);
  jump(half);
  let s0 = v128.load64_lane(half, v128.load64_zero(ahead), 1);
  let s1 = v128.load64_lane(half, v128.load64_zero(ahead, 8), 1, 8);
  let s2 = v128.load64_lane(half, v128.load64_zero(ahead, 16), 1, 16);
  let s3 = v128.load64_lane(half, v128.load64_zero(ahead, 24), 1, 24);
  for (let out = buffer, last = buffer + 8 * LEAP; out < last; out += 8) {
    const words = i64x2.add(rotated(i64x2.add(s0, s3), 23), s0);
    v128.store64_lane(out, words, 0);
    v128.store64_lane(out, words, 1, 8 * LEAP);
    const t = i64x2.shl(s1, 17);
    s2 = v128.xor(s2, s0);
    s3 = v128.xor(s3, s1);
    s1 = v128.xor(s1, s2);
    s0 = v128.xor(s0, s3);
    s2 = v128.xor(s2, t);
    s3 = rotated(s3, 45);
  }
  v128.store64_lane(ahead, s0, 1);
  v128.store64_lane(ahead, s1, 1, 8);
  v128.store64_lane(ahead, s2, 1, 16);
  v128.store64_lane(ahead, s3, 1, 24);
}

function refill(): void {
  memory.copy(origin, ahead, 32);
  next = buffer;
  end = buffer + 8 * size;
  if (size < LONGEST) {
    advance(ahead, size, buffer);
    size <<= 2;
  } else advanceTwice();
}

/** 64 random bits. */
// @ts-ignore: decorator
@inline
export function nextWord(): u64 {
  if (next == end) refill();
  const word = load<u64>(next);
  next += 8;
  return word;
}

/** Where the next words stand, and how many of at least one. */
export function wordsAhead(): usize {
  if (next == end) refill();
  return next;
}
// @ts-ignore: decorator
@inline
export function wordsEnd(): usize {
  return end;
}

/** Goes on to the word at `to`, which lies in the block. */
// @ts-ignore: decorator
@inline
export function takeUpTo(to: usize): void {
  next = to;
}

/** The middles of 2^52 equal cells of the unit interval: never 0, never 1, symmetric about 1/2. */
// @ts-ignore: decorator
@inline
export function nextCell(): f64 {
  return cellOf(nextWord());
}
// @ts-ignore: decorator
@inline
export function cellOf(word: u64): f64 {
  return <f64>(<i64>((word >> 11) | 1)) * (1.0 / 9007199254740992.0);
}

/**
 * A uniform on (0, 1] whose 53 significant bits follow its exponent, so that P(U < x) = x down to 2^-63:
 * the one to take a logarithm of.
 */
// @ts-ignore: decorator
@inline
export function nextFine(): f64 {
  return <f64>(<i64>((nextWord() >> 1) | 1)) * (1.0 / 9223372036854775808.0);
}
