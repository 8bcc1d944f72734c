/**
 * Draws that leave the house: thinned, with no column but those a scenario reads, and rounded, so that a reader can move the sliders of a
 * forecast link in the browser. Six digits are a millionth of a value, where the draws themselves differ by percents.
 */
import { z } from 'zod';
import { columnIndex, thinDraws } from '../estimate/draws';
import type { DrawSet } from '../estimate/types';

/** Draws that a page works on: a slider must answer within a frame or two, and 400 draws put a median within 2.5 points. */
export const TRIAL_DRAWS = 400;

export const trialSchema = z.object({
  draws: z
    .object({
      errorModel: z.enum(['ar1', 'process-noise']),
      columns: z.array(z.string()).min(1),
      count: z.number().int().positive().max(TRIAL_DRAWS),
      values: z.array(z.number()),
    })
    .refine(({ columns, count, values }) => values.length === columns.length * count, {
      path: ['values'],
      message: 'must hold one number per draw and column',
    }),
  horizonMonths: z.number().int().positive(),
  seed: z.number().int(),
});
/** What `prepareScenario` needs, frozen. */
export type Trial = z.infer<typeof trialSchema>;

/** Columns of which a scenario knows nothing. */
const LEFT_OUT = ['n1Start', 'n2Start', 'breakMonth'];
const DIGITS = 6;
/** Columns in users. */
const USER_COLUMNS = ['k1', 'k2', 'n1', 'n2'];

export function takeTrialDraws(draws: DrawSet, count: number = TRIAL_DRAWS): Trial['draws'] {
  const thinned = thinDraws(draws, count);
  const columns = thinned.columns.filter((column) => !LEFT_OUT.includes(column));
  const indices = columns.map((column) => columnIndex(thinned, column));
  const width = thinned.columns.length;
  const values = Array.from({ length: thinned.count }, (_, i) =>
    indices.map((index) => Number(thinned.values[i * width + index]!.toPrecision(DIGITS))),
  ).flat();
  return { errorModel: thinned.errorModel, columns, count: thinned.count, values };
}

/** The same draws with users counted in other units; growth rates, competition and shares do not change. */
export function scaleDraws(draws: Trial['draws'], factor: number): Trial['draws'] {
  const isUsers = draws.columns.map((column) => USER_COLUMNS.includes(column));
  const width = draws.columns.length;
  return {
    ...draws,
    values: draws.values.map((value, at) =>
      isUsers[at % width] ? Number((value * factor).toPrecision(DIGITS)) : value,
    ),
  };
}
