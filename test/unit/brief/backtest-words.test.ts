/** What the backtest says, over who was better, by how much it may be chance, and what the combination did. */
import { describe, expect, it } from 'vitest';
import { describeBacktest } from '@/lib/brief/backtest-words';
import { buildBrief } from '@/lib/brief/build-brief';
import { plainText } from '@/lib/brief/text';
import { createWords } from '@/lib/brief/words';
import type { BacktestReport } from '@/lib/forecast/backtest/report';
import { sampleBacktest as report, scoreRow as row } from './sample-backtest';
import { makeSample } from './sample-report';

const { facts } = makeSample('coexistence');
const words = createWords(facts);
const plain = (text: string) => text.replaceAll('\u00a0', ' ');

const ownBetter = report({
  scores: [row('competition', 0.021, 0.02), row('random-walk-drift', 0.05, 0.04)],
  comparisons: [
    {
      horizonMonths: 12,
      bestSimple: 'random-walk-drift',
      meanDifference: -0.02,
      statistic: -1,
      pValue: 0.34,
    },
  ],
});

const read = (backtest: BacktestReport) => {
  const part = describeBacktest(words, backtest);
  return {
    ...part,
    verdict: plain(plainText(part.verdict)),
    details: part.details.map((d) => plain(plainText(d))),
  };
};

describe('the words of a backtest', () => {
  it('say that a simple method was better, with both errors, beside the verdict too', () => {
    const { verdict, details } = read(report());
    expect(verdict).toBe(
      'On this market a straight trend forecast 12 months ahead better than this model: typical error 3.1 % against 5.8 %.',
    );
    expect(details[0]).toBe('The difference is more than chance easily gives (p = 0.012).');
    const support = buildBrief({ ...facts, backtest: report() })
      .where.verdict.support.map(plainText)
      .map(plain);
    expect(support.at(-1)).toContain('a straight trend forecast this market better than this model');
  });

  it('say that this model was better, that it may be chance, and nothing beside the verdict', () => {
    const { verdict, details } = read(ownBetter);
    expect(verdict).toContain('this model forecast 12 months ahead better than the simple methods');
    expect(verdict).toContain('typical error 2.1 % against 5 % for the best of them, a straight trend.');
    expect(details[0]).toBe('Chance alone could give such a difference (p = 0.34).');
    const [without, withIt] = [facts, { ...facts, backtest: ownBetter }].map((f) => buildBrief(f));
    expect(withIt.where.verdict.support).toEqual(without.where.verdict.support);
    expect(without.trust.backtest).toBeNull();
  });

  it('do not let the errors contradict the verdict: bands are named where they make the difference', () => {
    const closer = report({ scores: [row('competition', 0.03, 0.05), row('random-walk-drift', 0.04, 0.03)] });
    expect(read(closer).verdict).toContain('Its bands make the difference, not its middle.');
  });

  it('say that chance cannot be judged where the forecasts overlap too much', () => {
    const [comparison] = report().comparisons;
    const overlapping = report({ comparisons: [{ ...comparison, statistic: null, pValue: null }] });
    expect(read(overlapping).details[0]).toContain('overlap too much in time');
  });

  it('warn of bands that held too few outcomes', () => {
    const narrow = report({
      scores: [row('competition', 0.1, 0.1, { coverage90: 0.6 }), row('random-walk-drift', 0.1, 0.09)],
    });
    expect(read(narrow).details.join(' ')).toContain(
      'in 12 of 20 cases. Take the bands of this market as too narrow.',
    );
    expect(read(report()).details.join(' ')).not.toContain('too narrow');
  });

  it('name the weights of a combination only where it was better', () => {
    const weights = [
      { method: 'competition' as const, weight: 0.337 },
      { method: 'random-walk-drift' as const, weight: 0.662 },
      { method: 'damped-trend' as const, weight: 0.001 },
    ];
    const row12 = (value: number) => Array.from({ length: 12 }, () => value);
    const bands = {
      q05: row12(9000),
      q25: row12(9500),
      q50: row12(10_000),
      q75: row12(10_500),
      q95: row12(11_000),
    };
    const combination = {
      weights,
      crps: 0.02,
      bestSingle: 'random-walk-drift' as const,
      bestSingleCrps: 0.03,
      isBetter: true,
      forecast: { focal: bands, rival: bands },
    };
    const text = read(report({ combination })).details.join(' ');
    expect(text).toContain(
      'A combination did better than each alone: 66 % a straight trend and 34 % this model.',
    );
    expect(text).toContain('it puts');
    const worse = read(
      report({ combination: { ...combination, isBetter: false, forecast: null } }),
    ).details.join(' ');
    expect(worse).toContain('did not beat the best of them alone');
    expect(worse).not.toContain('66 %');
  });

  it('mark the best complete method and say why one is not ranked', () => {
    const partial = row('seasonal-naive', 0.001, 0.001, { isComplete: false, cases: 3 });
    const { rows, table } = read(report({ scores: [...report().scores, partial] }));
    expect(rows.map(({ method, note }) => [method, note])).toEqual([
      ['competition', ''],
      ['random-walk-drift', 'best here'],
      ['seasonal-naive', 'only 3 forecasts: its history was too short for the others'],
    ]);
    expect(table.rows.every((cells) => cells.length === table.columns.length)).toBe(true);
  });
});
