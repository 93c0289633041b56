// Constants that several formulas share. A value with a LOW part is correct to twice double precision as the
// sum of the two: subtracting HIGH and then LOW measures a distance to it without rounding the constant.

/** log 2, rounded to double. */
export const LN2: number = 0.6931471805599453;
/** log 2 − LN2. */
export const LN2_LOW: number = 2.3190468138462996e-17;
/** √(1/2). */
export const SQRT_HALF: number = 0.7071067811865476;
/** √(2/π). */
export const SQRT_2_OVER_PI: number = 0.7978845608028654;
/** √(π/2). */
export const SQRT_HALF_PI: number = 1.2533141373155003;
/** √(2π). */
export const SQRT_2PI: number = 2.5066282746310007;
/** ½ log(2π). */
export const HALF_LOG_2PI: number = 0.9189385332046728;
/** 2/√π. */
export const TWO_OVER_SQRT_PI: number = 1.1283791670955126;
/** √π. */
export const SQRT_PI: number = 1.772453850905516;
/** π. */
export const PI: number = 3.141592653589793;
/** π − PI. */
export const PI_LOW: number = 1.2246467991473532e-16;
/** log π. */
export const LOG_PI: number = 1.1447298858494002;
/** The Euler–Mascheroni constant. */
export const EULER: number = 0.5772156649015329;
