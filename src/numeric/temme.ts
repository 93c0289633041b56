// Temme's uniform expansion of the incomplete gamma functions, for large a and x of its order.

/** Σ C_k(η) a^−k, left by `temme`. */
export let temmeSum: number = 0.0;
/** Its derivative in a at fixed x, where dη/da = −(μ/η) / a, left by `temme`. */
export let temmeSlope: number = 0.0;

let c: number = 0.0;
let slope: number = 0.0;
let power: number = 1.0;

/** One step of Horner's rule for a polynomial and its derivative. */
function next(eta: number, coefficient: number): void {
  slope = c + eta * slope;
  c = coefficient + eta * c;
}

/** Adds C_k a^−k, whose polynomial the last calls of `next` made, and starts the next polynomial. */
function addTerm(k: number, r: number, ratio: number): void {
  temmeSum += c * power;
  temmeSlope -= (slope * ratio + k * c) * r * power;
  power *= r;
  c = 0.0;
  slope = 0.0;
}

/**
 * The remainder of Q(a, x) = ½ erfc(η √(a/2)) + e^{−aη²/2} / √(2πa) · Σ_k C_k(η) a^−k, with ½η² = μ − log(1 + μ)
 * and μ = (x − a) / a: leaves the sum and its derivative in a. `ratio` is μ / η (1 at η = 0).
 *
 * Six coefficients as Taylor polynomials in η: for a ≥ 60 and |μ| ≤ 0.3 (|η| ≤ 0.34) what is left out is below
 * 1e-12. Source: Temme (1979), "The asymptotic expansion of the incomplete gamma functions"; DLMF 8.12.3 and
 * 8.12.7–8.12.12, whose recurrence gave the coefficients in 60-digit arithmetic.
 */
export function temme(a: number, eta: number, ratio: number): void {
  const r = 1.0 / a;
  temmeSum = 0.0;
  temmeSlope = 0.0;
  power = 1.0;
  c = 0.0;
  slope = 0.0;
  next(eta, -4.382036018453353e-9);
  next(eta, 1.0261809784240309e-8);
  next(eta, 6.707853543401498e-9);
  next(eta, -1.7665952736826078e-7);
  next(eta, 8.296711340953087e-7);
  next(eta, -1.85406221071516e-6);
  next(eta, -2.185448510679992e-6);
  next(eta, 3.919263178522438e-5);
  next(eta, -0.0001787551440329218);
  next(eta, 0.0003527336860670194);
  next(eta, 0.0011574074074074073);
  next(eta, -0.014814814814814815);
  next(eta, 0.08333333333333333);
  next(eta, -0.3333333333333333);
  addTerm(0.0, r, ratio);
  next(eta, 1.1951628599778148e-8);
  next(eta, -5.752545603517705e-8);
  next(eta, 1.378633446915721e-7);
  next(eta, 4.647127802807434e-9);
  next(eta, -1.6120900894563446e-6);
  next(eta, 7.64916091608111e-6);
  next(eta, -1.8098550334489977e-5);
  next(eta, -4.018775720164609e-7);
  next(eta, 0.00020576131687242798);
  next(eta, -0.0009902263374485596);
  next(eta, 0.0026455026455026454);
  next(eta, -0.003472222222222222);
  next(eta, -0.001851851851851852);
  addTerm(1.0, r, ratio);
  next(eta, 1.4280614206064242e-7);
  next(eta, -6.298992138380055e-7);
  next(eta, 1.3721957309062934e-6);
  next(eta, 3.423578734096138e-8);
  next(eta, -1.2760635188618728e-5);
  next(eta, 5.2923448829120125e-5);
  next(eta, -0.0001073665322636516);
  next(eta, 2.0093878600823047e-6);
  next(eta, 0.0007716049382716049);
  next(eta, -0.0026813271604938273);
  next(eta, 0.004133597883597883);
  addTerm(2.0, r, ratio);
  next(eta, 1.4230900732435883e-6);
  next(eta, -5.6749528269915965e-6);
  next(eta, 1.1082654115347302e-5);
  next(eta, -2.396505113867297e-7);
  next(eta, -7.561801671883977e-5);
  next(eta, 0.00026772063206283885);
  next(eta, -0.0004691894943952557);
  next(eta, 0.00022947209362139917);
  next(eta, 0.0006494341563786008);
  addTerm(3.0, r, ratio);
  next(eta, 1.1375726970678419e-5);
  next(eta, -3.968365047179435e-5);
  next(eta, 6.641498215465122e-5);
  next(eta, -1.4638452578843418e-6);
  next(eta, -0.0002990724803031902);
  next(eta, 0.0007840392217200666);
  next(eta, -0.0008618882909167117);
  addTerm(4.0, r, ratio);
  next(eta, 6.797780477937208e-5);
  next(eta, -0.00019932570516188847);
  next(eta, 0.0002772753244959392);
  next(eta, -6.972813758365857e-5);
  next(eta, -0.00033679855336635813);
  addTerm(5.0, r, ratio);
}
