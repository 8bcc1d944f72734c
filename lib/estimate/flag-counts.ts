/**
 * Single counts that the model cannot believe: a spike, a typing error, a month of robots.
 *
 * For each count the likelihood with its variance multiplied by FLAGGED_INFLATION is compared with that without, at fixed parameters:
 * the Bayes factor of "this count says nothing" (a contaminated normal, Box & Tiao 1968). The worst count is flagged when the factor beats
 * the prior odds, then the rest are looked at again. A flagged count is kept in the series and nearly ignored by the fit.
 */
import type { StatePosterior } from './state-posterior';

export interface Flag {
  firm: 1 | 2;
  /** Month of the grid. */
  month: number;
}

/** Log Bayes factor from which a count is flagged: prior odds of 1 in 400 months; a count some 4.6 of its sd away passes. */
export const FLAG_ABOVE = 6;
/** Largest share of the counts of a firm that may be flagged: more than that is no accident but the data. */
export const MAX_FLAGGED_SHARE = 0.05;

/** Flags on a scratch copy of the posterior's flags, which are left as they were. */
export function flagCounts(posterior: StatePosterior, q: Float64Array): Flag[] {
  const { firms, months } = posterior.observations;
  const before = posterior.flags.slice();
  const flagged: Flag[] = [];
  const room = firms.map(({ months: observed }) => Math.floor(MAX_FLAGGED_SHARE * observed.length));
  for (;;) {
    const base = posterior.logDensity(q, null);
    let best: Flag | null = null;
    let bestGain = FLAG_ABOVE;
    firms.forEach((firm, i) => {
      if (room[i] === 0) return;
      for (const month of firm.months) {
        const at = i * months + month;
        if (posterior.flags[at] === 1) continue;
        posterior.flags[at] = 1;
        const gain = posterior.logDensity(q, null) - base;
        posterior.flags[at] = 0;
        if (gain > bestGain) {
          bestGain = gain;
          best = { firm: i === 0 ? 1 : 2, month };
        }
      }
    });
    if (!best) break;
    const { firm, month } = best as Flag;
    posterior.flags[(firm - 1) * months + month] = 1;
    room[firm - 1]--;
    flagged.push(best);
  }
  posterior.flags.set(before);
  return flagged.sort((a, b) => a.firm - b.firm || a.month - b.month);
}
