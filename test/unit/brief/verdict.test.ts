import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { buildBrief } from '@/lib/brief/build-brief';
import { LIKELY_ABOVE, wordProbability } from '@/lib/brief/probability-words';
import { plainText } from '@/lib/brief/text';
import { writeVerdict } from '@/lib/brief/verdict';
import { createWords } from '@/lib/brief/words';
import { DECIDED_ABOVE } from '@/lib/forecast/odds';
import { OUTCOMES } from '@/lib/forecast/outcomes';
import type { Odds } from '@/lib/forecast/report';
import { briefWith, factsOf, factsWith, headlineOf, oddsOf, proseOf, spaced, supportOf } from './brief-cases';
import { SAMPLES, type SampleName } from './sample-report';

const F = 'Quillfern';
const R = 'Marrowby';

const neverOvertakes = {
  id: 'overtaking',
  overtaker: 'rival',
  chance: 0.02,
  windowMonths: 120,
  monthsAhead: null,
} as const;

describe('writeVerdict', () => {
  it('calls decided what the forecast calls decided', () => {
    expect(LIKELY_ABOVE).toBe(DECIDED_ABOVE);
  });

  it.each([
    [oddsOf(0.88, 0.06, 0.05, 0.01), `${F} and ${R} will likely end up sharing this market.`],
    [oddsOf(0.95, 0.02, 0.02, 0.01), `${F} and ${R} will very likely end up sharing this market.`],
    [oddsOf(0.995, 0.005, 0, 0), `${F} and ${R} are virtually certain to end up sharing this market.`],
    [oddsOf(0.1, 0.7, 0.1, 0.1), `${F} will likely squeeze ${R} out of this market in the end.`],
    [oddsOf(0.02, 0.96, 0.01, 0.01), `${F} will very likely squeeze ${R} out of this market in the end.`],
    [oddsOf(0, 1, 0, 0), `${F} is virtually certain to squeeze ${R} out of this market in the end.`],
    [oddsOf(0.1, 0.1, 0.7, 0.1), `${R} will likely squeeze ${F} out of this market in the end.`],
    [oddsOf(0.01, 0.01, 0.97, 0.01), `${R} will very likely squeeze ${F} out of this market in the end.`],
  ])('names the firm and the strength of the odds %j', (odds, headline) => {
    // the sample behind stands for another outcome: the verdict follows the odds alone
    for (const sample of ['coexistence', 'exclusionByFocal', 'undecided'] as SampleName[]) {
      expect(headlineOf(briefWith(sample, { odds, overtaking: neverOvertakes }))).toBe(headline);
    }
  });

  it.each([
    [0.85, `as things stand ${F} is likely on the winning side (85 %)`],
    [0.97, `as things stand ${F} is very likely on the winning side (97 %)`],
    [0.05, `as things stand ${R} is very likely on the winning side (95 %)`],
    [0.3, `as things stand ${R} is likely on the winning side (70 %)`],
    [1, `as things stand ${F} is virtually certainly on the winning side (>99 %)`],
    [0.5, 'the data do not tell yet which'],
    [0.36, 'the data do not tell yet which'],
    [null, 'which one cannot be told yet'],
  ])('says who is ahead of a deciding head start with %d', (headStartFocalAhead, clause) => {
    const odds = oddsOf(0.05, 0.05, 0.05, 0.85);
    const headline = headlineOf(briefWith('headStartDecides', { odds, headStartFocalAhead }));
    expect(headline).toContain('The head start will likely decide this market');
    expect(headline).toContain(clause);
  });

  it.each([
    [
      oddsOf(0.5, 0.3, 0.15, 0.05),
      `Both firms staying leads with 50 %, ahead of ${F} alone staying with 30 %.`,
    ],
    [
      oddsOf(0.66, 0.2, 0.1, 0.04),
      `Both firms staying leads with 66 %, ahead of ${F} alone staying with 20 %.`,
    ],
    [
      oddsOf(0.1, 0.2, 0.6, 0.1),
      `${R} alone staying leads with 60 %, ahead of ${F} alone staying with 20 %.`,
    ],
    [
      oddsOf(0.05, 0.4, 0.42, 0.13),
      `${R} alone staying (42 %) and ${F} alone staying (40 %) are about level.`,
    ],
    [oddsOf(0.25, 0.25, 0.25, 0.25), 'All four outcomes are about level.'],
  ])('does not force a verdict from %j', (odds, leading) => {
    const brief = briefWith('coexistence', { odds });
    expect(headlineOf(brief)).toBe(`The data do not decide yet. ${leading}`);
    expect(brief.where.verdict.decided).toBeNull();
    expect(supportOf(brief)).toContain('What is not settled is how much of');
  });

  it('says what is not settled: the coefficient whose side of 1 is open, and only that', () => {
    const onlyBeta = supportOf(briefWith('coexistence', { odds: oddsOf(0.5, 0.48, 0.01, 0.01) }));
    expect(onlyBeta).toContain(`how much of ${R}’s room a full ${F} takes`);
    expect(onlyBeta).not.toContain(`how much of ${F}’s room`);
    const onlyAlpha = supportOf(briefWith('coexistence', { odds: oddsOf(0.5, 0.01, 0.48, 0.01) }));
    expect(onlyAlpha).toContain(`how much of ${F}’s room a full ${R} takes`);
    expect(onlyAlpha).not.toContain(`how much of ${R}’s room`);
  });

  it('says when two open outcomes have the same end', () => {
    const odds = oddsOf(0, 0.43, 0, 0.57);
    expect(supportOf(briefWith('headStartDecides', { odds, headStartFocalAhead: 0.98 }))).toContain(
      `By its strength or by its head start, ${F} will very likely end up alone all the same (99 %).`,
    );
    expect(supportOf(briefWith('headStartDecides', { odds, headStartFocalAhead: 0.3 }))).not.toContain(
      'all the same',
    );
  });

  it('says when the best fit lies on the border, and between which outcomes', () => {
    const facts = factsWith('undecided', { odds: oddsOf(0.5, 0.5, 0, 0) });
    facts.report.point.alpha = 0.5;
    facts.report.point.beta = 1.001;
    expect(supportOf(buildBrief(facts))).toContain(
      `on the border between both firms staying and ${F} alone staying`,
    );
    facts.report.point.beta = 1.2;
    expect(supportOf(buildBrief(facts))).not.toContain('on the border');
  });

  it('says when the data hardly moved the odds', () => {
    const flat = oddsOf(0.25, 0.25, 0.25, 0.25);
    const hardly = 'The data have hardly moved the odds';
    expect(
      supportOf(briefWith('undecided', { odds: oddsOf(0.3, 0.2, 0.25, 0.25), priorOdds: flat })),
    ).toContain(hardly);
    expect(
      supportOf(briefWith('undecided', { odds: oddsOf(0.5, 0.2, 0.15, 0.15), priorOdds: flat })),
    ).not.toContain(hardly);
  });

  it('tells the odds before the data', () => {
    const odds = oddsOf(0.88, 0.06, 0.05, 0.01);
    const brief = briefWith('coexistence', { odds, priorOdds: oddsOf(0.4, 0.2, 0.2, 0.2) });
    expect(supportOf(brief)).toContain('The odds are 88 % (likely); before the data they stood at 40 %.');
    expect(spaced(plainText(brief.where.note))).toBe(
      `Before the data: both stay 40 %, ${F} alone 20 %, ${R} alone 20 % and head start decides 20 %.`,
    );
  });

  it('says in the headline that a firm overtakes only when that is likely', () => {
    const odds = oddsOf(0.88, 0.06, 0.05, 0.01);
    const months = { q05: 12, q50: 15, q95: 24 };
    const at = (chance: number, overtaker: 'focal' | 'rival') =>
      headlineOf(
        briefWith('coexistence', {
          odds,
          overtaking: { id: 'overtaking', overtaker, chance, windowMonths: 120, monthsAhead: months },
        }),
      );
    expect(at(0.8, 'rival')).toContain(`, with ${R} likely to overtake around March 2027.`);
    expect(at(0.95, 'focal')).toContain(`, with ${F} very likely to overtake around March 2027.`);
    expect(at(0.5, 'rival')).not.toContain('overtake');
  });

  it('warns that the odds are rough when the sampler had not settled', () => {
    const facts = factsOf('coexistence');
    facts.report.diagnostics.status = 'not-converged';
    expect(supportOf(buildBrief(facts))).toMatch(/^The sampler had not settled/);
  });

  it('says that firms which take nothing from each other grow as if alone', () => {
    const facts = factsOf('coexistence');
    const low = { q05: 0.001, q50: 0.02, q95: 0.1 };
    for (const row of facts.report.parameters)
      if (row.id === 'alpha' || row.id === 'beta') row.posterior = low;
    expect(supportOf(buildBrief(facts))).toContain('each grows much as it would alone');
  });

  it('mirrors when the firms are swapped', () => {
    for (const [odds, ahead] of [
      [oddsOf(0.1, 0.7, 0.1, 0.1), 0.5],
      [oddsOf(0, 0, 0.1, 0.9), 0.9],
    ] as [Odds, number][]) {
      const facts = factsWith('exclusionByFocal', { odds, headStartFocalAhead: ahead });
      const swapped = factsWith('exclusionByFocal', {
        odds: oddsOf(odds.coexistence, odds.exclusionByRival, odds.exclusionByFocal, odds.headStartDecides),
        headStartFocalAhead: 1 - ahead,
      });
      swapped.market = { ...facts.market, focalName: R, rivalName: F };
      const headline = (one: typeof facts) => plainText(writeVerdict(createWords(one)).headline);
      expect(headline(swapped)).toBe(headline(facts));
    }
  });
});

/** Odds that sum to 1, corners and near-corners included. */
const anyOdds = fc
  .tuple(fc.nat(1000), fc.nat(1000), fc.nat(1000), fc.nat(1000))
  .filter((weights) => weights.some((weight) => weight > 0))
  .map((weights) => {
    const total = weights.reduce((sum, weight) => sum + weight ** 3, 0);
    const [a, b, c, d] = weights.map((weight) => weight ** 3 / total) as [number, number, number, number];
    return oddsOf(a, b, c, d);
  });

describe('the whole brief', () => {
  it('never contradicts the odds, names the wrong firm or overclaims, whatever the odds and the sample', () => {
    const chance = fc.double({ min: 0, max: 1, noNaN: true });
    const names = fc.constantFrom(...(Object.keys(SAMPLES) as SampleName[]));
    fc.assert(
      fc.property(names, anyOdds, anyOdds, chance, chance, (name, odds, priorOdds, ahead, overtaking) => {
        const sample = factsOf(name).report.outlook.overtaking;
        const brief = briefWith(name, {
          odds,
          priorOdds,
          headStartFocalAhead: ahead,
          overtaking: { ...sample, chance: overtaking },
        });
        checkVerdict(brief, odds);
        checkProse(proseOf(brief));
      }),
      { numRuns: 60 },
    );
  }, 30_000);
});

function checkVerdict(brief: ReturnType<typeof briefWith>, odds: Odds): void {
  const headline = headlineOf(brief);
  const decided = OUTCOMES.find((outcome) => odds[outcome] > DECIDED_ABOVE) ?? null;
  expect(brief.where.verdict.decided).toBe(decided);
  expect(headline.includes('The data do not decide yet')).toBe(decided === null);
  expect(headline.includes('sharing this market')).toBe(decided === 'coexistence');
  expect(headline.includes(`squeeze ${R} out`)).toBe(decided === 'exclusionByFocal');
  expect(headline.includes(`squeeze ${F} out`)).toBe(decided === 'exclusionByRival');
  expect(headline.startsWith('The head start')).toBe(decided === 'headStartDecides');
  if (decided) {
    const word = wordProbability(odds[decided]);
    expect(headline).toContain(word);
    const row = brief.where.odds.rows.find((one) => one.outcome === decided)!;
    expect(supportOf(brief)).toContain(spaced(`The odds are ${row.percent} (${word})`));
    expect(
      brief.why.oddsMap.quarters.filter((quarter) => quarter.isDecided).map((quarter) => quarter.outcome),
    ).toEqual([decided]);
  } else {
    expect(headline).not.toMatch(/\b(will|certain|sure)\b/);
    // the map promises a destination only where the verdict does
    expect(brief.why.phaseMap.labels.map((label) => label.text)).not.toContain('both settle here');
  }
}

/** Faults that no text may have. */
const FAULTS: [RegExp, string][] = [
  [/NaN|undefined|\bnull\b|Infinity|∞/, 'a number that is none'],
  [/[\u2212-]0(\.0+)?(?![\d.])/, 'negative zero'],
  [/(?<![\d.,])0 %/, 'a chance of 0'],
  [/\b(definitely|guaranteed|inevitably|surely|proves?)\b/i, 'an overclaim'],
  [/ {2}|\.\.|\( | \)| \.| ,/, 'a slip of punctuation'],
];

function checkProse(prose: string[]): void {
  for (const text of prose) {
    for (const [fault, name] of FAULTS) expect(text, name).not.toMatch(fault);
    // "100 %" may only be the border or a coefficient, never a chance
    expect(text).not.toMatch(/100 % (\(|of the draws|within)/);
  }
}
