/**
 * The plain least-squares problem with one quantity held at a value: seven parameters are left to fit.
 *
 * A quantity psi of the crowding form ties one parameter (the dependent one) to others. Each has two forms, so that its interval can be
 * followed through both ends: in psi itself, and in u = 1/psi, where u = 0 is the limit psi = infinity.
 *
 *   quantity   held at psi             held at u = 1/psi
 *   K1         -                       c11 = r1 S1 u
 *   alpha      c12 = alpha c22 r1/r2   c22 = u c12 r2/r1      alpha = r2 b12/(r1 b22)
 *   beta       c21 = beta c11 r2/r1    c11 = u c21 r1/r2      beta  = r1 b21/(r2 b11)
 *   a12        c12 = a12 c11 S2/S1     c11 = u c12 S1/S2      a12 = b12/b11
 *   a21        c21 = a21 c22 S1/S2     c22 = u c21 S2/S1      a21 = b21/b22
 *
 * c_ij = b_ij S_j, S_j the largest count of firm j (`plain-problem.ts`). Own crowding is never below 0; the coefficients between the
 * firms may be where the caller allows help.
 */
import { PLAIN_PARAMETER_COUNT, type PlainProblem } from '../../estimate/plain-problem';
import type { LeastSquaresProblem } from '../../numeric/least-squares-problem';

export const PROFILED_QUANTITIES = ['alpha', 'beta', 'a12', 'a21', 'k1', 'k2'] as const;
export type ProfiledQuantity = (typeof PROFILED_QUANTITIES)[number];

/** 'value' holds psi, 'inverse' holds 1/psi. */
export type ProfileForm = 'value' | 'inverse';

/** Positions in the parameters of `plain-problem.ts`. */
const C11 = 4;
const C12 = 5;
const C21 = 6;
const C22 = 7;

/** theta[dependent] = held * factor * theta[base] (or 1) * r1^powers[0] * r2^powers[1]. */
interface Tie {
  dependent: number;
  base: number | null;
  powers: readonly [number, number];
  factor: number;
}

type Scales = readonly [number, number];

function tieOf(quantity: ProfiledQuantity, form: ProfileForm, [s1, s2]: Scales): Tie {
  const isValue = form === 'value';
  const between = (across: number, own: number, powers: readonly [number, number], factor: number): Tie =>
    isValue
      ? { dependent: across, base: own, powers, factor }
      : { dependent: own, base: across, powers: [-powers[0], -powers[1]], factor: 1 / factor };
  switch (quantity) {
    case 'alpha':
      return between(C12, C22, [1, -1], 1);
    case 'beta':
      return between(C21, C11, [-1, 1], 1);
    case 'a12':
      return between(C12, C11, [0, 0], s2 / s1);
    case 'a21':
      return between(C21, C22, [0, 0], s1 / s2);
    case 'k1':
      return { dependent: C11, base: null, powers: [1, 0], factor: s1 };
    case 'k2':
      return { dependent: C22, base: null, powers: [0, 1], factor: s2 };
  }
}

/** The quantity at a point of the plain problem; Infinity where own crowding is 0, NaN where it is 0/0. */
export function readQuantity(quantity: ProfiledQuantity, theta: Float64Array, scales: Scales): number {
  const { dependent, base, powers, factor } = tieOf(quantity, 'inverse', scales);
  const growth = Math.exp(powers[0] * theta[0] + powers[1] * theta[1]);
  return (factor * growth * (base === null ? 1 : theta[base])) / theta[dependent];
}

export interface ConstrainedProblem extends LeastSquaresProblem {
  /** Per parameter: whether it is held at 0 or above. */
  readonly isBounded: readonly boolean[];
  /** The free parameters out of a full point, and back. */
  reduce(theta: Float64Array): Float64Array;
  expand(reduced: Float64Array): Float64Array;
}

/** The size of a quantity when both firms are alike: S1 and S2 for levels, the ratio of the largest counts for effects per user. */
export function unitOf(quantity: ProfiledQuantity, [s1, s2]: Scales): number {
  return { alpha: 1, beta: 1, a12: s1 / s2, a21: s2 / s1, k1: s1, k2: s2 }[quantity];
}

export interface Held {
  form: ProfileForm;
  /** psi in the form 'value', 1/psi (not negative) in the form 'inverse'. Levels know only the latter. */
  value: number;
}

/** @param allowsHelp coefficients between the firms may be negative */
export function constrainProblem(
  problem: PlainProblem,
  quantity: ProfiledQuantity,
  { form, value: held }: Held,
  allowsHelp: boolean,
): ConstrainedProblem {
  const tie = tieOf(quantity, form, problem.scales);
  const free = Array.from({ length: PLAIN_PARAMETER_COUNT }, (_, j) => j).filter((j) => j !== tie.dependent);
  const full = new Float64Array(PLAIN_PARAMETER_COUNT);
  const fullJacobian = new Float64Array(problem.residualCount * PLAIN_PARAMETER_COUNT);

  const place = (reduced: Float64Array) => {
    free.forEach((j, i) => {
      full[j] = reduced[i];
    });
    full[tie.dependent] = slopeOnBase(tie, held, full) * (tie.base === null ? 1 : full[tie.base]);
  };

  const evaluate = (reduced: Float64Array, residuals: Float64Array, jacobian: Float64Array | null) => {
    place(reduced);
    if (!problem.evaluate(full, residuals, jacobian && fullJacobian)) return false;
    if (jacobian) chain(tie, held, full, free, fullJacobian, jacobian);
    return true;
  };

  return {
    parameterCount: free.length,
    residualCount: problem.residualCount,
    // in the inverse form the base carries the sign of the dependent own crowding
    isBounded: free.map((j) => {
      const isAcross = j === C12 || j === C21;
      return j === C11 || j === C22 || (isAcross && (!allowsHelp || (form === 'inverse' && j === tie.base)));
    }),
    evaluate,
    reduce: (theta) => Float64Array.from(free, (j) => theta[j]),
    expand(reduced) {
      place(reduced);
      return full.slice();
    },
  };
}

function slopeOnBase({ powers, factor }: Tie, held: number, full: Float64Array): number {
  return held * factor * Math.exp(powers[0] * full[0] + powers[1] * full[1]);
}

/** Columns of the free parameters, the dependent one's share added. */
function chain(
  tie: Tie,
  held: number,
  full: Float64Array,
  free: readonly number[],
  from: Float64Array,
  to: Float64Array,
): void {
  const rows = from.length / PLAIN_PARAMETER_COUNT;
  const slope = slopeOnBase(tie, held, full);
  const shares = free.map((j) => {
    if (j === tie.base) return slope;
    return j < 2 ? tie.powers[j] * full[tie.dependent] : 0;
  });
  for (let row = 0; row < rows; row++) {
    const at = row * PLAIN_PARAMETER_COUNT;
    const dependent = from[at + tie.dependent];
    free.forEach((j, i) => {
      to[row * free.length + i] = from[at + j] + shares[i] * dependent;
    });
  }
}
