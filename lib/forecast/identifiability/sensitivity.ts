/**
 * What the share at the horizon and the odds hang on, parameter by parameter, over the draws.
 *
 *   elasticity       d ln share / d ln theta along each draw's path from the last month, its median: share = N1/(N1 + N2), so that
 *                    d ln share = (1 - share)(d ln N1 - d ln N2)
 *   alone            share with theta at 5 % and 95 % of its draws and everything else at its median (one at a time)
 *   explained        Var(E[y | theta]) / Var(y): the part of the variance of y that knowing theta would take away (the first-order index of
 *                    Sobol 1993, from given draws: y averaged over BINS classes of theta, corrected for chance like an adjusted R^2).
 *                    Draws keep their correlations, so this is what learning theta would really teach. y: share, or 1 when the draw's
 *                    outcome is the leading one.
 *   odds low, high   odds of the leading outcome in the lowest and in the highest fifth of the draws of theta
 *   odds elasticity  slope of that outcome's indicator on ln theta over its odds: percent of odds per percent of theta, along the draws
 */
import { createTrajectory, PARAMETER_COUNT } from '../../dynamics/trajectory';
import type { DrawSet } from '../../estimate/types';
import { quantiles } from '../../numeric/quantile';
import { type DrawTable, fillTheta, readDrawTable } from '../draw-table';
import { computeOdds, outcomeOf } from '../odds';
import { OUTCOMES } from '../outcomes';
import type { Sensitivity, SensitivityRow } from './report';

export const SENSITIVITY_PARAMETERS = ['r1', 'r2', 'k1', 'k2', 'alpha', 'beta'] as const;

const BINS = 20;
/** A leading outcome with higher odds leaves nothing to learn about the odds. */
const SETTLED_ABOVE = 0.99;
/** Fifths of the draws. */
const FIFTH = 0.2;

/** @returns null when no draw's path can be followed */
export function computeSensitivity(draws: DrawSet, horizonMonths: number): Sensitivity | null {
  const table = readDrawTable(draws);
  const { share, slopes } = followDraws(table, horizonMonths);
  const known = Array.from(share.keys()).filter((i) => !Number.isNaN(share[i]));
  if (known.length < 2 * BINS) return null;
  const odds = computeOdds(table.alpha, table.beta);
  const leading = OUTCOMES.reduce((a, b) => (odds[b] > odds[a] ? b : a));
  const shares = known.map((i) => share[i]);
  const indicator = known.map((i) => (outcomeOf(table.alpha[i], table.beta[i]) === leading ? 1 : 0));
  const shareAlone = createShareAlone(table, horizonMonths);
  const rows = SENSITIVITY_PARAMETERS.map((id, j): SensitivityRow => {
    const logs = known.map((i) => Math.log(table[id][i]));
    const order = rank(logs);
    const fifth = Math.floor(FIFTH * order.length);
    const [q05, q95] = quantiles(table[id], [0.05, 0.95]);
    return {
      id,
      low: q05,
      high: q95,
      elasticity: quantiles(
        known.map((i) => slopes[i * SENSITIVITY_PARAMETERS.length + j]),
        [0.5],
      )[0],
      shareAtLow: shareAlone(j, q05),
      shareAtHigh: shareAlone(j, q95),
      shareExplained: explainedPart(order, shares),
      oddsAtLow: meanOf(order.slice(0, fifth), indicator),
      oddsAtHigh: meanOf(order.slice(-fifth), indicator),
      oddsElasticity: oddsElasticity(logs, indicator),
      oddsExplained: explainedPart(order, indicator),
    };
  });
  return {
    horizonMonths,
    leading,
    leadingOdds: odds[leading],
    rows,
    learnFirst: {
      share: topOf(rows, 'shareExplained'),
      odds: odds[leading] > SETTLED_ABOVE ? null : topOf(rows, 'oddsExplained'),
    },
  };
}

/** Share at the horizon per draw (NaN: not followed), and its elasticities, draw-major. */
function followDraws(table: DrawTable, months: number): { share: Float64Array; slopes: Float64Array } {
  const width = SENSITIVITY_PARAMETERS.length;
  const trajectory = createTrajectory({ months: months + 1, entry1: 0, entry2: 0 });
  const sensitivities = new Float64Array(2 * (months + 1) * PARAMETER_COUNT);
  const theta = new Float64Array(PARAMETER_COUNT);
  const share = new Float64Array(table.count).fill(Number.NaN);
  const slopes = new Float64Array(table.count * width);
  const [first, second] = [months * PARAMETER_COUNT, (2 * months + 1) * PARAMETER_COUNT];
  for (let i = 0; i < table.count; i++) {
    fillTheta(table, i, theta);
    if (!trajectory.fillSensitivities(theta, sensitivities)) continue;
    share[i] = shareAt(trajectory.logLevel1[months], trajectory.logLevel2[months]);
    for (let j = 0; j < width; j++) {
      slopes[i * width + j] = (1 - share[i]) * (sensitivities[first + j] - sensitivities[second + j]);
    }
  }
  return { share, slopes };
}

function shareAt(logLevel1: number, logLevel2: number): number {
  return 1 / (1 + Math.exp(logLevel2 - logLevel1));
}

/** Share at the horizon with parameter j at a value and everything else at its median; null when that path cannot be followed. */
function createShareAlone(table: DrawTable, months: number): (j: number, value: number) => number | null {
  const columns = [...SENSITIVITY_PARAMETERS, 'n1', 'n2'] as const;
  const centre = Float64Array.from(columns, (id) => Math.log(quantiles(table[id], [0.5])[0]));
  const trajectory = createTrajectory({ months: months + 1, entry1: 0, entry2: 0 });
  return (j, value) => {
    const theta = centre.slice();
    theta[j] = Math.log(value);
    return trajectory.run(theta) ? shareAt(trajectory.logLevel1[months], trajectory.logLevel2[months]) : null;
  };
}

/** Positions of values in rising order. */
function rank(values: readonly number[]): number[] {
  return Array.from(values.keys()).sort((a, b) => values[a] - values[b]);
}

function meanOf(positions: readonly number[], values: readonly number[]): number {
  return positions.reduce((sum, i) => sum + values[i], 0) / positions.length;
}

/** 0 where y does not vary. */
function explainedPart(order: readonly number[], y: readonly number[]): number {
  const n = order.length;
  const mean = meanOf(order, y);
  const total = order.reduce((sum, i) => sum + (y[i] - mean) ** 2, 0);
  if (!(total > 0)) return 0;
  let within = 0;
  for (let bin = 0; bin < BINS; bin++) {
    const members = order.slice(Math.floor((bin * n) / BINS), Math.floor(((bin + 1) * n) / BINS));
    const centre = meanOf(members, y);
    for (const i of members) within += (y[i] - centre) ** 2;
  }
  return Math.min(1, Math.max(0, 1 - (within / total) * ((n - 1) / (n - BINS))));
}

/** 0 when the outcome has all the odds or theta does not vary. */
function oddsElasticity(logs: readonly number[], indicator: readonly number[]): number {
  const all = Array.from(logs.keys());
  const [x, y] = [meanOf(all, logs), meanOf(all, indicator)];
  let covariance = 0;
  let variance = 0;
  for (let i = 0; i < logs.length; i++) {
    covariance += (logs[i] - x) * (indicator[i] - y);
    variance += (logs[i] - x) ** 2;
  }
  return variance > 0 && y > 0 ? covariance / variance / y : 0;
}

function topOf(rows: SensitivityRow[], by: 'shareExplained' | 'oddsExplained'): SensitivityRow['id'] {
  return rows.reduce((a, b) => (b[by] > a[by] ? b : a)).id;
}
