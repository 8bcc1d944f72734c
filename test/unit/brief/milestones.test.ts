import { describe, expect, it } from 'vitest';
import { writeMilestones } from '@/lib/brief/milestones';
import { plainText } from '@/lib/brief/text';
import { createWords } from '@/lib/brief/words';
import type { Outlook } from '@/lib/forecast/report';
import { factsWith, spaced } from './brief-cases';

const soon = { q05: 12, q50: 15, q95: 24 };
const rowsWith = (outlook: Partial<Outlook>) =>
  writeMilestones(createWords(factsWith('coexistence', outlook))).map((row) => ({
    ...row,
    value: spaced(row.value),
    chance: spaced(row.chance),
    text: spaced(plainText(row.sentence)),
  }));
const overtaking = (
  chance: number,
  monthsAhead: typeof soon | null,
  overtaker: 'focal' | 'rival' = 'rival',
) => rowsWith({ overtaking: { id: 'overtaking', chance, windowMonths: 120, monthsAhead, overtaker } })[0]!;

describe('overtaking', () => {
  it.each([
    [
      0.82,
      soon,
      'It is likely that Marrowby overtakes Quillfern, around March 2027 (Dec 2026 to Dec 2027; 82 % within 10 years).',
    ],
    [
      0.5,
      soon,
      'Marrowby may or may not overtake Quillfern (50 % within 10 years); if it does, around March 2027 (Dec 2026 to Dec 2027).',
    ],
    [0.2, soon, 'Marrowby is unlikely to overtake Quillfern (20 % within 10 years).'],
    [0, null, 'Marrowby is exceptionally unlikely to overtake Quillfern (<1 % within 10 years).'],
    [
      1,
      soon,
      'It is virtually certain that Marrowby overtakes Quillfern, around March 2027 (Dec 2026 to Dec 2027; >99 % within 10 years).',
    ],
  ])('at %d', (chance, months, text) => expect(overtaking(chance, months).text).toBe(text));

  it('names the firm behind as the one that overtakes', () => {
    expect(overtaking(0.8, soon, 'focal').label).toBe('Quillfern overtakes Marrowby');
    expect(overtaking(0.8, soon, 'focal').text).toContain('Quillfern overtakes Marrowby');
  });

  it('may never come as long as it is not likely', () => {
    expect(overtaking(0.82, soon).value).toBe('around March 2027 (Dec 2026 to Dec 2027)');
    expect(overtaking(0.66, soon).value).toMatch(/^may never come; if it does, around March 2027/);
    expect(overtaking(0.3, null).value).toBe('may never come');
    expect(overtaking(0.001, null).value).toBe('no sign of it');
  });
});

describe('the destination', () => {
  const near = (chance: number, monthsAhead: typeof soon | null) =>
    rowsWith({ nearDestination: { id: 'nearDestination', chance, windowMonths: 120, monthsAhead } })[1]!.text;

  it('reads as a sentence whatever the chance', () => {
    expect(near(0.9, soon)).toBe(
      'The market comes within 5 % of where it is heading around March 2027 (Dec 2026 to Dec 2027); 90 % within 10 years.',
    );
    expect(near(0.4, soon)).toBe(
      'The market may never come within 5 % of where it is heading; if it does, around March 2027 (Dec 2026 to Dec 2027); 40 % within 10 years.',
    );
    expect(near(0, null)).toBe(
      'The market shows no sign of coming within 5 % of where it is heading; <1 % within 10 years.',
    );
  });

  it('has no half-life row when nothing returns', () => {
    expect(rowsWith({ returnHalfLifeMonths: null })).toHaveLength(2);
    expect(rowsWith({ returnHalfLifeMonths: { q05: 6, q50: 11, q95: 30 } })[2]!.value).toBe(
      '11 months (6 to 30)',
    );
  });
});
