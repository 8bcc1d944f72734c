/**
 * What the data cannot tell: named facts, each from a stated threshold. `lib/brief` says them in words.
 */
import type { Fit } from '../estimate/fit-run';
import type { FirmObservations } from '../estimate/observations';
import type { Priors } from '../estimate/priors';
import type { LogNormalPrior } from '../estimate/types';
import { normalCdf } from '../numeric/normal';
import { CONSTANT_SUM_SPREAD } from '../series/limits';
import type { FitReport, ParameterRow, Unknown } from './report';

/** Fewer months than this are a short series (common practice: two years). */
export const SHORT_SERIES_MONTHS = 24;
/** A saturation level whose prior variance shrank by less than this share is a guess: its 90 % interval still spans a factor of five. */
export const UNSEEN_SATURATION_BELOW = 0.7;
/** A coefficient whose prior variance shrank by less than this share is not identified. */
export const UNIDENTIFIED_BELOW = 0.5;
/** A median further out in a tail of its prior than this many sd of a normal is a conflict. */
export const CONFLICT_SDS = 2;
/** Month-to-month correlation of the errors above which the months are fewer than they look. */
export const STRONG_PERSISTENCE = 0.7;
/** A firm whose largest count is in this first share of its months and that has lost the second share since only falls. */
const EARLY_SHARE = 0.2;
const FALL_SHARE = 0.2;

export function listUnknowns(
  fit: Fit,
  rows: readonly ParameterRow[],
  errors: FitReport['errors'],
): Unknown[] {
  const row = (id: ParameterRow['id']) => rows.find((candidate) => candidate.id === id)!;
  const unknowns: Unknown[] = [];
  const add = (code: Unknown['code'], firm: 1 | 2 | null = null, parameter: string | null = null) => {
    unknowns.push({ code, firm, parameter });
  };
  if (fit.status === 'not-converged') add('not-converged');
  if (fit.observations.months < SHORT_SERIES_MONTHS) add('short-series');
  if (hasConstantSum(fit.observations.firms)) add('share-only');
  for (const firm of [1, 2] as const) {
    const observed = fit.observations.firms[firm - 1];
    const saturation = row(`k${firm}`);
    const coefficient = row(firm === 1 ? 'alpha' : 'beta');
    if (observed.entry > 0) add('late-launch', firm);
    if (onlyFalls(observed)) add('flat-incumbent', firm, saturation.id);
    else if (saturation.contraction < UNSEEN_SATURATION_BELOW) add('saturation-unseen', firm, saturation.id);
    if (coefficient.contraction < UNIDENTIFIED_BELOW && !isClearlyWeak(coefficient)) {
      add('competition-unidentified', firm, coefficient.id);
    }
    const persistence = firm === 1 ? errors.persistenceFocal : errors.persistenceRival;
    if (persistence.q50 > STRONG_PERSISTENCE) add('persistent-errors', firm);
  }
  for (const [id, firm] of CONFLICTING) {
    const below = sharePriorBelow(fit.priors, id, row(id).posterior.q50);
    if (!(below > normalCdf(-CONFLICT_SDS) && below < normalCdf(CONFLICT_SDS)))
      add('prior-conflict', firm, id);
  }
  return unknowns;
}

/** Parameters whose prior may be far from what the counts say, and the firm that each belongs to. */
const CONFLICTING = [
  ['r1', 1],
  ['r2', 2],
  ['k1', 1],
  ['k2', 2],
  ['alpha', 1],
  ['beta', 2],
] as const;

/** Share of the prior of a parameter that lies below a value; that of a coefficient has a part near no competition. */
function sharePriorBelow(
  { parameters, noCompetition }: Priors,
  id: (typeof CONFLICTING)[number][0],
  value: number,
): number {
  const below = ({ meanLog, sdLog }: LogNormalPrior) => normalCdf((Math.log(value) - meanLog) / sdLog);
  if (id !== 'alpha' && id !== 'beta') return below(parameters[id]);
  const { weight } = noCompetition;
  return (1 - weight) * below(parameters[id]) + weight * below(noCompetition);
}

/** A coefficient that is surely small spans a large factor on the way to 0 and is still known for what it is. */
function isClearlyWeak(row: ParameterRow): boolean {
  return row.posterior.q95 < 0.5;
}

function onlyFalls({ logCounts }: FirmObservations): boolean {
  let top = 0;
  for (let k = 1; k < logCounts.length; k++) if (logCounts[k] > logCounts[top]) top = k;
  const fallen = 1 - Math.exp(logCounts[logCounts.length - 1] - logCounts[top]);
  return top <= EARLY_SHARE * (logCounts.length - 1) && fallen >= FALL_SHARE;
}

/** Months known of both firms whose counts add to a constant: a split of a fixed whole. */
function hasConstantSum([focal, rival]: readonly [FirmObservations, FirmObservations]): boolean {
  const rivalAt = new Map(Array.from(rival.months, (month, k) => [month, rival.logCounts[k]]));
  const sums: number[] = [];
  focal.months.forEach((month, k) => {
    const other = rivalAt.get(month);
    if (other !== undefined) sums.push(Math.exp(focal.logCounts[k]) + Math.exp(other));
  });
  if (sums.length < 2) return false;
  const largest = Math.max(...sums);
  return largest - Math.min(...sums) <= CONSTANT_SUM_SPREAD * largest;
}
