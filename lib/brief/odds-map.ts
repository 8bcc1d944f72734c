/**
 * The odds map: alpha across and beta up on log axes. The lines alpha = 1 and beta = 1 part the four outcomes; each dot is a draw.
 * Coefficients are told in percent: the part of the other's room that a full firm takes.
 */

import { decideOutcome } from '../forecast/odds';
import { OUTCOMES, type Outcome } from '../forecast/outcomes';
import { logTicks } from './axis-ticks';
import { captionOddsMap } from './captions';
import { spellOdds } from './odds-strip';
import { labelOutcome, toneOfOutcome } from './outcomes';
import { possessive } from './text';
import type { OddsMap, OddsMapPoint, OddsQuarter } from './types';
import type { Words } from './words';

/** The axes reach at least this far on both sides of 1, so that every quarter has room for its name. */
const REACH = 5;
/** The axes never reach further than this; draws beyond stand on the border. */
const MAX_REACH = 1000;
/** Part of the draws beyond each end of an axis. */
const LEFT_OUT = 0.02;

export function buildOddsMap(words: Words): OddsMap {
  const { cloud, outlook } = words.facts.report;
  const x = chooseRange(cloud.map((draw) => draw.alpha));
  const y = chooseRange(cloud.map((draw) => draw.beta));
  const spellTick = (value: number) => words.numbers.percent(value);
  const odds = spellOdds(words, outlook.odds);
  return {
    title: `Odds map: how much room ${words.focal} and ${words.rival} take from each other`,
    xLabel: `room ${words.rival} takes from ${words.focal} →`,
    yLabel: `room ${words.focal} takes from ${words.rival} →`,
    domain: { x, y },
    xTicks: logTicks(x[0], x[1], spellTick),
    yTicks: logTicks(y[0], y[1], spellTick),
    quarters: OUTCOMES.map((outcome) => buildQuarter(words, outcome, x, y, odds[outcome])),
    points: cloud.map((draw) => buildPoint(draw, x, y)),
    caption: captionOddsMap(words),
    table: {
      title: 'The four quarters of the odds map',
      columns: [
        'Quarter',
        `${words.rival} takes of ${possessive(words.focal)} room`,
        `${words.focal} takes of ${possessive(words.rival)} room`,
        'Odds',
      ],
      rows: OUTCOMES.map((outcome) => [labelOutcome(words, outcome), ...spellSides(outcome), odds[outcome]]),
      raw: OUTCOMES.map((outcome) => [
        labelOutcome(words, outcome),
        ...spellSides(outcome),
        outlook.odds[outcome],
      ]),
    },
  };
}

/** Log range around 1 that leaves out LEFT_OUT of the values at each end. */
function chooseRange(values: number[]): [number, number] {
  const sorted = values.filter((value) => value > 0).sort((a, b) => a - b);
  const at = (part: number) => sorted[Math.round((sorted.length - 1) * part)] ?? 1;
  const low = Math.max(1 / MAX_REACH, Math.min(1 / REACH, at(LEFT_OUT) / 1.2));
  const high = Math.min(MAX_REACH, Math.max(REACH, at(1 - LEFT_OUT) * 1.2));
  return [low, high];
}

/** Whether an outcome lies above 1 in alpha and in beta. */
function sidesOf(outcome: Outcome): { alphaAbove: boolean; betaAbove: boolean } {
  return {
    alphaAbove: outcome === 'exclusionByRival' || outcome === 'headStartDecides',
    betaAbove: outcome === 'exclusionByFocal' || outcome === 'headStartDecides',
  };
}

function buildQuarter(
  words: Words,
  outcome: Outcome,
  x: [number, number],
  y: [number, number],
  odds: string,
): OddsQuarter {
  const { alphaAbove, betaAbove } = sidesOf(outcome);
  return {
    outcome,
    tone: toneOfOutcome(outcome),
    label: `${labelOutcome(words, outcome)} · ${odds}`,
    x: alphaAbove ? [1, x[1]] : [x[0], 1],
    y: betaAbove ? [1, y[1]] : [y[0], 1],
    isDecided: decideOutcome(words.facts.report.outlook.odds) === outcome,
  };
}

function buildPoint(
  draw: Words['facts']['report']['cloud'][number],
  x: [number, number],
  y: [number, number],
): OddsMapPoint {
  const alpha = Math.min(x[1], Math.max(x[0], draw.alpha));
  const beta = Math.min(y[1], Math.max(y[0], draw.beta));
  return {
    alpha,
    beta,
    outcome: draw.outcome,
    tone: toneOfOutcome(draw.outcome),
    isClipped: alpha !== draw.alpha || beta !== draw.beta,
  };
}

function spellSides(outcome: Outcome): [string, string] {
  const { alphaAbove, betaAbove } = sidesOf(outcome);
  const spell = (isAbove: boolean) => (isAbove ? 'all of it' : 'a part');
  return [spell(alphaAbove), spell(betaAbove)];
}
