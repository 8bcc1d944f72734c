/**
 * The brief of one market as plain JSON. A page draws it without deciding anything: every sentence is written, every number
 * is rounded and spelt, every domain, tick, label place and colour token is chosen here.
 *
 * Numbers for drawing are plain numbers (users, months as year * 12 + month - 1, fractions of 1); strings are for reading.
 */
import type { PriorSettings } from '../estimate/types';
import type { Outcome } from '../forecast/outcomes';
import type { EventMark } from './event-marks';

/** Colour token by role. `both`: the two firms stay; `headStart`: the head start decides; `ink`: no firm. */
export type Tone = 'focal' | 'rival' | 'both' | 'headStart' | 'ink' | 'quiet';

/** A piece of a sentence. `tone` colours it (never the only carrier of meaning); `strong` sets it in a heavier weight. */
export interface TextRun {
  text: string;
  tone: Tone | null;
  strong: boolean;
}

/** One or more whole sentences, punctuation included. Joining the texts gives the plain reading. */
export type Sentence = TextRun[];

/** A table of a figure's numbers. Cells are spelt; `raw` holds the same cells unrounded for a CSV (null: empty). */
export interface FigureTable {
  /** Stands above the table and names it. */
  title: string;
  columns: string[];
  rows: string[][];
  raw: (string | number | null)[][];
}

export interface Tick {
  value: number;
  label: string;
}

export interface Brief {
  market: { name: string; unit: string; focalName: string; rivalName: string };
  /** "revision 4 · 42 months to Dec 2025": small print of the page head. */
  dataLine: string;
  locale: string;
  where: WhereSection;
  why: WhySection;
  change: ChangeSection;
  trust: TrustSection;
  cautions: Caution[];
}

// --- 1. Where is it heading? ------------------------------------------------------------------------------------

export interface WhereSection {
  question: string;
  /** Margin note. */
  note: Sentence;
  verdict: Verdict;
  odds: OddsStrip;
  forecast: ForecastFigure;
  milestones: MilestoneRow[];
}

export interface Verdict {
  /** null: the data do not decide yet. */
  decided: Outcome | null;
  /** One or two sentences, large. */
  headline: Sentence;
  /** Odds in calibrated words and numbers, where the share settles, what they were before the data. */
  support: Sentence[];
  /** One line of plain text, for a title, a list of markets or a link preview. */
  plain: string;
}

export interface OddsStrip {
  /** Focal firm's reading order: coexistence, exclusion by focal, exclusion by rival, head start. Widths add to exactly 100. */
  rows: OddsRow[];
  /** Reads the strip out for somebody who cannot see it. */
  description: string;
  table: FigureTable;
}

export interface OddsRow {
  outcome: Outcome;
  tone: Tone;
  /** "both stay", "Quillfern alone", "Marrowby alone", "head start decides". */
  label: string;
  /** "88 %", "<1 %", ">99 %". The whole percents of the four rows add to 100 (a "<1 %" row counts 0, a ">99 %" row 100). */
  percent: string;
  /** Share of the strip in percent, 0 to 100, unrounded odds: draw this. */
  width: number;
  /** "likely", "about as likely as not", ... */
  words: string;
  /** Odds before the data, spelt. */
  before: string;
}

export interface MilestoneRow {
  id: 'overtaking' | 'nearDestination' | 'returnHalfLife';
  label: string;
  /** "around March 2027 (Aug 2026 to Jun 2029)" or "may never come". */
  value: string;
  /** "72 % within 10 years". Empty when no chance belongs to it. */
  chance: string;
  sentence: Sentence;
}

export interface ForecastFigure {
  users: ForecastView;
  share: ForecastView;
}

export type ForecastSeriesKey = 'focal' | 'rival' | 'share';

export interface ForecastView {
  id: 'users' | 'share';
  /** Accessible name of the figure. */
  title: string;
  /** Series drawn in this view, in drawing order. */
  series: ForecastSeries[];
  /** One row per month, history then forecast. */
  rows: ForecastRow[];
  /** Vertical axis, from 0. Cut the drawing to it. */
  domain: [number, number];
  /** A band leaves the figure at the top (the caption says so). */
  isCut: boolean;
  ticks: Tick[];
  /** What the vertical axis counts: "thousand monthly active users", "Quillfern's share". */
  axisLabel: string;
  /** Months: first observed to the end of the horizon. */
  monthDomain: [number, number];
  monthTicks: Tick[];
  /** The line between history and forecast stands at `month` (the last observed one). */
  forecastFrom: { month: number; label: string };
  /** Dated events within the months of the figure. */
  events: EventMark[];
  /** Counts that the fit does not see, within the months of the figure, by series; and the months with their reasons in words. */
  leftOut: { counts: { key: ForecastSeriesKey; month: number; value: number }[]; text: string };
  caption: Sentence;
  table: FigureTable;
}

export interface ForecastSeries {
  key: ForecastSeriesKey;
  name: string;
  tone: Tone;
  /** Rival: dashed line, square open marks, hatched bands. */
  isDashed: boolean;
  marker: 'round' | 'square-open' | 'none';
  isHatched: boolean;
  /** Label at the end of the median line. `value` is where it points; `labelValue` is the same, moved so that labels do not touch. */
  end: { value: number; labelValue: number; text: string };
}

export interface ForecastRow {
  month: number;
  /** "Mar 2026". */
  label: string;
  isForecast: boolean;
  /** Keyed by the series of the view; absent keys do not belong to it. */
  points: Partial<Record<ForecastSeriesKey, ForecastPoint>>;
}

/** All null in a gap: a gap stays a gap. */
export interface ForecastPoint {
  /** Observed value. */
  seen: number | null;
  /** Median of the forecast; in the last observed month the observed value, so that line and bands start there. */
  mid: number | null;
  band50: [number, number] | null;
  band90: [number, number] | null;
  /** Spelt for a read-out: "312,000" or "308,000 (280,000 to 340,000)". Empty in a gap. */
  text: string;
}

// --- 2. Why? ----------------------------------------------------------------------------------------------------

export interface WhySection {
  question: string;
  note: Sentence;
  phaseMap: PhaseMap;
  oddsMap: OddsMap;
  parameters: ParameterTable;
}

/** [focal users, rival users]. */
export type MapPoint = [number, number];

/** Both firms' users on the axes: focal across, rival up. */
export interface PhaseMap {
  title: string;
  xLabel: string;
  yLabel: string;
  domain: { x: [number, number]; y: [number, number] };
  xTicks: Tick[];
  yTicks: Tick[];
  /** Where each firm stops growing, cut to the domain. */
  growthStops: GrowthStop[];
  equilibria: MapEquilibrium[];
  /** Observed months, broken where a month of either firm is missing. */
  pathSoFar: MapPathPoint[][];
  /** From the last observed month on, along the system of the map. */
  pathAhead: MapPathPoint[];
  /** The line that parts the two winning sides, cut to the domain; null when there is none. */
  separatrix: MapPoint[] | null;
  /** Direction of movement: `dx`, `dy` in fractions of the plot's width and height (length 1); `strength` 0 to 1 fades near the lines. */
  directions: MapDirection[];
  /** Where the draws end. */
  cloud: MapCloudPoint[];
  /** Placed for a plot of `labelFrame`; call `placeMapLabels` for another size. */
  labels: PlacedLabel[];
  labelFrame: LabelFrame;
  caption: Sentence;
  table: FigureTable;
}

export interface GrowthStop {
  firm: 'focal' | 'rival';
  /** "Quillfern stops growing". */
  name: string;
  tone: Tone;
  isDashed: boolean;
  /** Two ends, or none when the line lies outside the map. */
  points: MapPoint[];
}

export type EquilibriumKind = 'source' | 'saddle' | 'sink' | 'non-hyperbolic';

export interface MapEquilibrium {
  point: MapPoint;
  kind: EquilibriumKind;
  /** sink: filled; source and saddle: open ring; non-hyperbolic: half. */
  marker: 'filled' | 'open' | 'half';
  /** The mark is worth a word on the map. */
  isMain: boolean;
  /** "both settle here", "Quillfern alone", "tipping point", "empty market". */
  name: string;
  /** "The market settles here." / "The market leaves this state." */
  meaning: string;
  tone: Tone;
}

export interface MapPathPoint {
  point: MapPoint;
  month: number;
  /** Set on the months that carry a mark: the first, each January, the last. */
  mark: string | null;
}

export interface MapDirection {
  at: MapPoint;
  dx: number;
  dy: number;
  strength: number;
}

export interface MapCloudPoint {
  point: MapPoint;
  outcome: Outcome;
  tone: Tone;
}

/** Size the labels are placed for. Pixels. */
export interface LabelFrame {
  width: number;
  height: number;
  fontSize: number;
}

/** `x`, `y` in fractions of the plot (0 left, 0 bottom): the anchor of the text's baseline middle. */
export interface PlacedLabel {
  id: string;
  text: string;
  tone: Tone;
  isStrong: boolean;
  x: number;
  y: number;
  anchor: 'start' | 'middle' | 'end';
}

/** alpha across, beta up, both on log axes; the lines alpha = 1 and beta = 1 part the four quarters. */
export interface OddsMap {
  title: string;
  xLabel: string;
  yLabel: string;
  /** The axes in words: "room Marrowby takes from Quillfern, each full firm = 1". */
  domain: { x: [number, number]; y: [number, number] };
  xTicks: Tick[];
  yTicks: Tick[];
  quarters: OddsQuarter[];
  points: OddsMapPoint[];
  caption: Sentence;
  table: FigureTable;
}

export interface OddsQuarter {
  outcome: Outcome;
  tone: Tone;
  /** "both stay · 88 %". */
  label: string;
  x: [number, number];
  y: [number, number];
  /** The quarter of the decided outcome: shaded. */
  isDecided: boolean;
}

export interface OddsMapPoint {
  alpha: number;
  beta: number;
  outcome: Outcome;
  tone: Tone;
  /** The draw lies outside the axes and is drawn on their border. */
  isClipped: boolean;
}

export interface ParameterTable {
  rows: ParameterLine[];
  caption: Sentence;
  table: FigureTable;
}

export interface ParameterLine {
  id: string;
  firm: 'focal' | 'rival';
  /** "Quillfern's growth when small". */
  label: string;
  /** "+14 % a month (doubles in 5.3 months)". */
  value: string;
  /** "11 % to 18 %". */
  interval: string;
  /** What the value says, in words: "each full Marrowby takes 62 % of Quillfern's room". */
  meaning: string;
  /** "mostly from the data", "little learnt from the data". */
  learnt: string;
}

// --- 3. What would change it? -----------------------------------------------------------------------------------

export interface ChangeSection {
  question: string;
  note: Sentence;
  /** What share and odds hang on; null: not analysed. */
  sensitivity: SensitivityFigure | null;
}

export interface SensitivityFigure {
  headline: Sentence;
  /** Accessible name of the figure. */
  title: string;
  /** Most telling strength first. */
  rows: SensitivityLine[];
  /** Shares, fractions of 1. */
  domain: [number, number];
  ticks: Tick[];
  caption: Sentence;
  table: FigureTable;
}

export interface SensitivityLine {
  id: string;
  label: string;
  tone: Tone;
  /** Ends in shares, fractions of 1; null: not known. */
  bar: { low: number; high: number } | null;
  /** "50 % to 28 %": at the low end, at the high end. */
  text: string;
  /** Part of the share's spread: "91 %". */
  explained: string;
}

// --- 4. How far can I trust it? ---------------------------------------------------------------------------------

export interface TrustSection {
  question: string;
  note: Sentence;
  /** What the data cannot tell; at least one entry. */
  unknowns: UnknownLine[];
  /** One line on the sampler. */
  sampler: SamplerHealth;
  /** What the model leaves out. */
  leftOut: Sentence;
  /** How past forecasts did; null: there is no backtest. */
  backtest: BacktestPart | null;
  /** What more months and other values would tell; null: not analysed. */
  identifiability: IdentifiabilityPart | null;
  /** What was assumed before the counts; null: not kept by the version that made the outlook. */
  priors: PriorTable | null;
}

export interface PriorTable {
  title: string;
  caption: Sentence;
  rows: PriorLine[];
  /** As numbers, for the form that changes them. */
  settings: PriorSettings;
}

export interface PriorLine {
  id: 'growth' | 'k1' | 'k2' | 'alpha' | 'beta' | 'noCompetition';
  label: string;
  middle: string;
  /** Nine in ten of it; empty where there is none. */
  interval: string;
  /** 'addressable': from a stated addressable market. */
  mark: 'usual' | 'changed' | 'addressable';
}

export interface IdentifiabilityPart {
  decision: DecisionFigure | null;
  profiles: ProfileTable | null;
  /** Plain fits with either kind of errors; null: too few months have both firms. */
  errorScales: ErrorScaleTable | null;
  /** Trade-offs, signs, error scales. */
  findings: UnknownLine[];
}

/** Months until the data decide. */
export interface DecisionFigure {
  headline: Sentence;
  rows: DecisionLine[];
  /** Reads the bars out. */
  description: string;
  caption: Sentence;
  table: FigureTable;
}

export interface DecisionLine {
  months: number;
  /** "6 more months". */
  label: string;
  /** Percent, unrounded. */
  decided: number;
  sure: number;
  decidedText: string;
  sureText: string;
}

export interface ErrorScaleTable {
  caption: Sentence;
  /** Heads of the kind, the verdict and the values. */
  columns: string[];
  rows: ErrorScaleLine[];
}

export interface ErrorScaleLine {
  id: 'log' | 'raw';
  /** "in percent". */
  kind: string;
  verdict: string;
  /** Room taken from the focal firm and from the rival, saturation levels; "not told" where the fit has none. */
  values: string[];
}

export interface ProfileTable {
  caption: Sentence;
  rows: ProfileLine[];
  table: FigureTable;
}

export interface ProfileLine {
  id: string;
  label: string;
  best: string;
  /** "46 to 95 %", "above 230,000, with no upper limit". */
  interval: string;
}

export interface BacktestPart {
  /** Who forecast this market better, with numbers. */
  verdict: Sentence;
  /** More than chance or not, how the bands held, the combination, what was tested. */
  details: Sentence[];
  /** Stands above the rows. */
  caption: Sentence;
  /** Methods at the longest horizon, this model first. */
  rows: BacktestRow[];
  /** All scores at all horizons. */
  table: FigureTable;
}

export interface BacktestRow {
  method: string;
  label: string;
  /** "3.1 %". */
  error: string;
  /** Share of outcomes inside the 90 % band: "91 %". */
  inside: string;
  /** "best here", or why it is not ranked. Empty: nothing to say. */
  note: string;
  isOwn: boolean;
}

export interface UnknownLine {
  code: string;
  sentence: Sentence;
}

export interface SamplerHealth {
  isSound: boolean;
  line: Sentence;
  /** Label and value, to fold away. */
  details: { label: string; value: string }[];
}

export interface Caution {
  id: string;
  text: string;
}

// --- a push, beside the brief -----------------------------------------------------------------------------------

/** What one scenario does, ready to draw: made from a ScenarioComparison by `buildPushBrief`. */
export interface PushBrief {
  /** The verdict on destination or path with its probability and why, how far on the way, and who gains in the end. */
  sentences: Sentence[];
  plain: string;
  odds: PushOddsRow[];
  /** Baseline and pushed, per month, for the overlay on the main chart. */
  users: PushRow[];
  share: PushRow[];
  /** Pushed minus baseline, per month. */
  difference: { users: DifferenceView; share: DifferenceView };
  /** At 6, 12 and 24 months. */
  checkpoints: FigureTable;
  caption: Sentence;
}

export interface PushOddsRow {
  outcome: Outcome;
  tone: Tone;
  label: string;
  before: string;
  after: string;
  /** Unrounded percent. */
  beforeWidth: number;
  afterWidth: number;
}

export interface PushRow {
  month: number;
  label: string;
  points: Partial<Record<ForecastSeriesKey, { baseline: number; pushed: number; band90: [number, number] }>>;
}

export interface DifferenceView {
  series: { key: ForecastSeriesKey; name: string; tone: Tone; isDashed: boolean }[];
  rows: DifferenceRow[];
  domain: [number, number];
  ticks: Tick[];
  monthDomain: [number, number];
  monthTicks: Tick[];
  table: FigureTable;
}

export interface DifferenceRow {
  month: number;
  label: string;
  points: Partial<
    Record<
      ForecastSeriesKey,
      { mid: number; band50: [number, number]; band90: [number, number]; text: string }
    >
  >;
}
