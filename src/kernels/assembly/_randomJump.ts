// Compiled by AssemblyScript only. Moves a xoshiro256++ state LEAP words ahead in one go. The step is linear over
// the bits of the state (Blackman and Vigna 2021, section 4), so the state after many steps is the exclusive or of
// those that its single bits lead to: looked up here for four bits at a time, in a table made on first use.

export const LEAP: i32 = 512;

// For each of 64 nibbles 16 states of 32 bytes.
const table: usize = memory.data(64 * 16 * 32, 16);
let made: bool = false;

function leap(at: usize): void {
  let s0 = load<u64>(at);
  let s1 = load<u64>(at, 8);
  let s2 = load<u64>(at, 16);
  let s3 = load<u64>(at, 24);
  for (let i = 0; i < LEAP; i++) {
    const t = s1 << 17;
    s2 ^= s0;
    s3 ^= s1;
    s1 ^= s2;
    s0 ^= s3;
    s2 ^= t;
    s3 = rotl(s3, 45);
  }
  store<u64>(at, s0);
  store<u64>(at, s1, 8);
  store<u64>(at, s2, 16);
  store<u64>(at, s3, 24);
}

function make(): void {
  for (let nibble = 0; nibble < 64; nibble++) {
    const states = table + (<usize>nibble << 9);
    for (let bits = 1; bits < 16; bits++) {
      const to = states + (<usize>bits << 5);
      const lowest = bits & -bits;
      if (bits == lowest) {
        store<u64>(to + (<usize>(nibble >> 4) << 3), <u64>bits << (4 * (nibble & 15)));
        leap(to);
      } else {
        const one = states + (<usize>lowest << 5);
        const rest = states + (<usize>(bits ^ lowest) << 5);
        for (let k: usize = 0; k < 32; k += 8) store<u64>(to + k, load<u64>(one + k) ^ load<u64>(rest + k));
      }
    }
  }
  made = true;
}

export function jump(state: usize): void {
  if (!made) make();
  let low = i64x2.splat(0);
  let high = i64x2.splat(0);
  let states = table;
  for (let word: usize = 0; word < 32; word += 8) {
    let bits = load<u64>(state + word);
    for (let nibble = 0; nibble < 16; nibble++) {
      const from = states + ((<usize>bits & 15) << 5);
      low = v128.xor(low, v128.load(from));
      high = v128.xor(high, v128.load(from, 16));
      bits >>= 4;
      states += 512;
    }
  }
  v128.store(state, low);
  v128.store(state, high, 16);
}
