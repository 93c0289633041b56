// Compiled by AssemblyScript only. Draws made of normals: Cauchy, Student's t, inverse Gaussian, von Mises.
import { drawGamma, expOf, exponentOf, factorOf } from './_randomGammas';
import { storeAngle, storePositive, storeReal } from './_randomRound';
import { nextNormal } from './_randomScalars';
import { nextCell, nextFine } from './_randomWords';

/** A ratio of two normals: both are continuous, so neither the tails nor the middle have a grain. */
// @ts-ignore: decorator
@inline
function nextCauchy(): f64 {
  const above = nextNormal();
  return above / nextNormal();
}

// @ts-ignore: decorator
@inline
function at(array: usize, i: i32): f64 {
  return <f64>load<f32>(array + 4 * <usize>i);
}

export function fillCauchy(out: usize, n: i32): void {
  for (let i = 0; i < n; i++) store<f32>(out + 4 * <usize>i, <f32>nextCauchy());
}

/** A normal over the root of an independent gamma of shape ν/2 and mean 1 (Student's definition). */
export function fillStudentT(out: usize, n: i32, degreesOfFreedom: usize): void {
  for (let i = 0; i < n; i++) {
    const half = 0.5 * at(degreesOfFreedom, i);
    const normal = nextNormal();
    drawGamma(half);
    storeReal(out + 4 * <usize>i, normal * Math.sqrt(half / factorOf(0)) * expOf(-0.5 * exponentOf(0)));
  }
}

/**
 * J. R. Michael, W. R. Schucany and R. W. Haas, Generating random variates using transformations with multiple
 * roots, The American Statistician 30(2), 1976. With w = mean · normal² / (2 shape) the roots over the mean are
 * 1 + w ± √(w(w + 2)), each the other's reciprocal; the larger one is a plain sum, so neither cancels. The larger
 * is taken with probability s/(1 + s), s the smaller.
 */
export function fillInverseGaussian(out: usize, n: i32, means: usize, shapes: usize): void {
  for (let i = 0; i < n; i++) {
    const mean = at(means, i);
    const normal = nextNormal();
    const w = (0.5 * normal * normal * mean) / at(shapes, i);
    const large = 1.0 + w + Math.sqrt(w * (w + 2.0));
    storePositive(out + 4 * <usize>i, nextFine() * (large + 1.0) < 1.0 ? mean * large : mean / large);
  }
}

/**
 * D. J. Best and N. I. Fisher, Efficient simulation of the von Mises distribution, Applied Statistics 28(2), 1979:
 * rejection from a wrapped Cauchy, written in the tangent of half the angle, which is then a Cauchy draw times
 * √(s/(s + 2)), where their r = 1 + s. With m = κ s = (1 + 1/(√(1 + 4κ²) + 2κ))/2 their c = κ(r − cos θ) is
 * m + 2κ t²/(1 + t²): nothing cancels, however small or large κ is.
 */
export function fillVonMises(out: usize, n: i32, concentrations: usize): void {
  for (let i = 0; i < n; i++) {
    const kappa = at(concentrations, i);
    const m = 0.5 + 0.5 / (Math.sqrt(1.0 + 4.0 * kappa * kappa) + 2.0 * kappa);
    const narrow = Math.sqrt(m / (m + 2.0 * kappa));
    while (true) {
      const t = narrow * nextCauchy();
      const c = m + (2.0 * kappa * t * t) / (1.0 + t * t);
      const u = nextCell();
      if (u < c * (2.0 - c) || Math.log(c / u) + 1.0 >= c) {
        storeAngle(out + 4 * <usize>i, 2.0 * Math.atan(t));
        break;
      }
    }
  }
}
