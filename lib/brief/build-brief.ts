/** The brief of one market from its facts: five questions, read top to bottom. Pure: the same facts give the same brief. */
import { OUTCOMES } from '../forecast/outcomes';
import { describeBacktest, warnOfSimpler } from './backtest-words';
import { writeCautions } from './cautions';
import type { BriefFacts } from './facts';
import { buildForecastFigure } from './forecast-figure';
import { describeIdentifiability } from './identifiability-words';
import { writeMilestones } from './milestones';
import { buildOddsMap } from './odds-map';
import { buildOddsStrip, spellOdds } from './odds-strip';
import { labelOutcome } from './outcomes';
import { buildParameterTable } from './parameters';
import { buildPhaseMap } from './phase-map';
import { buildPriorTable } from './prior-words';
import { describeSampler } from './sampler-health';
import { buildSensitivity } from './sensitivity-words';
import { writeLeftOut } from './structure-words';
import { listWords, sentence } from './text';
import type {
  Brief,
  ChangeSection,
  Sentence,
  TrustSection,
  Verdict,
  WhereSection,
  WhySection,
} from './types';
import { writeUnknowns } from './unknowns';
import { writeVerdict } from './verdict';
import { createWords, DEFAULT_LOCALE, type Words } from './words';

export interface BriefOptions {
  /** BCP 47 tag for numbers and months; sentences are English. */
  locale?: string;
  /** Pushes are shown beside the brief: their cautions apply. */
  hasScenario?: boolean;
}

/** Odds before the data within this of 25 % read as "25 %". */
const EVEN_WITHIN = 0.02;

export function buildBrief(facts: BriefFacts, options: BriefOptions = {}): Brief {
  const { locale = DEFAULT_LOCALE, hasScenario = false } = options;
  const words = createWords(facts, locale);
  const { name, unit, focalName, rivalName } = facts.market;
  return {
    market: { name, unit, focalName, rivalName },
    dataLine: writeDataLine(words),
    locale,
    where: buildWhere(words),
    why: buildWhy(words),
    change: buildChange(words),
    trust: buildTrust(words),
    cautions: writeCautions(words, hasScenario),
  };
}

/** "revision 4 · 42 months to Dec 2025". */
function writeDataLine(words: Words): string {
  const months = words.facts.series.focal.length;
  return `revision ${words.facts.revision.number} · ${months} months to ${words.months.short(words.lastMonth)}`;
}

function buildWhere(words: Words): WhereSection {
  return {
    question: 'Where is it heading?',
    note: writePriorNote(words),
    verdict: buildVerdict(words),
    odds: buildOddsStrip(words),
    forecast: buildForecastFigure(words),
    milestones: writeMilestones(words),
  };
}

/** A simple method that did better is told beside the verdict, not only further down. */
function buildVerdict(words: Words): Verdict {
  const verdict = writeVerdict(words);
  const { backtest } = words.facts;
  return backtest
    ? { ...verdict, support: [...verdict.support, ...warnOfSimpler(words, backtest)] }
    : verdict;
}

function writePriorNote(words: Words): Sentence {
  const { priorOdds } = words.facts.report.outlook;
  if (OUTCOMES.every((outcome) => Math.abs(priorOdds[outcome] - 0.25) <= EVEN_WITHIN)) {
    return sentence('Before the data each outcome stood at 25\u00a0%.');
  }
  const spelt = spellOdds(words, priorOdds);
  const parts = OUTCOMES.map((outcome) => `${labelOutcome(words, outcome)} ${spelt[outcome]}`);
  return sentence(`Before the data: ${listWords(parts)}.`);
}

function buildWhy(words: Words): WhySection {
  return {
    question: 'Why?',
    note: sentence(
      'Each firm grows until it meets its line. Where the lines cross, both stand still. Each dot of the odds map is one set of strengths that fits the history.',
    ),
    phaseMap: buildPhaseMap(words),
    oddsMap: buildOddsMap(words),
    parameters: buildParameterTable(words),
  };
}

function buildChange(words: Words): ChangeSection {
  const sensitivity = words.facts.identifiability?.sensitivity;
  return {
    question: 'What would change it?',
    note: sentence('Gains and losses against no push, on the same draws and the same luck.'),
    sensitivity: sensitivity ? buildSensitivity(words, sensitivity) : null,
  };
}

function buildTrust(words: Words): TrustSection {
  const { backtest, identifiability } = words.facts;
  return {
    question: 'How far can I trust it?',
    note: sentence('What the history cannot tell, and how the numbers were got.'),
    unknowns: writeUnknowns(words),
    sampler: describeSampler(words),
    backtest: backtest ? describeBacktest(words, backtest) : null,
    identifiability: identifiability ? describeIdentifiability(words, identifiability) : null,
    leftOut: writeLeftOut(words),
    priors: buildPriorTable(words),
  };
}
