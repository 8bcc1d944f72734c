/** Bands of future counts around levels: level times error, the same errors for every scenario. */
import type { DrawSet } from '../estimate/types';
import { shareOf } from '../forecast/bands';
import type { ScenarioBands } from './comparison';
import { createLevels, type Levels } from './follow-draws';
import { BandMaker } from './scenario-bands';
import { drawErrorFactors, REPLICATES } from './scenario-draws';

export class CountBands {
  private readonly counts: Levels;
  private readonly focalErrors: Float64Array;
  private readonly rivalErrors: Float64Array;
  private readonly bands: BandMaker;

  constructor(
    draws: DrawSet,
    private readonly months: number,
    seed: number,
  ) {
    const total = draws.count * REPLICATES;
    this.counts = createLevels(months * total);
    this.focalErrors = drawErrorFactors(draws, 1, months, seed);
    this.rivalErrors = drawErrorFactors(draws, 2, months, seed);
    this.bands = new BandMaker(total);
  }

  of(levels: Levels): ScenarioBands {
    const { counts, focalErrors, rivalErrors, months, bands } = this;
    for (let at = 0; at < counts.focal.length; at++) {
      const level = Math.floor(at / REPLICATES);
      const focal = levels.focal[level]! * focalErrors[at]!;
      const rival = levels.rival[level]! * rivalErrors[at]!;
      counts.focal[at] = focal;
      counts.rival[at] = rival;
      counts.share[at] = shareOf(focal, rival);
    }
    return {
      focal: bands.bands(counts.focal, months),
      rival: bands.bands(counts.rival, months),
      share: bands.bands(counts.share, months),
    };
  }
}
