import { LOG_PI } from './constants.js';
import { digammaDifference } from './digammaDifference.js';
import { NODES, WEIGHTS } from './gaussLegendre.js';
import { betaSide, betaSlopeA, betaTail, incompleteBeta } from './incompleteBetaCore.js';
import { log1pmx } from './log1pmx.js';
import { logGammaDifference } from './logGammaDifference.js';

/** Which share the last call of `studentT` computed: 0 between 0 and s, 1 beyond s. */
export let studentTSide: number = 0.0;
/** That share divided by the density at s. */
export let studentTPart: number = 0.0;
/** ds/dν at a fixed share. */
export let studentTSlope: number = 0.0;

/** From this many degrees of freedom on the integrals are evaluated directly. */
const LARGE: number = 100.0;
/** The derivative of the density in ν changes sign near this point, √(1 + √2) for large ν. */
const TURN: number = 1.55;

/** The logarithm of the density Γ((ν+1)/2) / (√(νπ) Γ(ν/2)) (1 + s²/ν)^{−(ν+1)/2}. */
export function studentTLogDensity(s: number, nu: number): number {
  const norm = logGammaDifference(0.5 * nu, 0.5) - 0.5 * (Math.log(nu) + LOG_PI);
  return norm - 0.5 * (nu + 1.0) * Math.log1p((s * s) / nu);
}

/**
 * Student's t law with ν degrees of freedom at s ≥ 0: a share in units of the density at s, and how s moves with
 * ν at a fixed share.
 *
 * Below 100 degrees of freedom twice the upper share is I_w(ν/2, ½) with w = ν / (ν + s²), whose own unit D is s
 * times the density, so that ds/dν = (s/2) ((∂I/∂a) / (2D) + 1/ν). That sum cancels to (s + s³) / (4ν²) for large
 * ν: from 100 on ds/dν is the integral of ∂ log p/∂ν in units of the density, over [0, s] below its change of
 * sign and over [s, ∞) beyond, so that nothing cancels; the second in the variable log(t/s), in which the
 * density is log-concave.
 * Source: DLMF 8.17.2 for the shares; Figurnov, Mohamed and Mnih (2018), "Implicit reparameterization gradients",
 * equation 6, for the derivative.
 */
export function studentT(s: number, nu: number): void {
  if (s === 0.0) {
    studentTSide = 0.0;
    studentTPart = 0.0;
    studentTSlope = 0.0;
  } else if (nu < LARGE) {
    // A quantile of few degrees of freedom may be so large that its square overflows.
    const far = s > 1.0e100;
    const q = (s * s) / nu;
    const r = far ? nu / s / s : 1.0 / (1.0 + q);
    const logR = far ? Math.log(nu) - 2.0 * Math.log(s) : -Math.log1p(q);
    incompleteBeta(0.5 * nu, 0.5, r, far ? 1.0 : q * r, logR, far ? 0.0 : Math.log(q) + logR);
    studentTSide = 1.0 - betaSide;
    studentTPart = 0.5 * s * betaTail;
    studentTSlope = 0.5 * s * (0.5 * betaSlopeA + 1.0 / nu);
  } else if (s < TURN) inner(s, nu);
  else outer(s, nu);
}

/** ψ((ν+1)/2) − ψ(ν/2) − 1/ν = 1/(2ν²) − …, from the difference of two series DLMF 5.11.2. */
function normSlope(nu: number): number {
  const u = 1.0 / (nu * nu);
  if (nu >= LARGE) return u * (0.5 + u * (-0.25 + u * (0.5 - 2.125 * u)));
  return digammaDifference(0.5 * nu, 0.5) - 1.0 / nu;
}

/** Twice ∂ log p/∂ν at the point with t²/ν = q; every term is of the order of 1/ν² or q². */
function scoreTwice(q: number, nu: number, constant: number): number {
  const share = q / (1.0 + q);
  const change = q < 0.5 ? -log1pmx(q) - q * share : share - Math.log1p(q);
  return constant + change + share / nu;
}

function inner(s: number, nu: number): void {
  const constant = normSlope(nu);
  const half = 0.5 * s;
  const power = 0.5 * (nu + 1.0);
  const top = (s * s) / nu;
  let sum = 0.0;
  let slope = 0.0;
  for (let i = 0; i < 24; i++) {
    const k = i < 12 ? i : i - 12;
    const t = half * (i < 12 ? 1.0 - NODES[k]! : 1.0 + NODES[k]!);
    const q = (t * t) / nu;
    const weight = WEIGHTS[k]! * Math.exp(power * Math.log1p((top - q) / (1.0 + q)));
    sum += weight;
    slope += weight * scoreTwice(q, nu, constant);
  }
  studentTSide = 0.0;
  studentTPart = half * sum;
  studentTSlope = -0.5 * half * slope;
}

function outer(s: number, nu: number): void {
  const constant = normSlope(nu);
  const power = 0.5 * (nu + 1.0);
  const top = (s * s) / nu;
  const share = top / (1.0 + top);
  // Where the density times t has fallen by about e^−50.
  const half = 0.25 * Math.log1p(Math.expm1(52.0 / power) / share);
  let sum = 0.0;
  let slope = 0.0;
  for (let i = 0; i < 24; i++) {
    const k = i < 12 ? i : i - 12;
    const v = half * (i < 12 ? 1.0 - NODES[k]! : 1.0 + NODES[k]!);
    const weight = WEIGHTS[k]! * Math.exp(v - power * Math.log1p(share * Math.expm1(2.0 * v)));
    sum += weight;
    slope += weight * scoreTwice(top * Math.exp(2.0 * v), nu, constant);
  }
  studentTSide = 1.0;
  studentTPart = s * half * sum;
  studentTSlope = 0.5 * s * half * slope;
}
