/**
 * Reads the NIST StRD sets of `test/reference/data/nist` and states each as a least-squares problem, residual = model - response.
 */
import { readdirSync, readFileSync } from 'node:fs';
import type { LeastSquaresProblem } from '@/lib/numeric/least-squares-problem';
import { NIST_MODELS } from './models';

export interface NistSet {
  name: string;
  difficulty: 'Lower' | 'Average' | 'Higher';
  degreesOfFreedom: number;
  params: { name: string; start1: number; start2: number; certified: number; sd: number }[];
  residualSumOfSquares: number;
  /** Predictors of each observation: one number, or one per predictor. */
  x: (number | number[])[];
  y: number[];
}

const FOLDER = new URL('../data/nist/', import.meta.url);

/** All 27 sets, by name. */
export function readNistSets(): NistSet[] {
  return readdirSync(FOLDER)
    .filter((name) => name.endsWith('.json'))
    .sort()
    .map((name) => JSON.parse(readFileSync(new URL(name, FOLDER), 'utf8')) as NistSet);
}

/** The least-squares problem of one set. Nelson's model is for the logarithm of the stored response. */
export function createNistProblem(set: NistSet): LeastSquaresProblem {
  const model = NIST_MODELS[set.name];
  const predictors = set.x.map((x) => (Array.isArray(x) ? x : [x]));
  const response = set.name === 'Nelson' ? set.y.map(Math.log) : set.y;
  const n = set.params.length;
  const gradient = new Float64Array(n);
  return {
    parameterCount: n,
    residualCount: response.length,
    evaluate(theta, residuals, jacobian) {
      let sum = 0;
      for (let i = 0; i < response.length; i++) {
        residuals[i] = model(predictors[i], theta, gradient) - response[i];
        sum += Math.abs(residuals[i]);
        if (!jacobian) continue;
        for (let j = 0; j < n; j++) {
          jacobian[i * n + j] = gradient[j];
          sum += Math.abs(gradient[j]);
        }
      }
      return Number.isFinite(sum);
    },
  };
}
