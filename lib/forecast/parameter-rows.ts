/**
 * Each parameter as the data leave it beside what was believed before, and how much the data taught.
 */
import { type MixturePart, mixtureQuantile, varianceOfLog } from '../estimate/log-normal-mixture';
import type { Priors } from '../estimate/priors';
import type { LogNormalPrior } from '../estimate/types';
import type { DrawTable } from './draw-table';
import { intervalOf } from './interval';
import type { Interval, ParameterRow } from './report';

type RowId = ParameterRow['id'];

export function computeParameterRows(table: DrawTable, priors: Priors): ParameterRow[] {
  const prior = describePriors(priors);
  return Object.entries(withPerUserEffects(table)).map(([key, values]) => {
    const id = key as RowId;
    return {
      id,
      posterior: intervalOf(values),
      prior: priorInterval(prior[id]),
      contraction: contractionOf(values, varianceOfLog(prior[id])),
    };
  });
}

/** Adds a12 = alpha K1/K2 and a21 = beta K2/K1: places of one firm taken by one user of the other. */
function withPerUserEffects({ r1, r2, k1, k2, alpha, beta }: DrawTable): Record<RowId, Float64Array> {
  return {
    r1,
    r2,
    k1,
    k2,
    alpha,
    beta,
    a12: alpha.map((value, i) => (value * k1[i]) / k2[i]),
    a21: beta.map((value, i) => (value * k2[i]) / k1[i]),
  };
}

function describePriors({ parameters, noCompetition }: Priors): Record<RowId, MixturePart[]> {
  const { k1, k2 } = parameters;
  const alone = (prior: LogNormalPrior): MixturePart[] => [{ ...prior, weight: 1 }];
  const mixed = (prior: LogNormalPrior): MixturePart[] => [
    { ...prior, weight: 1 - noCompetition.weight },
    noCompetition,
  ];
  /** A coefficient times K of one firm over K of the other: logarithms add. */
  const perUser = (parts: MixturePart[], own: LogNormalPrior, other: LogNormalPrior): MixturePart[] =>
    parts.map((part) => ({
      weight: part.weight,
      meanLog: part.meanLog + own.meanLog - other.meanLog,
      sdLog: Math.hypot(part.sdLog, own.sdLog, other.sdLog),
    }));
  const alpha = mixed(parameters.alpha);
  const beta = mixed(parameters.beta);
  return {
    r1: alone(parameters.r1),
    r2: alone(parameters.r2),
    k1: alone(k1),
    k2: alone(k2),
    alpha,
    beta,
    a12: perUser(alpha, k1, k2),
    a21: perUser(beta, k2, k1),
  };
}

function priorInterval(parts: MixturePart[]): Interval {
  const at = (p: number) => mixtureQuantile(parts, p);
  return { q05: at(0.05), q50: at(0.5), q95: at(0.95) };
}

/** 1 - var(posterior of ln) / var(prior of ln), clipped to 0 .. 1. */
function contractionOf(values: Float64Array, priorVariance: number): number {
  const logs = values.map(Math.log);
  const mean = logs.reduce((sum, value) => sum + value, 0) / logs.length;
  const variance = logs.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (logs.length - 1);
  return Math.min(Math.max(1 - variance / priorVariance, 0), 1) || 0;
}
