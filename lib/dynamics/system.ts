/**
 * The competitive growth system (Lotka 1925, Volterra 1926; Murray, Mathematical Biology I, section 3.5):
 *
 *   dN1/dt = r1 N1 (1 - N1/K1 - alpha N2/K2)
 *   dN2/dt = r2 N2 (1 - N2/K2 - beta  N1/K1)
 *
 * N users, t months, r growth rate per month when small and alone, K saturation level (users) when alone,
 * alpha and beta scaled competition coefficients (dimensionless): how much of one firm's room the other takes when full.
 * Firm 1 is the focal firm, firm 2 the rival.
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
