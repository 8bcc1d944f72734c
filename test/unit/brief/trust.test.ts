import { describe, expect, it } from 'vitest';
import { writeCautions } from '@/lib/brief/cautions';
import { describeSampler } from '@/lib/brief/sampler-health';
import { plainText } from '@/lib/brief/text';
import { writeUnknowns } from '@/lib/brief/unknowns';
import { createWords } from '@/lib/brief/words';
import { USUAL_PRIORS } from '@/lib/estimate/priors';
import { type Unknown, unknownSchema } from '@/lib/forecast/report';
import { factsOf, factsWith, oddsOf, spaced } from './brief-cases';

const say = (unknown: Unknown) => {
  const facts = factsWith('coexistence', {}, { unknowns: [unknown] });
  return spaced(plainText(writeUnknowns(createWords(facts))[0]!.sentence));
};

describe('writeUnknowns', () => {
  it('has a sentence for every code, with and without a firm', () => {
    const codes = unknownSchema.shape.code.options;
    const firms = [1, 2, null] as const;
    const said = codes.flatMap((code) => firms.map((firm) => say({ code, firm, parameter: null })));
    for (const text of said) expect(text).toMatch(/^[A-Z0-9].{20,}\.$/);
    expect(new Set(codes.map((code) => say({ code, firm: 1, parameter: null }))).size).toBe(codes.length);
  });

  it('names the firm that it is about', () => {
    expect(say({ code: 'saturation-unseen', firm: 2, parameter: 'k2' })).toBe(
      'Marrowby’s growth has not bent yet, so its saturation level is a guess. It shows once growth slows.',
    );
    expect(say({ code: 'competition-unidentified', firm: 1, parameter: 'alpha' })).toContain(
      'The room that Marrowby takes from Quillfern is hardly told',
    );
    expect(say({ code: 'competition-unidentified', firm: 2, parameter: null })).toContain(
      'The room that Quillfern takes from Marrowby is hardly told',
    );
    expect(say({ code: 'prior-conflict', firm: 1, parameter: 'k1' })).toContain(
      'The data pull Quillfern’s saturation level far',
    );
  });

  it('does not call a saturation level a guess that somebody stated', () => {
    const unknowns: Unknown[] = [{ code: 'saturation-unseen', firm: 2, parameter: 'k2' }];
    const addressable = { focal: null, rival: 4e5, relativeError: 0.3 };
    const facts = factsWith('coexistence', {}, { unknowns, beliefs: { priors: USUAL_PRIORS, addressable } });
    expect(plainText(writeUnknowns(createWords(facts))[0]!.sentence)).toMatch(
      /^The counts add little to what was stated of Marrowby’s addressable market/,
    );
  });

  it('dates a late launch and counts the months with both', () => {
    const facts = factsWith(
      'coexistence',
      {},
      { unknowns: [{ code: 'late-launch', firm: 2, parameter: null }] },
    );
    facts.series.rival.fill(0, 0, 30);
    expect(plainText(writeUnknowns(createWords(facts))[0]!.sentence)).toBe(
      'Marrowby came in January 2025, so only 12 of 42 months show both firms.',
    );
  });

  it('says so when nothing stands out', () => {
    expect(writeUnknowns(createWords(factsOf('coexistence')))).toMatchObject([{ code: 'none' }]);
  });
});

describe('describeSampler', () => {
  it('says in one line that the chains agree', () => {
    const health = describeSampler(createWords(factsOf('coexistence')));
    expect(health.isSound).toBe(true);
    expect(plainText(health.line)).toBe(
      '4 chains agree (R-hat 1.004), and every number rests on draws worth at least 812 independent ones.',
    );
  });

  it('says in one line that they do not, even where nothing was measured', () => {
    const facts = factsOf('coexistence');
    Object.assign(facts.report.diagnostics, {
      status: 'not-converged',
      rHat: null,
      ess: null,
      conditionNumber: null,
    });
    const health = describeSampler(createWords(facts));
    expect(health.isSound).toBe(false);
    expect(plainText(health.line)).toContain('had not settled');
    expect(plainText(health.line)).not.toContain('agree');
    for (const { value } of health.details) expect(value).not.toMatch(/null|NaN/);
  });
});

describe('writeCautions', () => {
  const idsOf = (odds: ReturnType<typeof oddsOf>, hasScenario: boolean) =>
    writeCautions(createWords(factsWith('coexistence', { odds })), hasScenario).map((one) => one.id);

  it('always says what a forecast is, what data may be used and where the rival’s figures may come from', () => {
    expect(idsOf(oddsOf(1, 0, 0, 0), false)).toEqual([
      'estimate',
      'aggregate',
      'rival-figures',
      'inside-information',
    ]);
  });

  it('speaks of competition law where somebody may be driven out or a push is tried', () => {
    expect(idsOf(oddsOf(0.2, 0.8, 0, 0), false)).toContain('competition-law');
    expect(idsOf(oddsOf(1, 0, 0, 0), true)).toContain('competition-law');
  });
});
