/** What every writer of the brief needs: the facts, the firms by name, numbers and months in one locale. */
import type { Interval } from '../forecast/report';
import type { Month } from '../series/types';
import type { BriefFacts } from './facts';
import { createMonthFormat, type MonthFormat } from './month-words';
import { createNumberFormat, type NumberFormat } from './number-format';

export const DEFAULT_LOCALE = 'en';

export type FirmRole = 'focal' | 'rival';

export interface Words {
  facts: BriefFacts;
  locale: string;
  numbers: NumberFormat;
  months: MonthFormat;
  focal: string;
  rival: string;
  /** Last observed month. */
  lastMonth: Month;
  name(firm: FirmRole): string;
}

export function createWords(facts: BriefFacts, locale: string = DEFAULT_LOCALE): Words {
  const { focalName, rivalName } = facts.market;
  return {
    facts,
    locale,
    numbers: createNumberFormat(locale),
    months: createMonthFormat(locale),
    focal: focalName,
    rival: rivalName,
    lastMonth: facts.series.firstMonth + facts.series.focal.length - 1,
    name: (firm) => (firm === 'focal' ? focalName : rivalName),
  };
}

export function otherFirm(firm: FirmRole): FirmRole {
  return firm === 'focal' ? 'rival' : 'focal';
}

/** Last month of the forecast. */
export function horizonMonthOf(words: Words): Month {
  const { firstMonth, horizonMonths } = words.facts.report.outlook;
  return firstMonth + horizonMonths - 1;
}

/** Median and 90 % interval of one month of a band, counted from 0. */
export function intervalAt(bands: { q05: number[]; q50: number[]; q95: number[] }, at: number): Interval {
  const [q05, q50, q95] = [bands.q05[at], bands.q50[at], bands.q95[at]];
  if (q05 === undefined || q50 === undefined || q95 === undefined) {
    throw new RangeError(`at must be a month of the bands, got ${at}`);
  }
  return { q05, q50, q95 };
}
