import { describe, expect, it } from 'vitest';
import { ENGINE_VERSION } from '@/lib/estimate/engine-version';
import { USUAL_PRIORS } from '@/lib/estimate/priors';
import { explainStaleReason } from '@/lib/services/explain';
import { type FitBasis, toFitOptions } from '@/lib/services/new-fit';
import { listStaleReasons } from '@/lib/services/staleness';

const MARKET: FitBasis = {
  focalError: 0,
  rivalError: 0.1,
  focalAddressable: null,
  rivalAddressable: 4e5,
  addressableError: 0.5,
  priors: null,
  changeMonths: [24_300],
};

const reasonsFor = (fitted: FitBasis, now: FitBasis, revisionId = 'newest', engineVersion = ENGINE_VERSION) =>
  listStaleReasons({ revisionId, engineVersion, options: toFitOptions(fitted) }, now, 'newest');

describe('an outlook', () => {
  it('answers for the market that it was made of, also after a way through storage', () => {
    expect(reasonsFor(MARKET, MARKET)).toEqual([]);
    const stored = JSON.parse(JSON.stringify(toFitOptions(MARKET)));
    const reordered = { ...stored, addressable: { relativeError: 0.5, rival: 4e5, focal: null } };
    const fitted = { revisionId: 'newest', engineVersion: ENGINE_VERSION, options: reordered };
    expect(listStaleReasons(fitted, MARKET, 'newest')).toEqual([]);
  });

  it('of an earlier version without these options answers for a market that states none', () => {
    const bare = { focalError: 0, rivalError: 0 };
    const { seed, horizonMonths, measurementFloor, errorModel } = toFitOptions(bare);
    expect(toFitOptions({ ...MARKET, ...bare, rivalAddressable: null, changeMonths: [] })).toEqual({
      seed,
      horizonMonths,
      measurementFloor,
      errorModel,
    });
  });

  const changes: [string, Partial<FitBasis>][] = [
    ['measurement-changed', { rivalError: 0.2 }],
    ['events-changed', { changeMonths: [] }],
    ['events-changed', { changeMonths: [24_300, 24_305] }],
    ['events-changed', { changeMonths: [24_301] }],
    ['addressable-changed', { rivalAddressable: null }],
    ['addressable-changed', { addressableError: 0.3 }],
    ['priors-changed', { priors: { ...USUAL_PRIORS, noCompetition: 0.5 } }],
  ];
  it.each(changes)('is out of date for one reason: %s', (reason, change) => {
    expect(reasonsFor(MARKET, { ...MARKET, ...change })).toEqual([reason]);
    expect(reasonsFor({ ...MARKET, ...change }, MARKET)).toEqual([reason]);
    expect(explainStaleReason(reason as 'events-changed', { used: 1, newest: 1 })).toMatch(
      /since this outlook was made\.$/,
    );
  });

  it('is out of date with newer data and with another engine', () => {
    expect(reasonsFor(MARKET, MARKET, 'earlier', '0.0.1')).toEqual(['newer-revision', 'engine-changed']);
  });
});
