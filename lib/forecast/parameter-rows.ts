/**
 * Each parameter as the data leave it beside what was believed before, and how much the data taught.
 */
import { drawFromPrior, type Priors } from '../estimate/priors';
import { createStream } from '../numeric/random';
import type { DrawTable } from './draw-table';
import { intervalOf } from './interval';
import type { ParameterRow } from './report';

const PRIOR_DRAWS = 4000;
/** Stream of seed 0: the prior rows do not depend on the seed of a fit. */
const PRIOR_STREAM = 50;

type Values = Record<ParameterRow['id'], Float64Array>;

export function computeParameterRows(table: DrawTable, priors: Priors): ParameterRow[] {
  const posterior = withPerUserEffects(table);
  const prior = withPerUserEffects(drawPriorTable(priors));
  return (Object.keys(posterior) as ParameterRow['id'][]).map((id) => ({
    id,
    posterior: intervalOf(posterior[id]),
    prior: intervalOf(prior[id]),
    contraction: contractionOf(posterior[id], prior[id]),
  }));
}

/** Adds a12 = alpha K1/K2 and a21 = beta K2/K1: places of one firm taken by one user of the other. */
function withPerUserEffects(table: Omit<DrawTable, 'count' | 'n1' | 'n2'>): Values {
  const { r1, r2, k1, k2, alpha, beta } = table;
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

function drawPriorTable(priors: Priors): Omit<DrawTable, 'count' | 'n1' | 'n2'> {
  const stream = createStream(0, PRIOR_STREAM);
  const theta = new Float64Array(8);
  const columns = Array.from({ length: 6 }, () => new Float64Array(PRIOR_DRAWS));
  for (let i = 0; i < PRIOR_DRAWS; i++) {
    drawFromPrior(priors, stream, theta);
    columns.forEach((column, j) => {
      column[i] = Math.exp(theta[j]);
    });
  }
  const [r1, r2, k1, k2, alpha, beta] = columns;
  return { r1, r2, k1, k2, alpha, beta };
}

/** 1 - var(posterior of ln) / var(prior of ln), clipped to 0 .. 1. */
function contractionOf(posterior: Float64Array, prior: Float64Array): number {
  const ratio = varianceOfLog(posterior) / varianceOfLog(prior);
  return Math.min(Math.max(1 - ratio, 0), 1) || 0;
}

function varianceOfLog(values: Float64Array): number {
  let mean = 0;
  for (const value of values) mean += Math.log(value) / values.length;
  let sum = 0;
  for (const value of values) sum += (Math.log(value) - mean) ** 2;
  return sum / (values.length - 1);
}
