import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { createNumberFormat } from '@/lib/brief/number-format';

const format = createNumberFormat('en');
const german = createNumberFormat('de');
const plain = (text: string) => text.replaceAll('\u00a0', ' ');

describe('createNumberFormat', () => {
  it('rounds users to what the interval supports', () => {
    expect(format.users(308_412, { q05: 280_111, q95: 340_222 })).toBe('310,000');
    expect(format.usersInterval({ q05: 280_111, q95: 340_222 })).toBe('280,000 to 340,000');
    expect(format.users(308_412, { q05: 308_000, q95: 309_000 })).toBe('308,000');
    expect(format.users(308_412)).toBe('308,000');
  });

  it('keeps one significant digit of the smaller number of a wide interval', () => {
    expect(format.users(60_000, { q05: 20_400, q95: 900_000 })).toBe('60,000');
    expect(format.usersInterval({ q05: 20_400, q95: 912_000 })).toBe('20,000 to 900,000');
  });

  it('says less than one user instead of none, and spells a true zero', () => {
    expect(format.users(1e-7)).toBe('<1');
    expect(format.users(0)).toBe('0');
    expect(format.users(0.7, { q05: 0.1, q95: 5000 })).toBe('1');
    expect(format.usersInterval({ q05: 1e-9, q95: 0.01 })).toBe('<1');
  });

  it('never shows a chance as impossible or certain', () => {
    expect(plain(format.chance(0))).toBe('<1 %');
    expect(plain(format.chance(0.0099))).toBe('<1 %');
    expect(plain(format.chance(0.01))).toBe('1 %');
    expect(plain(format.chance(0.88))).toBe('88 %');
    expect(plain(format.chance(0.99))).toBe('99 %');
    expect(plain(format.chance(0.9901))).toBe('>99 %');
    expect(plain(format.chance(1))).toBe('>99 %');
    expect(plain(format.chanceInterval({ q05: 0.44, q95: 0.61 }))).toBe('44 to 61 %');
    expect(plain(format.chanceInterval({ q05: 0, q95: 1 }))).toBe('<1 to >99 %');
    expect(plain(format.chanceInterval({ q05: 0.5301, q95: 0.5302 }))).toBe('53 %');
    expect(plain(format.seenShare(1))).toBe('100 %');
    expect(() => format.chance(Number.NaN)).toThrow(/between 0 and 1/);
  });

  it('signs differences in points with a true minus and never signs zero', () => {
    expect(plain(format.points(-0.04, { q05: -0.06, q95: -0.02 }))).toBe('\u22124 points');
    expect(plain(format.points(-0.04, { q05: -0.045, q95: -0.035 }))).toBe('\u22124.0 points');
    expect(plain(format.points(0.01))).toBe('+1 point');
    expect(plain(format.points(-0.00001))).toBe('about 0 points');
    expect(plain(format.points(-0))).toBe('0 points');
    expect(plain(format.pointsInterval({ q05: -0.09, q95: -0.02 }))).toBe('\u22129 to \u22122 points');
    expect(plain(format.pointsInterval({ q05: -1e-9, q95: 1e-9 }))).toBe('about 0 points');
    expect(format.usersDifference(-4_212, { q05: -9000, q95: -800 })).toBe('\u22124,000');
    expect(format.usersDifference(-0.2)).toBe('about 0');
    expect(format.usersDifference(-0)).toBe('0');
  });

  it('spells percents and plain numbers as far as the interval supports', () => {
    expect(plain(format.percent(0.623, { q05: 0.4, q95: 0.9 }))).toBe('60 %');
    expect(plain(format.percent(0.623, { q05: 0.59, q95: 0.66 }))).toBe('62 %');
    expect(plain(format.percentInterval({ q05: 0.11, q95: 0.18 }))).toBe('11 to 18 %');
    expect(format.number(0.62, { q05: 0.35, q95: 0.92 })).toBe('0.6');
    expect(format.numberInterval({ q05: 0.003, q95: 0.92 })).toBe('0.003 to 0.9');
  });

  it('follows the locale', () => {
    expect(german.users(308_412)).toBe('308.000');
    expect(german.number(0.62, { q05: 0.35, q95: 0.92 })).toBe('0,6');
  });

  it('shortens axis labels', () => {
    expect([0, 500, 100_000, 1_200_000, 2_500, 3e9, 0.25].map(format.axis)).toEqual([
      '0',
      '500',
      '100k',
      '1.2M',
      '2.5k',
      '3bn',
      '0.25',
    ]);
  });

  it('never shows negative zero, NaN or an infinity', () => {
    const numbers = fc.double({ noNaN: true, noDefaultInfinity: true, min: -1e12, max: 1e12 });
    fc.assert(
      fc.property(numbers, numbers, numbers, (value, a, b) => {
        const width = { q05: Math.min(a, b), q95: Math.max(a, b) };
        const texts = [
          format.usersDifference(value, width),
          format.points(value / 1e12, { q05: width.q05 / 1e12, q95: width.q95 / 1e12 }),
          format.number(value, width),
          format.percent(value, width),
          format.axis(value),
        ];
        for (const text of texts) {
          expect(text).not.toMatch(/NaN|Infinity|∞/);
          expect(text).not.toMatch(/^[\u2212+-]0([.,]0+)?(\s|$)/);
        }
      }),
    );
  });

  it('refuses what is not finite', () => {
    expect(() => format.users(Number.NaN)).toThrow(RangeError);
    expect(() => format.number(Number.POSITIVE_INFINITY)).toThrow(RangeError);
  });
});
