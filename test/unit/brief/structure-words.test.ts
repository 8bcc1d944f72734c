import { describe, expect, it } from 'vitest';
import { writeLeftOut } from '@/lib/brief/structure-words';
import { plainText } from '@/lib/brief/text';
import { createWords } from '@/lib/brief/words';
import type { Structure } from '@/lib/forecast/report';
import { makeSample } from './sample-report';

const { facts } = makeSample('coexistence');
const PLAIN: Structure = { seasonHarmonics: 0, breakChance: 0.02, breakMonth: null, flaggedCounts: [] };
const first = facts.series.firstMonth;

function say(structure: Structure | undefined): string {
  return plainText(writeLeftOut(createWords({ ...facts, report: { ...facts.report, structure } })));
}

describe('what the series holds besides growth and competition', () => {
  it.each([undefined, PLAIN])('says only what is left out when nothing was found', (structure) => {
    expect(say(structure)).toMatch(
      /^Left out: a third firm, prices, seasons, and every change of strengths after [A-Z]\w+ \d{4}\.$/,
    );
  });

  it('does not call a season left out that is part of the forecast', () => {
    const text = say({ ...PLAIN, seasonHarmonics: 2 });
    expect(text).toContain('A yearly cycle was found');
    expect(text).not.toContain('seasons');
  });

  it('tells when strengths may have changed, with the chance', () => {
    const breakMonth = { q05: first + 12, q50: first + 13.4, q95: first + 15 };
    const text = say({ ...PLAIN, breakChance: 0.62, breakMonth });
    expect(text).toMatch(/changed once, around \w+ \d{4} \(\w+ \d{4} to \w+ \d{4}\): 62\s%/);
  });

  it('tells of marked months by their notes, with the chance and what it was before', () => {
    const markedBreaks = [{ month: first + 9, chance: 0.92 }];
    const event = { month: first + 9, note: 'New prices', changesParameters: true };
    const structure = { ...PLAIN, markedBreaks };
    const report = { ...facts.report, structure };
    const text = plainText(writeLeftOut(createWords({ ...facts, report, events: [event] })));
    expect(text).toMatch(
      /^Chance that strengths changed with what was marked, even odds before the counts: New prices \(\w+ \d{4}\) 92\s%\./,
    );
    // an outlook may outlive its event
    expect(say(structure)).toMatch(/before the counts: \w+ \d{4} 92\s%\./);
    const two = say({ ...PLAIN, markedBreaks: [...markedBreaks, { month: first + 20, chance: 0.03 }] });
    expect(two).toContain('even odds for one of them before the counts');
  });

  it('names the firm and month of a count that was nearly ignored', () => {
    const text = say({ ...PLAIN, flaggedCounts: [{ firm: 2, month: first }] });
    expect(text).toContain(
      `One count stands far out of line and was nearly ignored: ${facts.market.rivalName} in `,
    );
  });
});
