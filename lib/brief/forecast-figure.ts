/** The main figure in its two views: users of both firms, and the focal firm's share. */

import type { Month } from '../series/types';
import { axisFromZero, monthTicks } from './axis-ticks';
import { captionShare, captionUsers } from './captions';
import { markEvents, tellExclusions } from './event-marks';
import type { LeftOutFact } from './facts';
import { buildForecastRows, type SeriesSource, tabulateForecast } from './forecast-rows';
import { possessive } from './text';
import type { ForecastFigure, ForecastSeries, ForecastSeriesKey, ForecastView, Tone } from './types';
import { type FirmRole, horizonMonthOf, type Words } from './words';

/** A 90 % band that reaches beyond this many times everything else is cut off at the top of the figure. */
const CUT_ABOVE = 2.5;
/** Least distance of two labels at the line ends, as part of the axis. */
const LABEL_GAP = 0.07;

export function buildForecastFigure(words: Words): ForecastFigure {
  return { users: buildUsersView(words), share: buildShareView(words) };
}

function buildUsersView(words: Words): ForecastView {
  const sources = (['focal', 'rival'] as const).map((firm) => usersSource(words, firm));
  const rows = buildForecastRows(words, sources);
  const { isCut, top, height } = measureUsers(sources, words.facts.leftOut ?? []);
  const axis = axisFromZero(height, words.numbers.axis);
  return {
    id: 'users',
    title: `${words.facts.market.unit} of ${words.focal} and ${words.rival}: history and forecast`,
    series: spreadLabels(
      sources.map((source) => describeSeries(source, source.key as FirmRole)),
      axis.domain,
    ),
    rows,
    domain: axis.domain,
    isCut,
    ticks: axis.ticks,
    axisLabel: words.facts.market.unit,
    ...monthAxis(words),
    ...markMonths(words, ({ focal, rival }) => ({ focal, rival })),
    caption: captionUsers(words, { isCut, top }),
    table: tabulateForecast('Users by month', sources, rows),
  };
}

function usersSource(words: Words, firm: FirmRole): SeriesSource {
  return {
    key: firm,
    name: words.name(firm),
    seen: words.facts.series[firm],
    bands: words.facts.report.outlook.observations[firm],
    spellSeen: (value) => words.numbers.users(value),
    spellForecast: (mid, [low, high]) => {
      const width = { q05: low, q95: high };
      return `${words.numbers.users(mid, width)} (${words.numbers.usersInterval(width)})`;
    },
  };
}

/** What the axis must hold; a band that would flatten everything else is cut. */
function measureUsers(
  sources: SeriesSource[],
  leftOut: LeftOutFact[],
): { isCut: boolean; top: number; height: number } {
  const held = Math.max(
    ...sources.flatMap(({ seen, bands }) => [...seen.map((count) => count ?? 0), ...bands.q75]),
    ...leftOut.flatMap(({ focal, rival }) => [focal ?? 0, rival ?? 0]),
  );
  const top = Math.max(...sources.flatMap(({ bands }) => bands.q95));
  const isCut = top > CUT_ABOVE * held;
  return { isCut, top, height: isCut ? CUT_ABOVE * held : Math.max(held, top) };
}

function buildShareView(words: Words): ForecastView {
  const { focal, rival } = words.facts.series;
  const source: SeriesSource = {
    key: 'share',
    name: `${possessive(words.focal)} share`,
    seen: focal.map((count, i) => shareOf(count, rival[i] ?? null)),
    bands: words.facts.report.outlook.observations.share,
    spellSeen: words.numbers.seenShare,
    spellForecast: (mid, [low, high]) =>
      `${words.numbers.chance(mid)} (${words.numbers.chanceInterval({ q05: low, q95: high })})`,
  };
  const rows = buildForecastRows(words, [source]);
  const axis = axisFromZero(1, (value) => words.numbers.percent(value));
  return {
    id: 'share',
    title: `${possessive(words.focal)} share: history and forecast`,
    series: [describeSeries(source, 'focal')],
    rows,
    domain: axis.domain,
    isCut: false,
    ticks: axis.ticks,
    axisLabel: `${possessive(words.focal)} share`,
    ...monthAxis(words),
    ...markMonths(words, ({ focal, rival }) => ({ share: shareOf(focal, rival) })),
    caption: captionShare(words),
    table: tabulateForecast('Share by month', [source], rows),
  };
}

function shareOf(focal: number | null, rival: number | null): number | null {
  if (focal === null || rival === null || !(focal + rival > 0)) return null;
  return focal / (focal + rival);
}

/** Focal: solid, round, plain. Rival: dashed, open squares, hatched. */
function describeSeries(source: SeriesSource, firm: FirmRole): ForecastSeries {
  const isRival = firm === 'rival';
  const tone: Tone = firm;
  const value = source.bands.q50.at(-1)!;
  return {
    key: source.key,
    name: source.name,
    tone,
    isDashed: isRival,
    marker: isRival ? 'square-open' : 'round',
    isHatched: isRival,
    end: { value, labelValue: value, text: source.name },
  };
}

/** Moves the labels at the line ends apart, keeping their order and staying on the axis. */
export function spreadLabels(series: ForecastSeries[], domain: [number, number]): ForecastSeries[] {
  const gap = LABEL_GAP * (domain[1] - domain[0]);
  const clamp = (value: number) => Math.min(domain[1], Math.max(domain[0], value));
  if (series.length !== 2) return series.map((one) => withLabel(one, clamp(one.end.value)));
  const [upper, lower] = series[0]!.end.value >= series[1]!.end.value ? [0, 1] : [1, 0];
  let high = clamp(series[upper]!.end.value);
  let low = clamp(series[lower]!.end.value);
  const lack = gap - (high - low);
  if (lack > 0) {
    high = Math.min(domain[1], Math.max(high + lack / 2, domain[0] + gap));
    low = high - gap;
  }
  return series.map((one, i) => withLabel(one, i === upper ? high : low));
}

function withLabel(series: ForecastSeries, labelValue: number): ForecastSeries {
  return { ...series, end: { ...series.end, labelValue } };
}

/** Events and left-out counts of the months that the figure shows. */
function markMonths(
  words: Words,
  read: (fact: LeftOutFact) => Partial<Record<ForecastSeriesKey, number | null>>,
): Pick<ForecastView, 'events' | 'leftOut'> {
  const { events = [], leftOut = [], series } = words.facts;
  const isShown = ({ month }: { month: Month }) =>
    month >= series.firstMonth && month <= horizonMonthOf(words);
  const shown = leftOut.filter(isShown);
  const counts = shown.flatMap((fact) =>
    Object.entries(read(fact)).flatMap(([key, value]) =>
      value == null ? [] : [{ key: key as ForecastSeriesKey, month: fact.month, value }],
    ),
  );
  return {
    events: markEvents(events.filter(isShown), words.months),
    leftOut: { counts, text: tellExclusions(shown, words.months) },
  };
}

function monthAxis(words: Words): Pick<ForecastView, 'monthDomain' | 'monthTicks' | 'forecastFrom'> {
  const from = words.facts.series.firstMonth;
  const to = horizonMonthOf(words);
  return {
    monthDomain: [from, to],
    monthTicks: monthTicks(from, to, words.months),
    forecastFrom: {
      month: words.lastMonth,
      label: `forecast from ${words.months.short(words.facts.report.outlook.firstMonth)}`,
    },
  };
}
