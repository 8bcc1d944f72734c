/**
 * The model functions of the NIST StRD nonlinear-regression sets, each with its analytic gradient.
 *
 * A model fills `gradient` (d value / d b_j) and returns its value at x for parameters b; b[0] is NIST's b1. For the data
 * with one predictor x has one entry.
 */
export type NistModel = (x: ArrayLike<number>, b: ArrayLike<number>, gradient: Float64Array) => number;

export const NIST_MODELS: Readonly<Record<string, NistModel>> = {
  Bennett5: shiftedPower,
  BoxBOD: exponentialRise,
  Chwirut1: exponentialOverLine,
  Chwirut2: exponentialOverLine,
  DanWood: power,
  ENSO: threeCycles,
  Eckerle4: normalPeak,
  Gauss1: twoPeaksOnDecay,
  Gauss2: twoPeaksOnDecay,
  Gauss3: twoPeaksOnDecay,
  Hahn1: (x, b, gradient) => rational(x, b, gradient, 4),
  Kirby2: (x, b, gradient) => rational(x, b, gradient, 3),
  Lanczos1: threeExponentials,
  Lanczos2: threeExponentials,
  Lanczos3: threeExponentials,
  MGH09: quadraticRatio,
  MGH10: hyperbolicExponential,
  MGH17: twoExponentialsOnConstant,
  Misra1a: exponentialRise,
  Misra1b: inverseSquareRise,
  Misra1c: inverseRootRise,
  Misra1d: saturatingRise,
  Nelson: dielectricBreakdown,
  Rat42: logistic,
  Rat43: richards,
  Roszman1: arctangent,
  Thurber: (x, b, gradient) => rational(x, b, gradient, 4),
};

/** b1 (b2 + x)^(-1/b3) */
function shiftedPower(x: ArrayLike<number>, b: ArrayLike<number>, gradient: Float64Array): number {
  const shifted = b[1] + x[0];
  const shape = shifted ** (-1 / b[2]);
  gradient[0] = shape;
  gradient[1] = (-b[0] / b[2]) * (shape / shifted);
  gradient[2] = (b[0] * shape * Math.log(shifted)) / (b[2] * b[2]);
  return b[0] * shape;
}

/** b1 (1 - exp(-b2 x)) */
function exponentialRise(x: ArrayLike<number>, b: ArrayLike<number>, gradient: Float64Array): number {
  gradient[0] = -Math.expm1(-b[1] * x[0]);
  gradient[1] = b[0] * x[0] * Math.exp(-b[1] * x[0]);
  return b[0] * gradient[0];
}

/** exp(-b1 x) / (b2 + b3 x) */
function exponentialOverLine(x: ArrayLike<number>, b: ArrayLike<number>, gradient: Float64Array): number {
  const line = b[1] + b[2] * x[0];
  const value = Math.exp(-b[0] * x[0]) / line;
  gradient[0] = -x[0] * value;
  gradient[1] = -value / line;
  gradient[2] = (-x[0] * value) / line;
  return value;
}

/** b1 x^b2 */
function power(x: ArrayLike<number>, b: ArrayLike<number>, gradient: Float64Array): number {
  gradient[0] = x[0] ** b[1];
  gradient[1] = b[0] * gradient[0] * Math.log(x[0]);
  return b[0] * gradient[0];
}

/** b1 + a yearly cycle (b2, b3) + two cycles of free period (b4, b5, b6) and (b7, b8, b9) */
function threeCycles(x: ArrayLike<number>, b: ArrayLike<number>, gradient: Float64Array): number {
  const year = (2 * Math.PI * x[0]) / 12;
  gradient[0] = 1;
  gradient[1] = Math.cos(year);
  gradient[2] = Math.sin(year);
  let value = b[0] + b[1] * gradient[1] + b[2] * gradient[2];
  for (const first of [3, 6]) {
    const angle = (2 * Math.PI * x[0]) / b[first];
    const [cosine, sine] = [Math.cos(angle), Math.sin(angle)];
    gradient[first] = (angle / b[first]) * (b[first + 1] * sine - b[first + 2] * cosine);
    gradient[first + 1] = cosine;
    gradient[first + 2] = sine;
    value += b[first + 1] * cosine + b[first + 2] * sine;
  }
  return value;
}

/** (b1/b2) exp(-((x - b3)/b2)^2 / 2) */
function normalPeak(x: ArrayLike<number>, b: ArrayLike<number>, gradient: Float64Array): number {
  const z = (x[0] - b[2]) / b[1];
  const shape = Math.exp(-0.5 * z * z) / b[1];
  gradient[0] = shape;
  gradient[1] = ((b[0] * shape) / b[1]) * (z * z - 1);
  gradient[2] = (b[0] * shape * z) / b[1];
  return b[0] * shape;
}

/** b1 exp(-b2 x) + b3 exp(-(x - b4)^2/b5^2) + b6 exp(-(x - b7)^2/b8^2) */
function twoPeaksOnDecay(x: ArrayLike<number>, b: ArrayLike<number>, gradient: Float64Array): number {
  gradient[0] = Math.exp(-b[1] * x[0]);
  gradient[1] = -b[0] * x[0] * gradient[0];
  let value = b[0] * gradient[0];
  for (const first of [2, 5]) {
    const z = (x[0] - b[first + 1]) / b[first + 2];
    const peak = Math.exp(-z * z);
    gradient[first] = peak;
    gradient[first + 1] = (2 * b[first] * peak * z) / b[first + 2];
    gradient[first + 2] = (2 * b[first] * peak * z * z) / b[first + 2];
    value += b[first] * peak;
  }
  return value;
}

/** (b1 + b2 x + ... ) / (1 + ... ) with `top` coefficients above and the others below the line */
function rational(x: ArrayLike<number>, b: ArrayLike<number>, gradient: Float64Array, top: number): number {
  let numerator = 0;
  let denominator = 1;
  for (let j = 0; j < top; j++) numerator += b[j] * x[0] ** j;
  for (let j = top; j < b.length; j++) denominator += b[j] * x[0] ** (j - top + 1);
  const value = numerator / denominator;
  for (let j = 0; j < top; j++) gradient[j] = x[0] ** j / denominator;
  for (let j = top; j < b.length; j++) gradient[j] = (-value * x[0] ** (j - top + 1)) / denominator;
  return value;
}

/** b1 exp(-b2 x) + b3 exp(-b4 x) + b5 exp(-b6 x) */
function threeExponentials(x: ArrayLike<number>, b: ArrayLike<number>, gradient: Float64Array): number {
  let value = 0;
  for (const first of [0, 2, 4]) {
    gradient[first] = Math.exp(-b[first + 1] * x[0]);
    gradient[first + 1] = -b[first] * x[0] * gradient[first];
    value += b[first] * gradient[first];
  }
  return value;
}

/** b1 (x^2 + x b2) / (x^2 + x b3 + b4) */
function quadraticRatio(x: ArrayLike<number>, b: ArrayLike<number>, gradient: Float64Array): number {
  const below = x[0] * x[0] + x[0] * b[2] + b[3];
  gradient[0] = (x[0] * x[0] + x[0] * b[1]) / below;
  const value = b[0] * gradient[0];
  gradient[1] = (b[0] * x[0]) / below;
  gradient[2] = (-value * x[0]) / below;
  gradient[3] = -value / below;
  return value;
}

/** b1 exp(b2 / (x + b3)) */
function hyperbolicExponential(x: ArrayLike<number>, b: ArrayLike<number>, gradient: Float64Array): number {
  const shifted = x[0] + b[2];
  gradient[0] = Math.exp(b[1] / shifted);
  const value = b[0] * gradient[0];
  gradient[1] = value / shifted;
  gradient[2] = (-value * b[1]) / (shifted * shifted);
  return value;
}

/** b1 + b2 exp(-x b4) + b3 exp(-x b5) */
function twoExponentialsOnConstant(
  x: ArrayLike<number>,
  b: ArrayLike<number>,
  gradient: Float64Array,
): number {
  gradient[0] = 1;
  gradient[1] = Math.exp(-x[0] * b[3]);
  gradient[2] = Math.exp(-x[0] * b[4]);
  gradient[3] = -x[0] * b[1] * gradient[1];
  gradient[4] = -x[0] * b[2] * gradient[2];
  return b[0] + b[1] * gradient[1] + b[2] * gradient[2];
}

/** b1 (1 - (1 + b2 x/2)^-2) */
function inverseSquareRise(x: ArrayLike<number>, b: ArrayLike<number>, gradient: Float64Array): number {
  const base = 1 + (b[1] * x[0]) / 2;
  gradient[0] = 1 - base ** -2;
  gradient[1] = b[0] * x[0] * base ** -3;
  return b[0] * gradient[0];
}

/** b1 (1 - (1 + 2 b2 x)^(-1/2)) */
function inverseRootRise(x: ArrayLike<number>, b: ArrayLike<number>, gradient: Float64Array): number {
  const base = 1 + 2 * b[1] * x[0];
  gradient[0] = 1 - base ** -0.5;
  gradient[1] = b[0] * x[0] * base ** -1.5;
  return b[0] * gradient[0];
}

/** b1 b2 x / (1 + b2 x) */
function saturatingRise(x: ArrayLike<number>, b: ArrayLike<number>, gradient: Float64Array): number {
  const below = 1 + b[1] * x[0];
  gradient[0] = (b[1] * x[0]) / below;
  gradient[1] = (b[0] * x[0]) / (below * below);
  return b[0] * gradient[0];
}

/** b1 - b2 x1 exp(-b3 x2), for the logarithm of the response */
function dielectricBreakdown(x: ArrayLike<number>, b: ArrayLike<number>, gradient: Float64Array): number {
  const decay = x[0] * Math.exp(-b[2] * x[1]);
  gradient[0] = 1;
  gradient[1] = -decay;
  gradient[2] = b[1] * x[1] * decay;
  return b[0] - b[1] * decay;
}

/** b1 / (1 + exp(b2 - b3 x)) */
function logistic(x: ArrayLike<number>, b: ArrayLike<number>, gradient: Float64Array): number {
  const odds = Math.exp(b[1] - b[2] * x[0]);
  gradient[0] = 1 / (1 + odds);
  gradient[1] = -b[0] * gradient[0] * (odds / (1 + odds));
  gradient[2] = -x[0] * gradient[1];
  return b[0] * gradient[0];
}

/** b1 / (1 + exp(b2 - b3 x))^(1/b4) */
function richards(x: ArrayLike<number>, b: ArrayLike<number>, gradient: Float64Array): number {
  const odds = Math.exp(b[1] - b[2] * x[0]);
  gradient[0] = (1 + odds) ** (-1 / b[3]);
  const value = b[0] * gradient[0];
  gradient[1] = (-value / b[3]) * (odds / (1 + odds));
  gradient[2] = -x[0] * gradient[1];
  gradient[3] = (value * Math.log1p(odds)) / (b[3] * b[3]);
  return value;
}

/** b1 - b2 x - arctan(b3 / (x - b4)) / pi */
function arctangent(x: ArrayLike<number>, b: ArrayLike<number>, gradient: Float64Array): number {
  const distance = x[0] - b[3];
  const below = Math.PI * (distance * distance + b[2] * b[2]);
  gradient[0] = 1;
  gradient[1] = -x[0];
  gradient[2] = -distance / below;
  gradient[3] = -b[2] / below;
  return b[0] - b[1] * x[0] - Math.atan(b[2] / distance) / Math.PI;
}
