/** Names of the sets that distributions live on. */
export type SupportName =
  | 'real'
  | 'positive'
  | 'unitInterval'
  | 'interval'
  | 'ray'
  | 'circle'
  | 'binary'
  | 'count'
  | 'categories'
  | 'realVector';

/** The set a distribution lives on. */
export interface Support {
  readonly name: SupportName;
  /** Number of axes of one point: 0 for scalars. */
  readonly pointRank: number;
  /** Whether points are counted (mass) rather than measured (density). */
  readonly discrete: boolean;
}

/** All real numbers. */
export const real: Support = { name: 'real', pointRank: 0, discrete: false };
/** The positive real numbers. */
export const positive: Support = { name: 'positive', pointRank: 0, discrete: false };
/** The numbers from zero to one. */
export const unitInterval: Support = { name: 'unitInterval', pointRank: 0, discrete: false };
/** An interval that the parameters set. */
export const interval: Support = { name: 'interval', pointRank: 0, discrete: false };
/** The numbers from one that the parameters set. */
export const ray: Support = { name: 'ray', pointRank: 0, discrete: false };
/** The angles from −π to π, whose ends are one point; functions of an angle have period 2π. */
export const circle: Support = { name: 'circle', pointRank: 0, discrete: false };
/** Zero and one. */
export const binary: Support = { name: 'binary', pointRank: 0, discrete: true };
/** The whole numbers from zero. */
export const count: Support = { name: 'count', pointRank: 0, discrete: true };
/** The whole numbers from zero below the number of categories. */
export const categories: Support = { name: 'categories', pointRank: 0, discrete: true };
/** Vectors of real numbers. */
export const realVector: Support = { name: 'realVector', pointRank: 1, discrete: false };
