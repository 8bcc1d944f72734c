/** How every chart sets its tick labels. */
import type { Tick } from '@/lib/brief/types';

export const TICK_STYLE = { fontSize: 13, fill: 'var(--ink-2)' };

/** The label that was written for a tick's value. */
export function labelOf(ticks: Tick[]): (value: number) => string {
  return (value) => ticks.find((tick) => tick.value === value)?.label ?? '';
}
