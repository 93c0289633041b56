// Compiled by AssemblyScript only. Tables of the ziggurat method (G. Marsaglia and W. W. Tsang, The ziggurat
// method for generating random variables, J. Stat. Software 5(8), 2000) for the half normal and the
// exponential, 1,024 layers of equal area each, computed when the module starts, with its own Math, so that
// they have the same bits in every engine.
//
// Layer i lies between heights f(x[i]) and f(x[i+1]) and has width x[i]; x[1] = r, where the tail starts;
// x[0] = area / f(r) is the width of a rectangle with the area of the bottom layer, tail included; x[1024] = 0.

const LAYERS: i32 = 1024;
const CELLS: f64 = 9007199254740992.0;

/** Where the tail starts, so that the layers close at the mode; recomputed in the tests. */
export const NORMAL_TAIL: f64 = 4.038849846109504;
export const EXPONENTIAL_TAIL: f64 = 9.256164544265545;

// Per layer 16 bytes, its width and the share of it that lies under the next layer as well; the heights f(x[i]) apart.
export const normalLayers: usize = memory.data(1024 * 16, 16);
export const exponentialLayers: usize = memory.data(1024 * 16, 16);
export const normalHeights: usize = memory.data(1025 * 8, 16);
export const exponentialHeights: usize = memory.data(1025 * 8, 16);

function writeLayer(layers: usize, heights: usize, i: i32, width: f64, next: f64, low: f64, high: f64): void {
  const at = layers + <usize>(16 * i);
  store<f64>(at, width);
  store<f64>(at, Math.floor((next / width) * CELLS) / CELLS, 8);
  store<f64>(heights + <usize>(8 * i), low);
  store<f64>(heights + <usize>(8 * i), high, 8);
}

function buildNormal(): void {
  const r = NORMAL_TAIL;
  const low = Math.exp(-0.5 * r * r);
  // The tail's area is f(r) / (r + 1/(r + 2/(r + 3/(r + …)))), Laplace's continued fraction.
  let fraction = r;
  for (let k = 200; k >= 1; k--) fraction = r + <f64>k / fraction;
  const area = r * low + low / fraction;
  writeLayer(normalLayers, normalHeights, 0, area / low, r, 0.0, low);
  let x = r;
  let f = low;
  for (let i = 1; i < LAYERS; i++) {
    const above = i == LAYERS - 1 ? 1.0 : f + area / x;
    const next = i == LAYERS - 1 ? 0.0 : Math.sqrt(-2.0 * Math.log(above));
    writeLayer(normalLayers, normalHeights, i, x, next, f, above);
    x = next;
    f = above;
  }
}

function buildExponential(): void {
  const r = EXPONENTIAL_TAIL;
  const low = Math.exp(-r);
  const area = (r + 1.0) * low;
  writeLayer(exponentialLayers, exponentialHeights, 0, area / low, r, 0.0, low);
  let x = r;
  let f = low;
  for (let i = 1; i < LAYERS; i++) {
    const above = i == LAYERS - 1 ? 1.0 : f + area / x;
    const next = i == LAYERS - 1 ? 0.0 : -Math.log(above);
    writeLayer(exponentialLayers, exponentialHeights, i, x, next, f, above);
    x = next;
    f = above;
  }
}

buildNormal();
buildExponential();
