/**
 * Standard errors from the Fisher information, per 1 % lognormal noise on monthly counts with eight free parameters, against an independent
 * computation (scipy). The systems are in the per-user form: dN1/dt = r1 N1 (1 - (N1 + a12 N2)/K1), and the same for firm 2.
 */
import { describe, expect, it } from 'vitest';
import {
  factoriseInformation,
  fillInformationRows,
  standardErrorOf,
} from '@/lib/forecast/identifiability/path-information';

interface Reference {
  name: string;
  r: [number, number];
  a: [number, number];
  start: [number, number];
  /** Months of the series: se of a12, a21, alpha, beta. */
  rows: [number, number, number, number, number][];
}

const K: [number, number] = [1000, 800];
const REFERENCES: Reference[] = [
  {
    name: 'exclusion',
    r: [0.25, 0.2],
    a: [0.7, 0.9],
    start: [50, 20],
    rows: [
      [12, 4.09, 3.94, 3.42, 1.34],
      [24, 0.353, 0.322, 0.284, 0.082],
      [36, 0.118, 0.103, 0.084, 0.019],
      [60, 0.046, 0.039, 0.024, 0.004],
    ],
  },
  {
    name: 'coexistence',
    r: [0.25, 0.2],
    a: [0.5, 0.4],
    start: [50, 20],
    rows: [
      [12, 25.0, 14.7, 19.5, 8.18],
      [24, 0.269, 0.161, 0.199, 0.097],
      [36, 0.059, 0.037, 0.04, 0.024],
      [60, 0.022, 0.015, 0.013, 0.01],
    ],
  },
  {
    name: 'head start',
    r: [0.2, 0.2],
    a: [1.6, 1.2],
    start: [50, 40],
    rows: [
      [12, 21.1, 15.0, 12.5, 12.9],
      [24, 0.774, 0.571, 0.475, 0.433],
      [36, 0.137, 0.109, 0.087, 0.066],
      [60, 0.023, 0.023, 0.016, 0.007],
    ],
  },
  {
    name: 'coexistence, begun next to the equilibrium',
    r: [0.25, 0.2],
    a: [0.5, 0.4],
    start: [740, 480],
    rows: [
      [12, 16.7, 17.0, 11.7, 13.7],
      [24, 2.87, 3.47, 2.01, 2.7],
      [36, 1.34, 1.81, 0.91, 1.36],
      [60, 0.75, 1.12, 0.48, 0.82],
    ],
  },
];

const PERCENT = 0.01;

function computeErrors({ r, a, start }: Reference, months: number): number[] {
  const alpha = (a[0] * K[1]) / K[0];
  const beta = (a[1] * K[0]) / K[1];
  const theta = Float64Array.of(r[0], r[1], K[0], K[1], alpha, beta, start[0], start[1]).map(Math.log);
  const observed = Array.from({ length: months + 1 }, (_, t) => t);
  const grid = { months: months + 1, entry1: 0, entry2: 0, observed: [observed, observed] as const };
  const factor = factoriseInformation(fillInformationRows(theta, grid, [PERCENT, PERCENT])!)!;
  const se = (value: number, gradient: number[]) => value * standardErrorOf(factor, gradient)!;
  return [
    se(a[0], [0, 0, 1, -1, 1, 0, 0, 0]),
    se(a[1], [0, 0, -1, 1, 0, 1, 0, 0]),
    se(alpha, [0, 0, 0, 0, 1, 0, 0, 0]),
    se(beta, [0, 0, 0, 0, 0, 1, 0, 0]),
  ];
}

/** Half a unit of the last printed digit, and 1 % for the monthly steps of Runge-Kutta (rate x step <= 0.2) near singular information. */
function tolerance(printed: number): number {
  const digits = printed >= 1 ? 10 ** (Math.floor(Math.log10(printed)) - 2) : 0.001;
  return digits / 2 + 0.01 * printed;
}

describe.each(REFERENCES)('$name', (reference) => {
  it.each(reference.rows)('has the reference standard errors after %i months', (months, ...wanted) => {
    computeErrors(reference, months).forEach((error, i) => {
      expect(Math.abs(error - wanted[i]), `${error} for ${wanted[i]}`).toBeLessThan(tolerance(wanted[i]));
    });
  });
});
