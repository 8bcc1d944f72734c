import { describe, expect, it } from 'vitest';
import { createMonthFormat } from '@/lib/brief/month-words';

const months = createMonthFormat('en');
const LAST = 2025 * 12 + 11;

describe('createMonthFormat', () => {
  it('spells months whatever the time zone', () => {
    expect(months.short(2026 * 12)).toBe('Jan 2026');
    expect(months.long(2025 * 12 + 11)).toBe('December 2025');
  });

  it('names a month, a year or a span of years as the interval allows', () => {
    expect(months.when({ q05: 12, q50: 15, q95: 24 }, LAST)).toBe('around March 2027');
    expect(months.when({ q05: 10, q50: 20, q95: 50 }, LAST)).toBe('around 2027');
    expect(months.when({ q05: 10, q50: 30, q95: 100 }, LAST)).toBe('some time between 2026 and 2034');
  });

  it('spells the interval by its ends and starts in the first forecast month', () => {
    expect(months.interval({ q05: 8, q50: 15, q95: 42 }, LAST)).toBe('Aug 2026 to Jun 2029');
    expect(months.interval({ q05: 0.1, q50: 0.3, q95: 1.2 }, LAST)).toBe('Jan 2026');
  });
});
