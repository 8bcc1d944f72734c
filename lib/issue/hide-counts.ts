/**
 * An issued forecast for readers who may not see the counts: every number of users becomes an index in which the focal firm's last count is
 * INDEX_BASE. Shares, odds, rates and milestones do not change. Done before anything is sent, so no count leaves the server.
 */
import { createMonthFormat } from '../brief/month-words';
import { DEFAULT_LOCALE } from '../brief/words';
import type { BacktestReport } from '../forecast/backtest/report';
import type { IdentifiabilityReport } from '../forecast/identifiability/report';
import type { FitReport, ParameterRow, SeriesBands } from '../forecast/report';
import {
  scaleAnswers,
  scaleBands,
  scaleComparison,
  scaleInterval,
  scalePush,
} from '../scenario/scale-scenario';
import { scaleDraws } from '../scenario/trial-draws';
import type { IssuedForecast, IssuedScenario } from './format';

export const INDEX_BASE = 1000;

/** Parameters in users. */
const USER_PARAMETERS = ['k1', 'k2'];

export function hideCounts(issued: IssuedForecast): IssuedForecast {
  const { series, market } = issued;
  const last = series.focal.findLastIndex((count) => count !== null && count > 0);
  const users = series.focal[last] ?? issued.report.point.n1Last;
  const factor = INDEX_BASE / users;
  const month = createMonthFormat(DEFAULT_LOCALE).long(series.firstMonth + Math.max(last, 0));
  return {
    ...issued,
    market: { ...market, unit: `index, ${market.focalName} in ${month} = ${INDEX_BASE}` },
    series: { ...series, ...scaleCounts(series, factor) },
    ...(issued.leftOut && {
      leftOut: issued.leftOut.map((one) => ({
        ...one,
        focal: scaleCount(one.focal, factor),
        rival: scaleCount(one.rival, factor),
      })),
    }),
    report: scaleReport(issued.report, factor),
    ...(issued.backtest && { backtest: scaleBacktest(issued.backtest, factor) }),
    ...(issued.identifiability && {
      identifiability: scaleIdentifiability(issued.identifiability, factor),
    }),
    scenario: issued.scenario && scaleScenario(issued.scenario, factor),
    ...(issued.scenarios && { scenarios: issued.scenarios.map((one) => scaleScenario(one, factor)) }),
    ...(issued.trial && { trial: { ...issued.trial, draws: scaleDraws(issued.trial.draws, factor) } }),
  };
}

function scaleCount(count: number | null, factor: number): number | null {
  return count === null ? null : count * factor;
}

function scaleCounts({ focal, rival }: IssuedForecast['series'], factor: number) {
  return {
    focal: focal.map((count) => scaleCount(count, factor)),
    rival: rival.map((count) => scaleCount(count, factor)),
  };
}

function scaleScenario(scenario: IssuedScenario, factor: number): IssuedScenario {
  return {
    ...scenario,
    pushes: scenario.pushes.map((push) => scalePush(push, factor)),
    comparison: scaleComparison(scenario.comparison, factor),
    ...(scenario.answers && { answers: scaleAnswers(scenario.answers, factor) }),
  };
}

function scaleReport(report: FitReport, factor: number): FitReport {
  const { point, history, outlook, beliefs } = report;
  const scaleFit = (row: (FitReport['history']['focal'][number] | null)[]) =>
    row.map((level) => level && scaleInterval(level, factor));
  return {
    ...report,
    point: {
      ...point,
      k1: point.k1 * factor,
      k2: point.k2 * factor,
      n1Start: point.n1Start * factor,
      n2Start: point.n2Start * factor,
      n1Last: point.n1Last * factor,
      n2Last: point.n2Last * factor,
    },
    parameters: report.parameters.map((row) => scaleParameter(row, factor)),
    history: { focal: scaleFit(history.focal), rival: scaleFit(history.rival) },
    ...(beliefs && {
      beliefs: {
        ...beliefs,
        addressable: beliefs.addressable && {
          ...beliefs.addressable,
          focal: scaleCount(beliefs.addressable.focal, factor),
          rival: scaleCount(beliefs.addressable.rival, factor),
        },
      },
    }),
    outlook: {
      ...outlook,
      observations: scaleSeriesBands(outlook.observations, factor),
      levels: scaleSeriesBands(outlook.levels, factor),
      destination: {
        ...outlook.destination,
        focal: scaleInterval(outlook.destination.focal, factor),
        rival: scaleInterval(outlook.destination.rival, factor),
      },
    },
    cloud: report.cloud.map((one) => ({ ...one, n1End: one.n1End * factor, n2End: one.n2End * factor })),
  };
}

function scaleParameter(row: ParameterRow, factor: number): ParameterRow {
  if (!USER_PARAMETERS.includes(row.id)) return row;
  return {
    ...row,
    posterior: scaleInterval(row.posterior, factor),
    prior: scaleInterval(row.prior, factor),
  };
}

function scaleSeriesBands({ focal, rival, total, share }: SeriesBands, factor: number): SeriesBands {
  return {
    focal: scaleBands(focal, factor),
    rival: scaleBands(rival, factor),
    total: scaleBands(total, factor),
    share,
  };
}

/** Errors and scores are of ln users or relative, so only the combined forecast is in users. */
function scaleBacktest(backtest: BacktestReport, factor: number): BacktestReport {
  const forecast = backtest.combination?.forecast;
  if (!backtest.combination || !forecast) return backtest;
  const scaled = { focal: scaleBands(forecast.focal, factor), rival: scaleBands(forecast.rival, factor) };
  return { ...backtest, combination: { ...backtest.combination, forecast: scaled } };
}

type Profile = NonNullable<IdentifiabilityReport['profiles']>[number];
type Verdict = NonNullable<IdentifiabilityReport['errorScales']>['log'];

function scaleProfile(profile: Profile, factor: number): Profile {
  if (!USER_PARAMETERS.includes(profile.quantity)) return profile;
  return {
    ...profile,
    estimate: scaleCount(profile.estimate, factor),
    low: scaleCount(profile.low, factor),
    high: scaleCount(profile.high, factor),
  };
}

function scaleVerdict(verdict: Verdict, factor: number): Verdict {
  return { ...verdict, k1: scaleCount(verdict.k1, factor), k2: scaleCount(verdict.k2, factor) };
}

function scaleIdentifiability(report: IdentifiabilityReport, factor: number): IdentifiabilityReport {
  const { profiles, sensitivity, errorScales } = report;
  return {
    ...report,
    profiles: profiles?.map((one) => scaleProfile(one, factor)) ?? null,
    sensitivity: sensitivity && {
      ...sensitivity,
      rows: sensitivity.rows.map((row) =>
        USER_PARAMETERS.includes(row.id) ? { ...row, low: row.low * factor, high: row.high * factor } : row,
      ),
    },
    errorScales: errorScales && {
      ...errorScales,
      log: scaleVerdict(errorScales.log, factor),
      raw: scaleVerdict(errorScales.raw, factor),
    },
  };
}
