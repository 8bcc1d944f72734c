import { describe, expect, it } from 'vitest';
import { buildParameterTable } from '@/lib/brief/parameters';
import { plainText } from '@/lib/brief/text';
import { createWords } from '@/lib/brief/words';
import type { Interval, ParameterRow } from '@/lib/forecast/report';
import { factsOf, spaced } from './brief-cases';

function lineOf(id: ParameterRow['id'], posterior: Interval, contraction = 0.9) {
  const facts = factsOf('coexistence');
  const row = facts.report.parameters.find((one) => one.id === id)!;
  Object.assign(row, { posterior, contraction });
  const line = buildParameterTable(createWords(facts)).rows.find((one) => one.id === id)!;
  return {
    ...line,
    value: spaced(line.value),
    interval: spaced(line.interval),
    meaning: spaced(line.meaning),
  };
}

describe('buildParameterTable', () => {
  it('tells growth as percent a month and doubling time', () => {
    // e^0.15 - 1 = 16.2 %, ln 2 / 0.15 = 4.62
    expect(lineOf('r1', { q05: 0.12, q50: 0.15, q95: 0.19 })).toMatchObject({
      label: 'Quillfern’s growth when small',
      firm: 'focal',
      value: '16 % a month',
      interval: '13 to 21 %',
      meaning: 'small and alone it doubles in 4.6 months',
    });
  });

  it('tells saturation levels in users, as far as the interval supports', () => {
    expect(lineOf('k2', { q05: 340_000, q50: 383_210, q95: 441_000 })).toMatchObject({
      label: 'Marrowby’s saturation level',
      firm: 'rival',
      value: '380,000',
      interval: '340,000 to 440,000',
    });
  });

  it.each([
    [
      { q05: 0.001, q50: 0.01, q95: 0.1 },
      'up to 10 %',
      'a full Marrowby takes hardly any of Quillfern’s room',
    ],
    [{ q05: 0.4, q50: 0.62, q95: 0.9 }, '40 to 90 %', 'a full Marrowby takes about 60 % of Quillfern’s room'],
    [{ q05: 0.6, q50: 1.02, q95: 1.7 }, '60 to 170 %', 'a full Marrowby takes about all of Quillfern’s room'],
    [
      { q05: 1.1, q50: 1.6, q95: 2.4 },
      '110 to 240 %',
      'a full Marrowby takes all of Quillfern’s room, 1.6 times over',
    ],
    [
      { q05: 0.2, q50: 3, q95: 50 },
      'above 20 %',
      'a full Marrowby takes all of Quillfern’s room, 3 times over',
    ],
    [
      { q05: 0.001, q50: 20, q95: 50 },
      'nothing to everything',
      'a full Marrowby takes all of Quillfern’s room, many times over',
    ],
  ])('tells alpha %j in words', (posterior, interval, meaning) => {
    expect(lineOf('alpha', posterior)).toMatchObject({
      label: 'Room that Marrowby takes from Quillfern',
      interval,
      meaning,
    });
  });

  it('gives beta and the per-user effects to the right firms', () => {
    expect(lineOf('beta', { q05: 0.4, q50: 0.5, q95: 0.6 }).meaning).toBe(
      'a full Quillfern takes about 50 % of Marrowby’s room',
    );
    expect(lineOf('a12', { q05: 0.35, q50: 0.62, q95: 0.92 })).toMatchObject({
      label: 'Quillfern places per Marrowby user',
      value: '0.6',
      interval: '0.4 to 0.9',
      meaning: 'one Marrowby user takes the room of 0.6 Quillfern users',
    });
    expect(lineOf('a21', { q05: 0.35, q50: 0.62, q95: 0.92 }).label).toBe(
      'Marrowby places per Quillfern user',
    );
  });

  it('says how much was learnt, and counts what rests on belief', () => {
    expect(
      [0.9, 0.5, 0.1].map(
        (contraction) => lineOf('r1', { q05: 0.1, q50: 0.2, q95: 0.3 }, contraction).learnt,
      ),
    ).toEqual(['mostly from the data', 'partly from the data', 'little from the data']);
    const facts = factsOf('coexistence');
    for (const row of facts.report.parameters)
      row.contraction = row.id === 'k1' || row.id === 'a12' ? 0.1 : 0.9;
    expect(plainText(buildParameterTable(createWords(facts)).caption)).toContain(
      'One row rests more on what was assumed',
    );
  });

  it('keeps the unrounded numbers for a file', () => {
    const { table } = buildParameterTable(createWords(factsOf('coexistence')));
    const row = factsOf('coexistence').report.parameters[0]!;
    expect(table.raw[0]).toEqual([
      'r1',
      row.posterior.q50,
      row.posterior.q05,
      row.posterior.q95,
      row.contraction,
    ]);
  });
});
