/**
 * Student's t distribution: P(T <= t) = 1 - I(nu / (nu + t^2); nu/2, 1/2) / 2 for t >= 0, by the continued fraction of the
 * incomplete beta function (Abramowitz & Stegun 26.5.8, 26.7.1), evaluated by the modified Lentz method.
 */

const MAX_TERMS = 300;
const TINY = 1e-300;
/** Steps of the search for a quantile; halving alone would need some 60, with Newton's steps a handful is usual. */
const MAX_STEPS = 80;
/** Relative size of the last step of that search. */
const SMALLEST_STEP = 1e-14;

/** @param df degrees of freedom, above 0 @returns probability in [0, 1] @throws RangeError for another df */
export function studentTCdf(t: number, df: number): number {
  requireDegrees(df);
  if (Number.isNaN(t)) return Number.NaN;
  const tail = 0.5 * incompleteBeta(df / (df + t * t), df / 2, 0.5);
  return t >= 0 ? 1 - tail : tail;
}

/** @param p in (0, 1) @throws RangeError for another p or df */
export function studentTQuantile(p: number, df: number): number {
  requireDegrees(df);
  if (!(p > 0 && p < 1)) throw new RangeError(`p must be between 0 and 1, got ${p}`);
  if (p === 0.5) return 0;
  if (p < 0.5) return -studentTQuantile(1 - p, df);
  let high = 1;
  while (studentTCdf(high, df) < p) high *= 2;
  let low = 0;
  let t = high / 2;
  for (let i = 0; i < MAX_STEPS; i++) {
    const excess = studentTCdf(t, df) - p;
    if (excess < 0) low = t;
    else high = t;
    const newton = t - excess / density(t, df);
    const next = newton > low && newton < high ? newton : (low + high) / 2;
    const isThere = Math.abs(next - t) <= SMALLEST_STEP * t;
    t = next;
    if (isThere) break;
  }
  return t;
}

function density(t: number, df: number): number {
  const constant = Math.exp(logGamma((df + 1) / 2) - logGamma(df / 2)) / Math.sqrt(df * Math.PI);
  return constant * (1 + (t * t) / df) ** (-(df + 1) / 2);
}

function requireDegrees(df: number): void {
  if (!(df > 0)) throw new RangeError(`df must be above 0, got ${df}`);
}

/** Regularised incomplete beta function I(x; a, b). */
function incompleteBeta(x: number, a: number, b: number): number {
  if (x <= 0) return 0;
  if (x >= 1) return 1;
  const front = Math.exp(logGamma(a + b) - logGamma(a) - logGamma(b) + a * Math.log(x) + b * Math.log1p(-x));
  // the fraction converges fast on this side of the mean only
  if (x < (a + 1) / (a + b + 2)) return (front * betaFraction(x, a, b)) / a;
  return 1 - (front * betaFraction(1 - x, b, a)) / b;
}

function betaFraction(x: number, a: number, b: number): number {
  let c = 1;
  let d = 1 / awayFromZero(1 - ((a + b) * x) / (a + 1));
  let value = d;
  for (let m = 1; m <= MAX_TERMS; m++) {
    const even = (m * (b - m) * x) / ((a + 2 * m - 1) * (a + 2 * m));
    d = 1 / awayFromZero(1 + even * d);
    c = awayFromZero(1 + even / c);
    value *= d * c;
    const odd = (-(a + m) * (a + b + m) * x) / ((a + 2 * m) * (a + 2 * m + 1));
    d = 1 / awayFromZero(1 + odd * d);
    c = awayFromZero(1 + odd / c);
    const change = d * c;
    value *= change;
    if (Math.abs(change - 1) <= Number.EPSILON) break;
  }
  return value;
}

function awayFromZero(value: number): number {
  return Math.abs(value) < TINY ? TINY : value;
}

/** Lanczos's approximation (g = 7, 9 terms), relative error below 1e-14 for z > 0. */
const LANCZOS = [
  0.99999999999980993, 676.5203681218851, -1259.1392167224028, 771.32342877765313, -176.61502916214059,
  12.507343278686905, -0.13857109526572012, 9.9843695780195716e-6, 1.5056327351493116e-7,
];

function logGamma(z: number): number {
  if (z < 0.5) return Math.log(Math.PI / Math.sin(Math.PI * z)) - logGamma(1 - z);
  const x = z - 1;
  const t = x + 7.5;
  const sum = LANCZOS.reduce((total, term, i) => (i === 0 ? term : total + term / (x + i)), 0);
  return 0.5 * Math.log(2 * Math.PI) + (x + 0.5) * Math.log(t) - t + Math.log(sum);
}
