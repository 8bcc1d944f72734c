/**
 * Gause's yeasts growing alone: the logistic fitted to both experiments together, through the project's least-squares code.
 * Published: Mahaffy, course notes on the logistic growth of yeast (r, K, N at 6 h); data and their source: `test/reference/data/README.md`.
 */
import { describe, expect, it } from 'vitest';
import { fitLeastSquares } from '@/lib/numeric/least-squares';
import type { LeastSquaresProblem } from '@/lib/numeric/least-squares-problem';
import { readCsv } from './read-data';

/** Published to five digits, of which the last is one unit off in one number. */
const PRINTED = 1e-4;

const FILES = ['gause1934_app_t1_yeast_exp1.csv', 'gause1934_app_t1_yeast_exp2.csv'];

function readAlone(column: string): [number, number][] {
  return FILES.flatMap((name) =>
    readCsv(name).flatMap((row) =>
      row[column] === '' ? [] : [[Number(row.hour), Number(row[column])] as [number, number]],
    ),
  );
}

/** N(t) = K/(1 + (K/N6 - 1) exp(-r (t - 6))), theta = (r, K, N6). */
function createLogistic(points: [number, number][]): LeastSquaresProblem {
  return {
    parameterCount: 3,
    residualCount: points.length,
    evaluate([r, k, start], residuals, jacobian) {
      points.forEach(([hour, volume], i) => {
        const decay = Math.exp(-r * (hour - 6));
        const below = 1 + (k / start - 1) * decay;
        const level = k / below;
        residuals[i] = level - volume;
        jacobian?.set(
          [
            (level / below) * (k / start - 1) * decay * (hour - 6),
            (1 - (level * decay) / start) / below,
            ((level / below) * k * decay) / (start * start),
          ],
          3 * i,
        );
      });
      return residuals.every(Number.isFinite);
    },
  };
}

describe.each([
  ['saccharomyces_alone', 14, 0.25864, 12.742, 1.2343, 4.945989],
  ['schizosaccharomyces_alone', 10, 0.057443, 5.8802, 0.67805, 1.384988],
] as const)('%s', (column, count, r, k, start, rss) => {
  it('has the published growth rate, saturation level and first volume', () => {
    const points = readAlone(column);
    expect(points).toHaveLength(count);
    const fit = fitLeastSquares(createLogistic(points), [0.1, 10, 1], { noise: 'estimated' });
    expect(fit.status).toBe('gradient');
    [r, k, start].forEach((published, i) => {
      expect(Math.abs(fit.theta[i] / published - 1)).toBeLessThan(PRINTED);
    });
    expect(2 * fit.cost).toBeCloseTo(rss, 5);
  });
});
