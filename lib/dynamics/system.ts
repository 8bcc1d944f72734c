/**
 * The competitive growth system (Lotka 1925, Volterra 1926; Murray, Mathematical Biology I, section 3.5):
 *
 *   dN1/dt = r1 N1 (1 - N1/K1 - alpha N2/K2)
 *   dN2/dt = r2 N2 (1 - N2/K2 - beta  N1/K1)
 *
 * N users, t months, r growth rate per month when small and alone, K saturation level (users) when alone,
 * alpha and beta scaled competition coefficients (dimensionless): how much of one firm's room the other takes when full.
 * Firm 1 is the focal firm, firm 2 the rival.
 *
 * Other ways to write the same system, each with its conversion below:
 *   scaled     x' = x (1 - x - alpha y), y' = rho y (1 - y - beta x);  x = N1/K1, y = N2/K2, tau = r1 t, rho = r2/r1
 *   per user   a12 = alpha K1/K2: places of firm 1 taken by one user of firm 2; a21 = beta K2/K1
 *   crowding   dN_i/dt = N_i (r_i - b_ii N_i - b_ij N_j), b per user and month; exists without a finite K (b_ii = 0)
 */
export interface CompetitionSystem {
  r1: number;
  r2: number;
  k1: number;
  k2: number;
  alpha: number;
  beta: number;
}

/** Users of both firms: [N1, N2]. */
export type State = readonly [number, number];

/** Which firm: 1 is the focal firm, 2 the rival. */
export type Firm = 1 | 2;

export interface ScaledSystem {
  /** r2/r1. */
  rho: number;
  alpha: number;
  beta: number;
}

export interface PerUserEffects {
  /** Places of firm 1 taken by one user of firm 2. */
  a12: number;
  /** Places of firm 2 taken by one user of firm 1. */
  a21: number;
}

/** The crowding form: rates per month, b per user and month, all b >= 0. */
export interface CrowdingForm {
  r1: number;
  r2: number;
  b11: number;
  b12: number;
  b21: number;
  b22: number;
}

/** Throws a RangeError naming the first parameter that is not a positive (r, K) or non-negative (alpha, beta) finite number. */
export function assertSystem(system: CompetitionSystem): void {
  for (const id of ['r1', 'r2', 'k1', 'k2'] as const) {
    if (!(system[id] > 0 && system[id] < Number.POSITIVE_INFINITY)) {
      throw new RangeError(`system.${id} must be positive and finite, got ${system[id]}`);
    }
  }
  for (const id of ['alpha', 'beta'] as const) {
    if (!(system[id] >= 0 && system[id] < Number.POSITIVE_INFINITY)) {
      throw new RangeError(`system.${id} must be finite and not negative, got ${system[id]}`);
    }
  }
}

/** Fills `out` with [dN1/dt, dN2/dt], users per month. */
export function fillGrowth(system: CompetitionSystem, state: ArrayLike<number>, out: Float64Array): void {
  const x = state[0] / system.k1;
  const y = state[1] / system.k2;
  out[0] = system.r1 * state[0] * (1 - x - system.alpha * y);
  out[1] = system.r2 * state[1] * (1 - y - system.beta * x);
}

/** Fills `out` with the Jacobian of the growth, row-major [dF1/dN1, dF1/dN2, dF2/dN1, dF2/dN2], per month. */
export function fillJacobian(system: CompetitionSystem, state: ArrayLike<number>, out: Float64Array): void {
  const { r1, r2, k1, k2, alpha, beta } = system;
  const x = state[0] / k1;
  const y = state[1] / k2;
  out[0] = r1 * (1 - 2 * x - alpha * y);
  out[1] = (-r1 * alpha * state[0]) / k2;
  out[2] = (-r2 * beta * state[1]) / k1;
  out[3] = r2 * (1 - 2 * y - beta * x);
}

export function toScaledSystem(system: CompetitionSystem): ScaledSystem {
  return { rho: system.r2 / system.r1, alpha: system.alpha, beta: system.beta };
}

export function toPerUserEffects(system: CompetitionSystem): PerUserEffects {
  return { a12: (system.alpha * system.k1) / system.k2, a21: (system.beta * system.k2) / system.k1 };
}

export function toCrowdingForm(system: CompetitionSystem): CrowdingForm {
  const { r1, r2, k1, k2, alpha, beta } = system;
  return { r1, r2, b11: r1 / k1, b12: (r1 * alpha) / k2, b21: (r2 * beta) / k1, b22: r2 / k2 };
}

/**
 * Back from the crowding form: K_i = r_i/b_ii, alpha = r2 b12/(r1 b22), beta = r1 b21/(r2 b11).
 * Null when a firm does not crowd itself (b_ii = 0): K, alpha and beta then do not exist.
 */
export function fromCrowdingForm(form: CrowdingForm): CompetitionSystem | null {
  const { r1, r2, b11, b12, b21, b22 } = form;
  if (!(b11 > 0 && b22 > 0)) return null;
  return {
    r1,
    r2,
    k1: r1 / b11,
    k2: r2 / b22,
    alpha: (r2 * b12) / (r1 * b22),
    beta: (r1 * b21) / (r2 * b11),
  };
}

/** The same market seen with the firms exchanged. */
export function swapFirms(system: CompetitionSystem): CompetitionSystem {
  return {
    r1: system.r2,
    r2: system.r1,
    k1: system.k2,
    k2: system.k1,
    alpha: system.beta,
    beta: system.alpha,
  };
}
