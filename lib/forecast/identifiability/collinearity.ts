/**
 * Which parameters the history cannot tell apart: the collinearity index of Brun, Reichert & Kuensch (2001, Water Resources Research
 * 37:1015),
 *
 *   gamma = 1 / (smallest singular value of the sensitivities with columns of unit length)
 *
 * A change of one parameter can be made good by the others up to a share 1/gamma of its effect on the counts. 1: all have effects of their
 * own; above some 15 they cannot be told apart in practice (there: 10 to 15). The singular vector of that value is the weakest
 * direction: the changes of log parameters that, made together, leave the counts nearly as they are.
 */
import { PARAMETERS } from '../../estimate/parameters';
import type { ParameterId } from '../../estimate/types';
import { factoriseInformation, fillInformationRows, type ObservedMonths } from './path-information';

/** Above this the parameters cannot be told apart in practice (Brun et al. 2001). */
export const POORLY_TOLD_ABOVE = 15;
/** Members of the weakest direction have at least this share of its largest one. */
const MEMBER_SHARE = 0.35;
const MAX_MEMBERS = 3;

export interface WeakMember {
  id: ParameterId;
  /** Change of the log parameter, the largest member's being 1: members of equal sign rise together. */
  weight: number;
}

export interface Collinearity {
  /** gamma of all eight; null: infinite. */
  index: number | null;
  isPoorlyTold: boolean;
  /** The weakest direction, largest member first. */
  weakest: WeakMember[];
}

/** @returns null where the path cannot be followed, or a parameter has no effect at all */
export function computeCollinearity(
  theta: Float64Array,
  months: ObservedMonths,
  errorSizes: readonly [number, number],
): Collinearity | null {
  const rows = fillInformationRows(theta, months, errorSizes);
  const factor = rows && factoriseInformation(rows);
  if (!factor) return null;
  const count = PARAMETERS.length;
  const index = factor.rank < count ? null : 1 / factor.singularValues[count - 1];
  // back from columns of unit length to changes of the log parameters themselves
  const direction = PARAMETERS.map(({ id }, j) => ({
    id,
    weight: factor.rightVectors[j * count + count - 1] / factor.scale[j],
  }));
  return {
    index,
    isPoorlyTold: !(index !== null && index <= POORLY_TOLD_ABOVE),
    weakest: pickMembers(direction),
  };
}

function pickMembers(direction: WeakMember[]): WeakMember[] {
  const ranked = [...direction].sort((a, b) => Math.abs(b.weight) - Math.abs(a.weight));
  const largest = ranked[0].weight;
  return ranked
    .slice(0, MAX_MEMBERS)
    .map(({ id, weight }) => ({ id, weight: weight / largest }))
    .filter(({ weight }) => Math.abs(weight) >= MEMBER_SHARE);
}
