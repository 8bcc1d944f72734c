import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { axisAroundZero, axisFromZero, logTicks, monthTicks, ticksUpTo } from '@/lib/brief/axis-ticks';
import { createMonthFormat } from '@/lib/brief/month-words';

const spell = (value: number) => String(value);

describe('axisFromZero', () => {
  it('rounds the upper end to 1, 2 or 5 times a power of ten a tick', () => {
    expect(axisFromZero(372_000, spell)).toMatchObject({ domain: [0, 400_000] });
    expect(axisFromZero(1, spell).ticks.map((tick) => tick.label)).toEqual(['0', '0.5', '1']);
    expect(axisFromZero(0.3, spell, 3).ticks.map((tick) => tick.label)).toEqual(['0', '0.1', '0.2', '0.3']);
  });

  it('holds any maximum with at most a handful of ticks', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-6, max: 1e12, noNaN: true }), (max) => {
        const { domain, ticks } = axisFromZero(max, spell);
        expect(domain[1]).toBeGreaterThanOrEqual(max * (1 - 1e-9));
        expect(ticks.length).toBeGreaterThanOrEqual(2);
        expect(ticks.length).toBeLessThanOrEqual(6);
      }),
    );
  });

  it('gives an axis even where nothing is', () => {
    expect(axisFromZero(0, spell).domain[1]).toBeGreaterThan(0);
  });
});

describe('ticksUpTo', () => {
  it('never passes the end of the axis', () => {
    expect(ticksUpTo(450_000, spell).map((tick) => tick.value)).toEqual([0, 200_000, 400_000]);
  });
});

describe('axisAroundZero', () => {
  it('holds both ends and zero', () => {
    expect(axisAroundZero(-0.07, 0.01, spell).domain).toEqual([-0.08, 0.02]);
    expect(axisAroundZero(0, 0, spell).domain[1]).toBeGreaterThan(0);
    expect(axisAroundZero(2, 9, spell).domain[0]).toBe(0);
  });
});

describe('logTicks', () => {
  it('counts decades when there are three, finer steps when there are fewer', () => {
    expect(logTicks(0.001, 10, spell).map((tick) => tick.value)).toEqual([0.001, 0.01, 0.1, 1, 10]);
    expect(logTicks(0.2, 5, spell).map((tick) => tick.value)).toEqual([0.2, 0.5, 1, 2, 5]);
  });

  it('keeps 1 when decades are thinned', () => {
    const values = logTicks(1e-6, 1e6, spell).map((tick) => tick.value);
    expect(values).toContain(1);
    expect(values.length).toBeLessThanOrEqual(7);
  });
});

describe('monthTicks', () => {
  const months = createMonthFormat('en');
  const january = (year: number) => year * 12;

  it('stands on Januaries for long spans and on months for short ones', () => {
    expect(monthTicks(january(2022) + 6, january(2028) + 11, months).map((tick) => tick.label)).toEqual([
      '2023',
      '2024',
      '2025',
      '2026',
      '2027',
      '2028',
    ]);
    expect(monthTicks(january(2025) + 4, january(2026) + 4, months).map((tick) => tick.label)).toEqual([
      'Jul 2025',
      'Oct 2025',
      'Jan 2026',
      'Apr 2026',
    ]);
  });

  it('keeps to the number of labels that fits', () => {
    for (let span = 1; span < 1200; span += 7) {
      const ticks = monthTicks(january(1990) + 3, january(1990) + 3 + span, months, 5);
      expect(ticks.length).toBeLessThanOrEqual(6);
      for (const { value } of ticks) expect(value).toBeLessThanOrEqual(january(1990) + 3 + span);
    }
  });
});
