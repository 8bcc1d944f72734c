import { describe, expect, it } from 'vitest';
import { buildPriorTable } from '@/lib/brief/prior-words';
import { plainText } from '@/lib/brief/text';
import { createWords } from '@/lib/brief/words';
import { USUAL_PRIORS } from '@/lib/estimate/priors';
import type { FitReport } from '@/lib/forecast/report';
import { makeSample } from './sample-report';

const { facts } = makeSample('coexistence');
const USUAL: FitReport['beliefs'] = { priors: USUAL_PRIORS, addressable: null };
const tableFor = (beliefs: FitReport['beliefs']) =>
  buildPriorTable(createWords({ ...facts, report: { ...facts.report, beliefs } }));
const marksOf = (beliefs: FitReport['beliefs']) =>
  Object.fromEntries(tableFor(beliefs)!.rows.map(({ id, mark }) => [id, mark]));
const plain = (text: string) => text.replaceAll('\u00a0', ' ');

describe('what was assumed before the counts', () => {
  it('is told in plain units, all of it usual where nobody changed it', () => {
    const { rows, caption } = tableFor(USUAL)!;
    expect(new Set(rows.map(({ mark }) => mark))).toEqual(new Set(['usual']));
    expect(plain(plainText(caption))).toContain('All are the usual ones (common practice).');
    const growth = rows.find(({ id }) => id === 'growth')!;
    expect(plain(growth.middle)).toMatch(/^16\.2 % a month$/);
    const alpha = rows.find(({ id }) => id === 'alpha')!;
    expect(alpha.label).toContain(`${facts.market.rivalName} takes from ${facts.market.focalName}`);
    expect(plain(alpha.interval)).toMatch(/^30 to 370 %$/);
    expect(plain(rows.find(({ id }) => id === 'noCompetition')!.middle)).toBe('20 %');
  });

  it('marks each assumption that was changed, and no other', () => {
    const growth = { meanLog: Math.log(0.05), sdLog: 0.5 };
    const changed = { priors: { ...USUAL_PRIORS, growth, noCompetition: 0.6 }, addressable: null };
    expect(marksOf(changed)).toEqual({
      growth: 'changed',
      k1: 'usual',
      k2: 'usual',
      alpha: 'usual',
      beta: 'usual',
      noCompetition: 'changed',
    });
    expect(plain(plainText(tableFor(changed)!.caption))).toContain('2 are not the usual assumption.');
  });

  it('says which saturation level comes from a stated addressable market', () => {
    const addressable = { focal: null, rival: 5e5, relativeError: 0.3 };
    const marks = marksOf({ priors: USUAL_PRIORS, addressable });
    expect([marks.k1, marks.k2]).toEqual(['usual', 'addressable']);
  });

  it('is left out of an outlook that was made before it was kept', () => {
    expect(tableFor(undefined)).toBeNull();
  });
});
