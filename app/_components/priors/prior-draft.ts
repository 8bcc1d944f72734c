/**
 * Priors as a form holds them: the middle in plain units, and the factor within which nine in ten of it lie, F = exp(1.645 sd). What was not
 * touched keeps its exact value.
 */
import { MIDDLE_RANGES, SD_RANGE } from '@/lib/estimate/prior-schema';
import { USUAL_PRIORS } from '@/lib/estimate/priors';
import type { LogNormalPrior, PriorSettings } from '@/lib/estimate/types';

export type PriorId = keyof Omit<PriorSettings, 'noCompetition'>;
export const PRIOR_IDS: readonly PriorId[] = ['growth', 'saturation', 'alpha', 'beta'];

export interface PriorDraft {
  middles: Record<PriorId, number>;
  factors: Record<PriorId, number>;
  noCompetition: number;
}

interface Range {
  min: number;
  max: number;
}

const NINE_IN_TEN = 1.6448536;
/** Digits that a field shows. */
const DIGITS = 3;

/** Growth is read as growth within a month, e^r - 1; the rest as it is. */
const toPlain = (id: PriorId, value: number) => (id === 'growth' ? Math.expm1(value) : value);
const fromPlain = (id: PriorId, value: number) => (id === 'growth' ? Math.log1p(value) : value);
const round = (value: number) => Number(value.toPrecision(DIGITS));

export function toDraft(settings: PriorSettings): PriorDraft {
  const each = (read: (id: PriorId) => number) =>
    Object.fromEntries(PRIOR_IDS.map((id) => [id, round(read(id))])) as Record<PriorId, number>;
  return {
    middles: each((id) => toPlain(id, Math.exp(settings[id].meanLog))),
    factors: each((id) => Math.exp(NINE_IN_TEN * settings[id].sdLog)),
    noCompetition: settings.noCompetition,
  };
}

/** @returns null when the draft stands for the usual priors */
export function toSettings(draft: PriorDraft, before: PriorSettings): PriorSettings | null {
  const shown = toDraft(before);
  const read = (id: PriorId): LogNormalPrior => ({
    meanLog:
      draft.middles[id] === shown.middles[id]
        ? before[id].meanLog
        : Math.log(fromPlain(id, draft.middles[id])),
    sdLog:
      draft.factors[id] === shown.factors[id] ? before[id].sdLog : Math.log(draft.factors[id]) / NINE_IN_TEN,
  });
  const settings = {
    growth: read('growth'),
    saturation: read('saturation'),
    alpha: read('alpha'),
    beta: read('beta'),
    noCompetition: draft.noCompetition,
  };
  return JSON.stringify(settings) === JSON.stringify(inOrder(USUAL_PRIORS)) ? null : settings;
}

/** The same fields in the order in which `toSettings` writes them. */
function inOrder({ growth, saturation, alpha, beta, noCompetition }: PriorSettings): PriorSettings {
  const plain = ({ meanLog, sdLog }: LogNormalPrior) => ({ meanLog, sdLog });
  return {
    growth: plain(growth),
    saturation: plain(saturation),
    alpha: plain(alpha),
    beta: plain(beta),
    noCompetition,
  };
}

/** What a field may hold, in its own units, inside of what is accepted. */
export function middleRange(id: PriorId): Range {
  const { min, max } = MIDDLE_RANGES[id];
  return inwards({ min: toPlain(id, min), max: toPlain(id, max) });
}

export const FACTOR_RANGE: Range = inwards({
  min: Math.exp(NINE_IN_TEN * SD_RANGE.min),
  max: Math.exp(NINE_IN_TEN * SD_RANGE.max),
});
function inwards({ min, max }: Range): Range {
  const step = (value: number) => 10 ** (Math.floor(Math.log10(value)) - 1);
  return {
    min: round(Math.ceil(min / step(min) - 1e-9) * step(min)),
    max: round(Math.floor(max / step(max) + 1e-9) * step(max)),
  };
}
