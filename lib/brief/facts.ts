/**
 * What a brief is written from: the market's names, the series, where it came from and the stored result of a fit.
 * Nothing else is consulted, so the same facts always give the same brief, on the server, in the browser and from a frozen forecast.
 */
import type { BacktestReport } from '../forecast/backtest/report';
import type { IdentifiabilityReport } from '../forecast/identifiability/report';
import type { FitReport } from '../forecast/report';
import type { Month, MonthlySeries } from '../series/types';
import type { EventFact } from './event-marks';

export interface MarketFacts {
  name: string;
  /** What is counted, in the analyst's words: "monthly active users". */
  unit: string;
  focalName: string;
  rivalName: string;
  /** Stated measurement error, sd of ln users (0.1 is a panel estimate of +-10 %); 0 or absent: counted exactly. */
  measurementError?: { focal: number; rival: number };
}

export interface RevisionFacts {
  number: number;
  /** ISO 8601, or null when not known. */
  createdAt: string | null;
  fileName: string | null;
}

/** A month that the fit does not see, with the counts that were given for it. */
export interface LeftOutFact {
  month: Month;
  focal: number | null;
  rival: number | null;
  reason: string;
}

export interface BriefFacts {
  market: MarketFacts;
  /** As the fit saw it: months left out are gaps. */
  series: MonthlySeries;
  /** Dated events of the market; absent: none. */
  events?: EventFact[];
  /** Absent: none. */
  leftOut?: LeftOutFact[];
  revision: RevisionFacts;
  report: FitReport;
  /** How past forecasts of these counts did; absent: not known yet. */
  backtest?: BacktestReport;
  /** What the data can and cannot tell; absent: not known yet. */
  identifiability?: IdentifiabilityReport;
}
