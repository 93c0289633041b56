// Compiled by AssemblyScript only. The source of all random bits: xoshiro256++ (D. Blackman and S. Vigna,
// Scrambled linear pseudorandom number generators, ACM TOMS 47(4), 2021, figure 4). Its 256 bits of state
// are four little-endian 64-bit words at `state`, so a caller saves a stream by copying 32 bytes.

/** Advances the generator and returns 64 random bits. */
// @ts-ignore: decorator
@inline
export function nextWord(state: usize): u64 {
  let s0 = load<u64>(state);
  let s1 = load<u64>(state, 8);
  let s2 = load<u64>(state, 16);
  let s3 = load<u64>(state, 24);
  const word = rotl(s0 + s3, 23) + s0;
  const t = s1 << 17;
  s2 ^= s0;
  s3 ^= s1;
  s1 ^= s2;
  s0 ^= s3;
  s2 ^= t;
  s3 = rotl(s3, 45);
  store<u64>(state, s0);
  store<u64>(state, s1, 8);
  store<u64>(state, s2, 16);
  store<u64>(state, s3, 24);
  return word;
}

/** The middles of 2^52 equal cells of the unit interval: never 0, never 1, symmetric about 1/2. */
// @ts-ignore: decorator
@inline
export function nextCell(state: usize): f64 {
  return <f64>(<i64>((nextWord(state) >> 11) | 1)) * (1.0 / 9007199254740992.0);
}

/**
 * A uniform on (0, 1] whose 53 significant bits follow its exponent, so that P(U < x) = x down to 2^-63:
 * the one to take a logarithm of.
 */
// @ts-ignore: decorator
@inline
export function nextFine(state: usize): f64 {
  return <f64>(<i64>((nextWord(state) >> 1) | 1)) * (1.0 / 9223372036854775808.0);
}
