/** The number itself: a parameter that only passes through its change of form. @kernel */
export function identity(v: number): number {
  return v;
}
export function identity_v(_v: number): number {
  return 1.0;
}
