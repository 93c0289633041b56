/**
 * What the rounded sum of a and b has lost. Source: Knuth, The Art of Computer Programming 2, section 4.2.2,
 * theorem B.
 */
export function lostBits(a: number, b: number, sum: number): number {
  const back = sum - a;
  return a - (sum - back) + (b - back);
}
