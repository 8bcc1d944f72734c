/**
 * What was assumed before the counts, in plain units: the middle of each prior and the interval that holds nine in ten of it, and whether it
 * is the usual assumption, one that was changed, or one from a stated addressable market.
 */
import { USUAL_PRIORS } from '../estimate/priors';
import type { LogNormalPrior } from '../estimate/types';
import type { FitReport, Interval } from '../forecast/report';
import { joinSentences, possessive, sentence } from './text';
import type { PriorLine, PriorTable, Sentence } from './types';
import { type FirmRole, otherFirm, type Words } from './words';

type Beliefs = NonNullable<FitReport['beliefs']>;

/** The interval between the 5 % and the 95 % quantile of a normal, in sd from its middle. */
const NINE_IN_TEN = 1.6448536;

/** null: the outlook is from before this was kept. */
export function buildPriorTable(words: Words): PriorTable | null {
  const { beliefs } = words.facts.report;
  if (!beliefs) return null;
  const rows = [
    describeGrowth(words, beliefs),
    describeSaturation(words, beliefs, 'focal'),
    describeSaturation(words, beliefs, 'rival'),
    describeRoom(words, beliefs, 'focal'),
    describeRoom(words, beliefs, 'rival'),
    describeNoCompetition(words, beliefs),
  ];
  return {
    title: 'What was assumed before the counts',
    caption: captionPriors(rows),
    rows,
    settings: beliefs.priors,
  };
}

function captionPriors(rows: readonly PriorLine[]): Sentence {
  const changed = rows.filter((row) => row.mark !== 'usual').length;
  const told = sentence(
    'Middle of each assumption and the interval that holds nine in ten of it. The counts move what they can tell.',
  );
  if (changed === 0) return joinSentences([told, sentence('All are the usual ones (common practice).')]);
  const were = changed === 1 ? 'One is' : `${changed} are`;
  return joinSentences([told, sentence(`${were} not the usual assumption.`)]);
}

function describeGrowth(words: Words, { priors }: Beliefs): PriorLine {
  const monthly = mapInterval(intervalOf(priors.growth), Math.expm1);
  return {
    id: 'growth',
    label: 'Growth of either firm when small',
    middle: `${words.numbers.percent(monthly.q50)} a month`,
    interval: words.numbers.percentInterval(monthly),
    mark: isUsual(priors.growth, USUAL_PRIORS.growth) ? 'usual' : 'changed',
  };
}

function describeSaturation(words: Words, { priors, addressable }: Beliefs, firm: FirmRole): PriorLine {
  const id = firm === 'focal' ? 'k1' : 'k2';
  const level = words.facts.report.parameters.find((row) => row.id === id)!.prior;
  const isStated = addressable !== null && addressable[firm] !== null;
  return {
    id,
    label: `${possessive(words.name(firm))} saturation level`,
    middle: words.numbers.users(level.q50),
    interval: words.numbers.usersInterval(level),
    mark: isStated
      ? 'addressable'
      : isUsual(priors.saturation, USUAL_PRIORS.saturation)
        ? 'usual'
        : 'changed',
  };
}

function describeRoom(words: Words, { priors }: Beliefs, firm: FirmRole): PriorLine {
  const id = firm === 'focal' ? 'alpha' : 'beta';
  const room = intervalOf(priors[id]);
  return {
    id,
    label: `Room that ${words.name(otherFirm(firm))} takes from ${words.name(firm)}, if they compete`,
    middle: words.numbers.percent(room.q50),
    interval: words.numbers.percentInterval(room),
    mark: isUsual(priors[id], USUAL_PRIORS[id]) ? 'usual' : 'changed',
  };
}

function describeNoCompetition(words: Words, { priors }: Beliefs): PriorLine {
  return {
    id: 'noCompetition',
    label: 'Chance that they hardly compete',
    middle: words.numbers.seenShare(priors.noCompetition),
    interval: '',
    mark: priors.noCompetition === USUAL_PRIORS.noCompetition ? 'usual' : 'changed',
  };
}

function intervalOf({ meanLog, sdLog }: LogNormalPrior): Interval {
  const at = (z: number) => Math.exp(meanLog + z * sdLog);
  return { q05: at(-NINE_IN_TEN), q50: at(0), q95: at(NINE_IN_TEN) };
}

function isUsual(prior: LogNormalPrior, usual: LogNormalPrior): boolean {
  return prior.meanLog === usual.meanLog && prior.sdLog === usual.sdLog;
}

/** Applies a rising function to all three numbers. */
function mapInterval({ q05, q50, q95 }: Interval, change: (value: number) => number): Interval {
  return { q05: change(q05), q50: change(q50), q95: change(q95) };
}
