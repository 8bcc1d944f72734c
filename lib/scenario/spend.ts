/**
 * Recruits that money buys, with diminishing returns: spending s a month brings in
 *
 *   u(s) = R s / (s + S50),   S50 = c R
 *
 * users a month, with c the cost of the first recruits (u ~ s/c for small s) and R the most that money can buy; half of R costs S50
 * a month. R null: no diminishing returns, u = s/c.
 */
import type { Push } from '../dynamics/push';

export interface SpendResponse {
  /** Cost of one recruit while spending little, in units of money. */
  costPerRecruit: number;
  /** Recruits per month that no money exceeds; null: every recruit costs the same. */
  mostPerMonth: number | null;
}

/** Part of the most that money can buy up to which pushes are looked at: it costs 19 times what buys half of it. */
export const MOST_OF_RESPONSE = 0.95;

/** A push that may carry its price. */
export interface PricedPush extends Push {
  /** Money per month from the start to the end of the push, ramp included; what fades after the end costs nothing. Absent: not priced. */
  spendPerMonth?: number | undefined;
  /** Recruits only: the size follows from the spend. */
  response?: SpendResponse | undefined;
}

/** Users per month. */
export function recruitsForSpend(
  spendPerMonth: number,
  { costPerRecruit, mostPerMonth }: SpendResponse,
): number {
  if (mostPerMonth === null) return spendPerMonth / costPerRecruit;
  if (spendPerMonth === 0 || mostPerMonth === 0) return 0;
  return (mostPerMonth * spendPerMonth) / (spendPerMonth + costPerRecruit * mostPerMonth);
}

/** Money per month, the inverse of `recruitsForSpend`; null when no money buys so many. */
export function spendForRecruits(
  recruits: number,
  { costPerRecruit, mostPerMonth }: SpendResponse,
): number | null {
  if (mostPerMonth === null) return recruits * costPerRecruit;
  if (recruits === 0) return 0;
  return recruits < mostPerMonth
    ? (costPerRecruit * mostPerMonth * recruits) / (mostPerMonth - recruits)
    : null;
}

/** The push with the size that its spend buys, or as it is when its size is given. */
export function settleSize<P extends PricedPush>(push: P): P {
  if (!push.response || push.spendPerMonth === undefined) return push;
  return { ...push, size: recruitsForSpend(push.spendPerMonth, push.response) };
}

/** The same push with another size; a spend that buys recruits follows, any other price stays. Null when no money buys it. */
export function resizePush(push: PricedPush, size: number): PricedPush | null {
  if (!push.response) return { ...push, size };
  const spendPerMonth = spendForRecruits(size, push.response);
  return spendPerMonth === null ? null : { ...push, size, spendPerMonth };
}
