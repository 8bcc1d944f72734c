/** A series as one row for each month. */
import type { Month, MonthlySeries } from '@/lib/series/types';

export interface MonthRow {
  month: Month;
  focal: number | null;
  rival: number | null;
}

export function listMonths({ firstMonth, focal, rival }: MonthlySeries): MonthRow[] {
  return focal.map((count, index) => ({
    month: firstMonth + index,
    focal: count,
    rival: rival[index] ?? null,
  }));
}
