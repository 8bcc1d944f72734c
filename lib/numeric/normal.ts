/**
 * The standard normal distribution. Quantile: Wichura (1988), algorithm AS 241 (PPND16), relative accuracy about 1e-16.
 */

/** Polynomial with coefficients in ascending order (Horner). */
function polynomial(coefficients: readonly number[], x: number): number {
  let value = 0;
  for (let i = coefficients.length - 1; i >= 0; i--) value = value * x + coefficients[i];
  return value;
}

const CENTRE_TOP = [
  3.3871328727963665, 133.14166789178438, 1971.5909503065513, 13731.69376550946, 45921.95393154987,
  67265.7709270087, 33430.57558358813, 2509.0809287301227,
];
const CENTRE_BOTTOM = [
  1, 42.31333070160091, 687.1870074920579, 5394.196021424751, 21213.794301586597, 39307.89580009271,
  28729.085735721943, 5226.495278852854,
];
const SHOULDER_TOP = [
  1.4234371107496835, 4.630337846156546, 5.769497221460691, 3.6478483247632045, 1.2704582524523684,
  0.2417807251774506, 0.022723844989269184, 0.0007745450142783414,
];
const SHOULDER_BOTTOM = [
  1, 2.053191626637759, 1.6763848301838038, 0.6897673349851, 0.14810397642748008, 0.015198666563616457,
  0.0005475938084995345, 1.0507500716444169e-9,
];
const TAIL_TOP = [
  6.657904643501103, 5.463784911164114, 1.7848265399172913, 0.29656057182850487, 0.026532189526576124,
  0.0012426609473880784, 0.000027115555687434876, 2.0103343992922881e-7,
];
const TAIL_BOTTOM = [
  1, 0.599832206555888, 0.1369298809227358, 0.014875361290850615, 0.0007868691311456133,
  0.000018463183175100548, 1.421511758316446e-7, 2.0442631033899397e-15,
];

/**
 * Quantile of the standard normal distribution.
 * @param p probability in [0, 1]; 0 and 1 give minus and plus infinity, anything else NaN
 */
export function normalQuantile(p: number): number {
  if (!(p > 0 && p < 1)) return p === 0 ? -Infinity : p === 1 ? Infinity : Number.NaN;
  const q = p - 0.5;
  if (Math.abs(q) <= 0.425) {
    const r = 0.180625 - q * q;
    return (q * polynomial(CENTRE_TOP, r)) / polynomial(CENTRE_BOTTOM, r);
  }
  const r = Math.sqrt(-Math.log(q < 0 ? p : 1 - p));
  const size =
    r <= 5
      ? polynomial(SHOULDER_TOP, r - 1.6) / polynomial(SHOULDER_BOTTOM, r - 1.6)
      : polynomial(TAIL_TOP, r - 5) / polynomial(TAIL_BOTTOM, r - 5);
  return q < 0 ? -size : size;
}

/** Series below, continued fraction above: both reach full accuracy here within a few dozen terms. */
const SERIES_LIMIT = 3;
const FRACTION_TERMS = 60;

/** Distribution function of the standard normal; relative accuracy about 1e-14 in both tails (Abramowitz & Stegun 26.2.11, 26.2.14). */
export function normalCdf(z: number): number {
  if (Number.isNaN(z)) return Number.NaN;
  const size = Math.abs(z);
  const density = Math.exp(-0.5 * size * size) / Math.sqrt(2 * Math.PI);
  if (size < SERIES_LIMIT) {
    let term = size;
    let sum = size;
    for (let k = 3; term > sum * Number.EPSILON; k += 2) {
      term *= (size * size) / k;
      sum += term;
    }
    return z < 0 ? 0.5 - density * sum : 0.5 + density * sum;
  }
  let fraction = size;
  for (let k = FRACTION_TERMS; k >= 1; k--) fraction = size + k / fraction;
  return z < 0 ? density / fraction : 1 - density / fraction;
}
