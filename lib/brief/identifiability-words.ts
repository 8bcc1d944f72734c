/**
 * What the data can and cannot tell, in plain words: how many more months until they decide, which values fit the past as well, which
 * parameters trade off, whether it is competition at all, and whether the kind of counting error turns the answer.
 */

import type { Effect, IdentifiabilityReport, SignPattern } from '../forecast/identifiability/report';
import { decideOutcome } from '../forecast/odds';
import { buildErrorScales, writeErrorScales } from './error-scale-words';
import { nameParameter } from './parameters';
import { LIKELY_ABOVE } from './probability-words';
import { capitalise, joinSentences, listWords, sentence, strong } from './text';
import type {
  DecisionFigure,
  IdentifiabilityPart,
  ProfileLine,
  ProfileTable,
  Sentence,
  UnknownLine,
} from './types';
import type { Words } from './words';

type Decision = NonNullable<IdentifiabilityReport['decision']>;
type Profile = NonNullable<IdentifiabilityReport['profiles']>[number];

/** Futures of which more than this part had too few draws to be counted directly: the caption says so. */
const MOSTLY_EXTRAPOLATED = 0.5;
/** Half-width, relative, of a value without an interval, for its digits. */
const VAGUE = 0.2;

export function describeIdentifiability(words: Words, report: IdentifiabilityReport): IdentifiabilityPart {
  const findings: UnknownLine[] = [];
  const add = (code: string, text: Sentence | null) => text && findings.push({ code, sentence: text });
  const scales = report.errorScales && writeErrorScales(words, report.errorScales);
  // an answer that turns comes before everything else
  if (report.errorScales?.disagree) add('error-scales', scales);
  add('trade-off', report.collinearity && writeTradeOff(words, report.collinearity));
  add('sign-pattern', report.signPattern && writeSignPattern(words, report.signPattern));
  if (!report.errorScales?.disagree) add('error-scales', scales);
  return {
    decision: report.decision && report.decision.futures > 0 ? buildDecision(words, report.decision) : null,
    profiles: report.profiles && buildProfiles(words, report.profiles),
    errorScales: report.errorScales && buildErrorScales(words, report.errorScales),
    findings,
  };
}

// --- months until the data decide ---------------------------------------------------------------------------------

function buildDecision(words: Words, { rows, futures }: Decision): DecisionFigure {
  const { chance } = words.numbers;
  const figureRows = rows.map(({ months, decided, sure }) => ({
    months,
    label: `${months} more months`,
    decided: 100 * decided,
    sure: 100 * sure,
    decidedText: chance(decided),
    sureText: chance(sure),
  }));
  return {
    headline: writeDecision(words, rows),
    rows: figureRows,
    description: figureRows
      .map((row) => `After ${row.label}: likely ${row.decidedText}, very likely ${row.sureText}`)
      .join('. '),
    caption: captionDecision(words, rows, futures),
    table: {
      title: 'Chance that the data decide',
      columns: [
        'More months',
        'One outcome likely (above 66\u00a0%)',
        'One outcome very likely (above 90\u00a0%)',
      ],
      rows: figureRows.map((row) => [String(row.months), row.decidedText, row.sureText]),
      raw: rows.map(({ months, decided, sure }) => [months, decided, sure]),
    },
  };
}

function writeDecision(words: Words, rows: Decision['rows']): Sentence {
  const { chance } = words.numbers;
  const isDecided = decideOutcome(words.facts.report.outlook.odds) !== null;
  if (isDecided) {
    const last = rows[rows.length - 1];
    return sentence(
      strong('One outcome is likely already.'),
      ` After ${last.months} more months the chance is ${chance(last.sure)} that one is very likely, and ${chance(1 - last.decided)} that none is likely any more.`,
    );
  }
  const first = rows.find(({ decided }) => decided > 0.5);
  const lead = first
    ? `More likely than not ${first.months} more months are enough for the data to decide`
    : `Even ${rows[rows.length - 1].months} more months may well not be enough for the data to decide`;
  const told = first ?? rows[rows.length - 1];
  return sentence(
    strong(lead),
    `: the chance is ${chance(told.decided)} that one outcome is likely by then.`,
  );
}

function captionDecision(words: Words, rows: Decision['rows'], futures: number): Sentence {
  const rough = rows
    .filter(({ extrapolated }) => extrapolated > MOSTLY_EXTRAPOLATED)
    .map(({ months }) => String(months));
  const parts = [
    sentence(
      `Bar: chance that one outcome is likely after so many more months; dark part: very likely. Over ${words.numbers.users(futures)} simulated continuations of these counts.`,
    ),
  ];
  if (rough.length > 0)
    parts.push(
      sentence(
        `For ${listWords(rough)} months too few draws fit each continuation, so these chances are extrapolated.`,
      ),
    );
  return joinSentences(parts);
}

// --- values that fit as well --------------------------------------------------------------------------------------

function buildProfiles(words: Words, profiles: readonly Profile[]): ProfileTable {
  const rows = profiles.map((profile) => describeProfile(words, profile));
  return {
    caption: sentence(
      'Values with which the past fits nearly as well as with the best, all else fitted anew: plain least squares without assumptions, 95\u00a0% profile likelihood.',
    ),
    rows,
    table: {
      title: 'Values that fit the past nearly as well',
      columns: ['Strength', 'Best', 'From', 'To'],
      rows: profiles.map((profile, i) => [
        rows[i].label,
        rows[i].best,
        spellEnd(words, profile, profile.low),
        spellEnd(words, profile, profile.high),
      ]),
      raw: profiles.map(({ quantity, estimate, low, high }) => [quantity, estimate, low, high]),
    },
  };
}

function describeProfile(words: Words, profile: Profile): ProfileLine {
  const { quantity, estimate, low, high } = profile;
  return {
    id: quantity,
    label: capitalise(nameParameter(words, quantity)),
    best: estimate === null ? 'none' : spellValue(words, profile, estimate),
    interval: spellProfile(words, profile, low, high),
  };
}

function spellProfile(words: Words, profile: Profile, low: number | null, high: number | null): string {
  const isOpenBelow = low === null || (low === 0 && !isLevel(profile));
  if (isOpenBelow && high === null) return 'anything: the counts do not tell';
  if (high === null) return `above ${spellValue(words, profile, low!)}, with no upper limit`;
  if (isOpenBelow) return `up to ${spellValue(words, profile, high)}, or none at all`;
  const width = { q05: low, q95: high };
  return isLevel(profile) ? words.numbers.usersInterval(width) : words.numbers.percentInterval(width);
}

function isLevel({ quantity }: Profile): boolean {
  return quantity === 'k1' || quantity === 'k2';
}

function spellEnd(words: Words, profile: Profile, end: number | null): string {
  return end === null ? 'no limit' : spellValue(words, profile, end);
}

/** Without two ends nothing says how many digits are known: two of them are shown. */
function spellValue(words: Words, profile: Profile, value: number): string {
  const { low, high } = profile;
  const isClosed = low !== null && high !== null && high > low;
  const width = isClosed ? { q05: low, q95: high } : { q05: (1 - VAGUE) * value, q95: (1 + VAGUE) * value };
  return isLevel(profile) ? words.numbers.users(value, width) : words.numbers.percent(value, width);
}

// --- findings -----------------------------------------------------------------------------------------------------

/** Which parameters the history tells apart least; null when it tells all apart. */
function writeTradeOff(
  words: Words,
  { isPoorlyTold, weakest, index }: NonNullable<IdentifiabilityReport['collinearity']>,
): Sentence | null {
  if (!isPoorlyTold || weakest.length === 0) return null;
  const names = weakest.map(({ id }) => nameParameter(words, id));
  const measure = index === null ? '' : ` (collinearity index ${words.numbers.users(index)})`;
  if (weakest.length === 1)
    return sentence(`Of all strengths the history tells ${names[0]} least${measure}.`);
  const move = weakest.every(({ weight }) => weight > 0)
    ? `${weakest.length === 2 ? 'both' : 'all'} raised together`
    : `moved against each other (${weakest.map(({ weight }, i) => `${names[i]} ${weight > 0 ? 'up' : 'down'}`).join(', ')})`;
  return sentence(
    `What the history tells apart least: ${listWords(names)}. ${capitalise(move)}, they leave the past nearly as it was${measure}.`,
  );
}

function writeSignPattern(words: Words, { patterns, cells }: SignPattern): Sentence {
  const { chance } = words.numbers;
  const [top, second] = [...cells].sort((a, b) => b.odds - a.odds);
  const competition = patterns.find(({ id }) => id === 'competition')!;
  if (top.odds > LIKELY_ABOVE) {
    const assumed =
      competition.odds > LIKELY_ABOVE || (top.onFocal !== 'gives' && top.onRival !== 'gives')
        ? ''
        : ' The outlook above assumes that no firm helps the other.';
    return sentence(
      `Is it competition at all? Allowed to help as well as to harm, ${describeCell(words, top.onFocal, top.onRival)} (odds ${chance(top.odds)}).${assumed}`,
    );
  }
  return sentence(
    `Whether it is competition at all is not settled. The counts fit best if ${describeCell(words, top.onFocal, top.onRival)} (odds ${chance(top.odds)}) or ${describeCell(words, second.onFocal, second.onRival)} (${chance(second.odds)}). The outlook above assumes that no firm helps the other.`,
  );
}

/** A clause: what each firm does to the other's room. */
function describeCell(words: Words, onFocal: Effect, onRival: Effect): string {
  const { focal, rival } = words;
  if (onFocal === onRival) {
    return {
      takes: 'each firm takes room from the other',
      gives: 'each firm makes room for the other',
      none: 'neither firm touches the other’s room',
    }[onFocal];
  }
  const act = (actor: string, target: string, effect: Effect) =>
    ({
      takes: `${actor} takes room from ${target}`,
      gives: `${actor} makes room for ${target}`,
      none: `${actor} leaves ${target} alone`,
    })[effect];
  // the stronger claim first
  const onFocalFirst = onFocal === 'takes' || onRival === 'none';
  const [first, then] = [act(rival, focal, onFocal), act(focal, rival, onRival)];
  return onFocalFirst ? `${first} and ${then}` : `${then} and ${first}`;
}
