/** log(a b) of positive numbers, with relative accuracy where the product is near 1 and no overflow of it. */
export function logProduct(a: number, b: number): number {
  const product = a * b;
  return product > 1.0e-300 && product < 1.0e300 ? Math.log(product) : Math.log(a) + Math.log(b);
}
