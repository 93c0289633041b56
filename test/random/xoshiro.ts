// The generator once more, from the publication, in plain big integers.
const mask = (1n << 64n) - 1n;
const rotate = (x: bigint, k: bigint) => ((x << k) | (x >> (64n - k))) & mask;

export class Xoshiro {
  constructor(private readonly s: [bigint, bigint, bigint, bigint]) {}

  static fromHex(text: string): Xoshiro {
    const [a, b, c, d] = text.match(/.{16}/g)!.map((digits) => BigInt(`0x${digits}`));
    return new Xoshiro([a!, b!, c!, d!]);
  }

  hex(): string {
    return this.s.map((word) => word.toString(16).padStart(16, '0')).join('');
  }

  next(): bigint {
    const s = this.s;
    const word = (rotate((s[0] + s[3]) & mask, 23n) + s[0]) & mask;
    const t = (s[1] << 17n) & mask;
    s[2] ^= s[0];
    s[3] ^= s[1];
    s[1] ^= s[2];
    s[0] ^= s[3];
    s[2] ^= t;
    s[3] = rotate(s[3], 45n);
    return word;
  }
}
