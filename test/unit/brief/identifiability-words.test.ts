/** What the analysis of identifiability says: months to wait, open ends, signs and error scales, never more than the numbers hold. */
import { describe, expect, it } from 'vitest';
import { buildBrief } from '@/lib/brief/build-brief';
import { describeIdentifiability } from '@/lib/brief/identifiability-words';
import { plainText } from '@/lib/brief/text';
import { createWords } from '@/lib/brief/words';
import { EFFECTS, type IdentifiabilityReport } from '@/lib/forecast/identifiability/report';
import { OUTCOMES } from '@/lib/forecast/outcomes';
import { factsOf, factsWith, oddsOf } from './brief-cases';
import { sampleIdentifiability as report, signPattern } from './sample-identifiability';

const facts = factsWith('coexistence', { odds: oddsOf(0.4, 0.3, 0.2, 0.1), decided: null });
const { focalName, rivalName } = facts.market;
const plain = (text: string) => text.replaceAll('\u00a0', ' ');
const describeFor = (of: typeof facts, changes: Partial<IdentifiabilityReport> = {}) =>
  describeIdentifiability(createWords(of), report(changes));
const finding = (code: string, changes: Partial<IdentifiabilityReport> = {}) =>
  plain(plainText(describeFor(facts, changes).findings.find((one) => one.code === code)!.sentence));

describe('months until the data decide', () => {
  it('names the first horizon with an even chance, and its chance', () => {
    const { headline, rows, caption } = describeFor(facts).decision!;
    expect(plain(plainText(headline))).toBe(
      'More likely than not 12 more months are enough for the data to decide: the chance is 72 % that one outcome is likely by then.',
    );
    expect(rows.map((row) => [row.months, plain(row.decidedText), plain(row.sureText)])).toEqual([
      [3, '30 %', '2 %'],
      [6, '45 %', '10 %'],
      [12, '72 %', '30 %'],
      [24, '90 %', '60 %'],
    ]);
    expect(plainText(caption)).toContain('For 24 months too few draws');
  });

  it('promises nothing where even the longest wait may not do', () => {
    const rows = report().decision!.rows.map((row) => ({ ...row, decided: 0.4 }));
    const { headline } = describeFor(facts, { decision: { futures: 300, rows } }).decision!;
    expect(plain(plainText(headline))).toMatch(/^Even 24 more months may well not be enough .* 40 %/);
  });

  it('tells of a decided market how it may firm up or come undone', () => {
    const decided = factsWith('coexistence', { odds: oddsOf(0.8, 0.1, 0.05, 0.05), decided: 'coexistence' });
    const text = plain(plainText(describeFor(decided).decision!.headline));
    expect(text).toBe(
      'One outcome is likely already. After 24 more months the chance is 60 % that one is very likely, and 10 % that none is likely any more.',
    );
  });

  it('is left out where no future could be followed', () => {
    expect(describeFor(facts, { decision: { futures: 0, rows: [] } }).decision).toBeNull();
  });
});

describe('values that fit as well', () => {
  it('are spelt with open ends in words', () => {
    const rows = describeFor(facts).profiles!.rows.map(({ id, interval }) => [id, plain(interval)]);
    expect(rows).toEqual([
      ['alpha', '42 to 71 %'],
      ['beta', 'up to 90 %, or none at all'],
      ['k1', '390,000 to 470,000'],
      ['k2', 'above 300,000, with no upper limit'],
    ]);
  });

  it('say that the counts do not tell when both ends are open', () => {
    const profiles = [{ quantity: 'alpha' as const, estimate: null, low: null, high: null }];
    const [row] = describeFor(facts, { profiles }).profiles!.rows;
    expect([row.best, row.interval]).toEqual(['none', 'anything: the counts do not tell']);
  });
});

describe('trade-offs', () => {
  it('name the parameters that the history does not tell apart, and how they move', () => {
    expect(finding('trade-off')).toContain(
      `${rivalName}’s saturation level and the room that ${rivalName} takes`,
    );
    expect(finding('trade-off')).toContain('Both raised together, they leave the past nearly as it was');
    const weakest = [
      { id: 'k2' as const, weight: 1 },
      { id: 'r2' as const, weight: -0.8 },
    ];
    const against = finding('trade-off', { collinearity: { index: null, isPoorlyTold: true, weakest } });
    expect(against).toMatch(/saturation level up, .*growth when small down/);
  });

  it('say nothing where all can be told apart', () => {
    const collinearity = { ...report().collinearity!, isPoorlyTold: false };
    expect(describeFor(facts, { collinearity }).findings.map(({ code }) => code)).not.toContain('trade-off');
  });
});

describe('is it competition at all', () => {
  it.each(EFFECTS.flatMap((a) => EFFECTS.map((b) => [a, b] as const)))(
    'tells who does what when the rival %s and the focal firm %s',
    (onFocal, onRival) => {
      const text = finding('sign-pattern', { signPattern: signPattern(onFocal, onRival) });
      expect(text).toContain('(odds 90 %)');
      if (onFocal !== onRival) {
        const verb = { takes: 'takes room from', gives: 'makes room for', none: 'leaves' };
        expect(text).toContain(`${rivalName} ${verb[onFocal]} ${focalName}`);
        expect(text).toContain(`${focalName} ${verb[onRival]} ${rivalName}`);
      }
      const hasHelp = onFocal === 'gives' || onRival === 'gives';
      expect(text.includes('assumes that no firm helps the other')).toBe(hasHelp);
    },
  );

  it('is not settled when no pattern is likely', () => {
    const text = finding('sign-pattern', { signPattern: signPattern('takes', 'none', 0.5) });
    expect(text).toMatch(/^Whether it is competition at all is not settled\./);
    expect(text).toContain('(odds 50 %)');
  });
});

describe('error scales', () => {
  const verdict = (outcome: NonNullable<IdentifiabilityReport['errorScales']>['log']['outcome']) => ({
    outcome,
    alpha: 1,
    beta: 1,
    k1: outcome === 'notIdentified' ? null : 1000,
    k2: 1000,
  });

  it('that disagree are the first thing said', () => {
    const errorScales = { log: verdict('coexistence'), raw: verdict('exclusionByRival'), disagree: true };
    const text = finding('error-scales', { errorScales });
    expect(text).toMatch(/^The kind of counting error turns the answer/);
    expect(describeFor(facts, { errorScales }).findings[0].code).toBe('error-scales');
    expect(text).toContain('both firms staying');
    expect(text).toContain(`${rivalName} alone staying`);
  });

  it('that identify nothing name no outcome', () => {
    const errorScales = { log: verdict('notIdentified'), raw: verdict('notIdentified'), disagree: false };
    const text = finding('error-scales', { errorScales });
    expect(text).toContain('do not settle any outcome');
    expect(text).toContain(`how far ${focalName} would get alone`);
    expect(text).not.toMatch(/staying|head start/);
  });

  it('of which one identifies nothing say just that', () => {
    const errorScales = { log: verdict('coexistence'), raw: verdict('notIdentified'), disagree: false };
    const text = finding('error-scales', { errorScales });
    expect(text).toContain('not identified');
    expect(text).not.toContain('turns the answer');
  });

  it.each(OUTCOMES)('that agree on %s say so once', (outcome) => {
    const text = finding('error-scales', {
      errorScales: { log: verdict(outcome), raw: verdict(outcome), disagree: false },
    });
    expect(text).toMatch(/^Whether the counts err in percent or by a fixed number/);
  });
});

describe('the second opinion', () => {
  it('has a row for either kind of error, with what it does not tell said so', () => {
    const log = { outcome: 'coexistence' as const, alpha: 0.5, beta: 0.4, k1: 420_000, k2: 380_000 };
    const raw = { outcome: 'notIdentified' as const, alpha: null, beta: 1.2, k1: 500_000, k2: null };
    const table = describeFor(facts, { errorScales: { log, raw, disagree: false } }).errorScales!;
    expect(table.rows.map(({ kind, verdict }) => [kind, verdict])).toEqual([
      ['in percent', 'Both firms staying'],
      ['by a fixed number', 'No outcome at all (not identified)'],
    ]);
    expect(table.rows[0].values.map(plain)).toEqual(['50 %', '40 %', '420,000', '380,000']);
    expect(table.rows[1].values.map(plain)).toEqual(['not told', '120 %', '500,000', 'not told']);
    expect(table.columns.length).toBe(2 + table.rows[0].values.length);
  });

  it('is left out where too few months have both firms', () => {
    expect(describeFor(facts, { errorScales: null }).errorScales).toBeNull();
  });
});

describe('what the share hangs on', () => {
  const figure = buildBrief({ ...facts, identifiability: report() }).change.sensitivity!;

  it('leads with the parameter to learn about first', () => {
    const text = plain(plainText(figure.headline));
    expect(text).toContain(`hangs most on the room that ${rivalName} takes from ${focalName}`);
    expect(text).toContain('80 % of the spread');
    expect(text).toContain('95 % where it is lowest and 20 % where it is highest');
    expect(figure.rows[0].id).toBe('alpha');
  });

  it('has an axis of shares that holds all bars', () => {
    const [low, high] = figure.domain;
    for (const { bar } of figure.rows) {
      expect(bar!.low).toBeGreaterThanOrEqual(low);
      expect(bar!.high).toBeLessThanOrEqual(high);
    }
    expect([low, high]).toEqual([0.3, 0.7]);
  });

  it('says when the odds are settled and when nothing stands out', () => {
    const sensitivity = report().sensitivity!;
    const settled = { ...sensitivity, learnFirst: { share: 'alpha' as const, odds: null } };
    const read = (of: typeof sensitivity) =>
      plainText(
        buildBrief({ ...facts, identifiability: report({ sensitivity: of }) }).change.sensitivity!.headline,
      );
    expect(read(settled)).toContain('The odds hang on nothing that is still open.');
    const flat = { ...sensitivity, rows: sensitivity.rows.map((row) => ({ ...row, shareExplained: 0.01 })) };
    expect(read(flat)).toMatch(/^No single strength stands out/);
  });
});

it('a brief without the analysis has none of it', () => {
  const brief = buildBrief(factsOf('coexistence'));
  expect([brief.change.sensitivity, brief.trust.identifiability]).toEqual([null, null]);
});
