import type { Firm } from './system';

/**
 * A push: a change that a firm makes to the system over some months.
 * In the form dN_i/dt = N_i (r_i - b_ii N_i - b_ij N_j), with strength u(t) between 0 and `size`:
 *   recruits     dN_i/dt gains + u(t) users per month
 *   growth-lift  r_i -> r_i (1 + u), every b fixed
 *   pull         b_ji -> b_ji (1 + u): each of the pushing firm's users takes more of the other's room
 *   room         b_ii -> b_ii / (1 + u): its own users crowd it less
 */
export type PushKind = 'recruits' | 'growth-lift' | 'pull' | 'room';

export interface Push {
  firm: Firm;
  kind: PushKind;
  /** Months after the last observed month at which the push starts; 0 is the last observed month itself. */
  startMonth: number;
  /** Length at full strength in months, ramp included; null for a lasting push. */
  lengthMonths: number | null;
  /** Users per month for recruits; a fraction (0.2 = +20 %) for the other kinds. Never negative. */
  size: number;
  /** Months of linear ramp-in from 0 to full strength. 0 is a step. */
  rampMonths: number;
  /** After the end the strength halves every so many months (geometric carry-over). 0 stops at once. */
  carryOverHalfLifeMonths: number;
}
