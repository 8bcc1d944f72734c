import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { buildOddsStrip, sharePercents, spellOdds } from '@/lib/brief/odds-strip';
import { createWords } from '@/lib/brief/words';
import { OUTCOMES } from '@/lib/forecast/outcomes';
import { factsOf, factsWith, oddsOf, spaced } from './brief-cases';

const weights = fc
  .tuple(fc.nat(5000), fc.nat(5000), fc.nat(5000), fc.nat(5000))
  .filter((w) => w.some((x) => x > 0));
const anyOdds = weights.map((w) => {
  const total = w.reduce((sum, x) => sum + x, 0);
  return oddsOf(...(w.map((x) => x / total) as [number, number, number, number]));
});

describe('sharePercents', () => {
  it('adds to exactly 100 and stays within a percent of the odds', () => {
    fc.assert(
      fc.property(anyOdds, (odds) => {
        const shares = sharePercents(odds);
        expect(OUTCOMES.reduce((sum, outcome) => sum + shares[outcome], 0)).toBe(100);
        for (const outcome of OUTCOMES)
          expect(Math.abs(shares[outcome] - 100 * odds[outcome])).toBeLessThan(1);
      }),
    );
  });

  it('gives thirds to the largest remainders', () => {
    expect(Object.values(sharePercents(oddsOf(1 / 3, 1 / 3, 1 / 3, 0)))).toEqual([34, 33, 33, 0]);
  });
});

describe('spellOdds', () => {
  const words = createWords(factsOf('coexistence'));
  const spell = (...odds: [number, number, number, number]) =>
    Object.values(spellOdds(words, oddsOf(...odds))).map(spaced);

  it('prints whole percents that add to 100', () => {
    expect(spell(0.884, 0.056, 0.048, 0.012)).toEqual(['88 %', '6 %', '5 %', '1 %']);
  });

  it('never prints 0 or 100', () => {
    expect(spell(1, 0, 0, 0)).toEqual(['>99 %', '<1 %', '<1 %', '<1 %']);
    expect(spell(0.993, 0.004, 0.003, 0)).toEqual(['>99 %', '<1 %', '<1 %', '<1 %']);
    expect(spell(0.986, 0.005, 0.005, 0.004)).toEqual(['99 %', '<1 %', '<1 %', '<1 %']);
  });

  it('prints numbers that can add to 100', () => {
    fc.assert(
      fc.property(anyOdds, (odds) => {
        const texts = Object.values(spellOdds(words, odds)).map(spaced);
        const whole = texts
          .filter((text) => /^\d/.test(text))
          .reduce((sum, text) => sum + Number.parseInt(text, 10), 0);
        const small = texts.filter((text) => text === '<1 %').length;
        if (texts.includes('>99 %')) expect(whole).toBeLessThanOrEqual(1);
        else {
          expect(whole).toBeLessThanOrEqual(100);
          expect(whole).toBeGreaterThanOrEqual(100 - small);
        }
      }),
    );
  });
});

describe('buildOddsStrip', () => {
  it('has widths that add to 100, the firms by name and colours by role', () => {
    const strip = buildOddsStrip(
      createWords(factsWith('coexistence', { odds: oddsOf(0.88, 0.06, 0.05, 0.01) })),
    );
    expect(strip.rows.reduce((sum, row) => sum + row.width, 0)).toBeCloseTo(100, 10);
    expect(strip.rows.map((row) => [row.label, row.tone, row.words])).toEqual([
      ['both stay', 'both', 'likely'],
      ['Quillfern alone', 'focal', 'very unlikely'],
      ['Marrowby alone', 'rival', 'very unlikely'],
      ['head start decides', 'headStart', 'very unlikely'],
    ]);
    expect(spaced(strip.description)).toContain('both stay 88 % (likely)');
    expect(strip.table.raw[0]).toEqual(['both stay', 0.88, 'likely', 0.25]);
  });

  it('refuses odds that are all 0', () => {
    expect(() => buildOddsStrip(createWords(factsWith('coexistence', { odds: oddsOf(0, 0, 0, 0) })))).toThrow(
      RangeError,
    );
  });
});
