/** Files to start from: a template with its months written in, and a sample of invented counts. */

import { MONTH_HEADER, toCsv, writeCsv } from './export-series';
import { formatMonth, makeMonth } from './month';
import type { Month } from './types';

/** Months written into a template: two years, twice what a fit needs. */
const TEMPLATE_MONTHS = 24;
const SAMPLE_MONTHS = 36;
const SAMPLE_START = makeMonth(2022, 1);

/** A table of the months up to `lastMonth`, its counts empty. */
export function writeTemplate(lastMonth: Month): string {
  const rows = Array.from({ length: TEMPLATE_MONTHS }, (_, index) => [
    formatMonth(lastMonth - TEMPLATE_MONTHS + 1 + index),
    '',
    '',
  ]);
  return `${writeCsv([[MONTH_HEADER, 'Our firm', 'The rival'], ...rows])}\r\n`;
}

/** Invented counts of two invented firms: logistic growth with a ripple, one unknown month. */
export function writeSample(): string {
  const grow = (saturation: number, middle: number, rate: number) =>
    Array.from({ length: SAMPLE_MONTHS }, (_, month) => {
      const smooth = saturation / (1 + Math.exp(-rate * (month - middle)));
      return Math.round(smooth * (1 + 0.02 * Math.sin(2.4 * month)));
    });
  const focal: (number | null)[] = grow(52_000, 11, 0.22);
  const rival: (number | null)[] = grow(31_000, 19, 0.17);
  rival[7] = null;
  return toCsv({
    series: { firstMonth: SAMPLE_START, focal, rival },
    focalName: 'Quillfern',
    rivalName: 'Marrowby',
  });
}
