/**
 * The parameters in plain units with 90 % intervals:
 *   growth rate r per month        -> (e^r - 1) in percent a month and doubling time ln 2 / r, when small and alone
 *   saturation level K             -> users when alone
 *   alpha, beta                    -> part of the other's room that a full firm takes
 *   a12 = alpha K1/K2, a21 = ...   -> places of one firm that one user of the other takes
 */
import type { Interval, ParameterRow } from '../forecast/report';
import { spellRoomInterval, spellRoomTaken } from './room-words';
import { joinSentences, possessive, sentence } from './text';
import type { FigureTable, ParameterLine, ParameterTable, Sentence } from './types';
import { type FirmRole, otherFirm, type Words } from './words';

/** Contraction from which a parameter comes mostly, or partly, from the data. 0.75: the interval is half as wide as before. */
const MOSTLY_FROM_DATA = 0.75;
const PARTLY_FROM_DATA = 0.3;

const ORDER: ParameterRow['id'][] = ['r1', 'r2', 'k1', 'k2', 'alpha', 'beta', 'a12', 'a21'];

export function buildParameterTable(words: Words): ParameterTable {
  const rows = ORDER.flatMap((id) => words.facts.report.parameters.filter((row) => row.id === id));
  return {
    rows: rows.map((row) => describeParameter(words, row)),
    caption: captionParameters(words),
    table: tabulate(words, rows),
  };
}

/** "Quillfern’s saturation level", for sentences. */
export function nameParameter(words: Words, id: string): string {
  const { focal, rival } = words;
  const names: Record<string, string> = {
    r1: `${possessive(focal)} growth when small`,
    r2: `${possessive(rival)} growth when small`,
    k1: `${possessive(focal)} saturation level`,
    k2: `${possessive(rival)} saturation level`,
    alpha: `the room that ${rival} takes from ${focal}`,
    beta: `the room that ${focal} takes from ${rival}`,
    a12: `what one ${rival} user takes from ${focal}`,
    a21: `what one ${focal} user takes from ${rival}`,
    n1Start: `${possessive(focal)} level at the start`,
    n2Start: `${possessive(rival)} level at the start`,
  };
  return names[id] ?? id;
}

function describeParameter(words: Words, row: ParameterRow): ParameterLine {
  const firm = firmOf(row.id);
  const describe = { r: describeGrowth, k: describeSaturation, c: describeRoom, a: describePlaces }[
    familyOf(row.id)
  ];
  return {
    id: row.id,
    firm,
    ...describe(words, firm, row.posterior),
    learnt: describeLearning(row.contraction),
  };
}

type Family = 'r' | 'k' | 'c' | 'a';

function familyOf(id: ParameterRow['id']): Family {
  return id === 'alpha' || id === 'beta' ? 'c' : (id.charAt(0) as Family);
}

/** The firm that a parameter belongs to: whose growth, whose level, whose room is taken. */
function firmOf(id: ParameterRow['id']): FirmRole {
  return id === 'r1' || id === 'k1' || id === 'alpha' || id === 'a12' ? 'focal' : 'rival';
}

type Description = Pick<ParameterLine, 'label' | 'value' | 'interval' | 'meaning'>;

function describeGrowth(words: Words, firm: FirmRole, r: Interval): Description {
  const monthly = mapInterval(r, Math.expm1);
  const doubling = { q05: Math.LN2 / r.q95, q50: Math.LN2 / r.q50, q95: Math.LN2 / r.q05 };
  return {
    label: `${possessive(words.name(firm))} growth when small`,
    value: `${words.numbers.percent(monthly.q50, monthly)} a month`,
    interval: words.numbers.percentInterval(monthly),
    meaning: `small and alone it doubles in ${words.numbers.number(doubling.q50, doubling)} months`,
  };
}

function describeSaturation(words: Words, firm: FirmRole, level: Interval): Description {
  return {
    label: `${possessive(words.name(firm))} saturation level`,
    value: words.numbers.users(level.q50, level),
    interval: words.numbers.usersInterval(level),
    meaning: `${words.facts.market.unit} at which it would level off alone`,
  };
}

function describeRoom(words: Words, firm: FirmRole, room: Interval): Description {
  const [own, taker] = [words.name(firm), words.name(otherFirm(firm))];
  return {
    label: `Room that ${taker} takes from ${own}`,
    value: words.numbers.percent(room.q50, room),
    interval: spellRoomInterval(words, room).replace(/^from (?=\S+ to)/, ''),
    meaning: `a full ${taker} takes ${spellRoomTaken(words, room, possessive(own))}`,
  };
}

function describePlaces(words: Words, firm: FirmRole, places: Interval): Description {
  const [own, taker] = [words.name(firm), words.name(otherFirm(firm))];
  const value = words.numbers.number(places.q50, places);
  return {
    label: `${own} places per ${taker} user`,
    value,
    interval: words.numbers.numberInterval(places),
    meaning: `one ${taker} user takes the room of ${value} ${own} ${value === '1' ? 'user' : 'users'}`,
  };
}

function describeLearning(contraction: number): string {
  if (contraction >= MOSTLY_FROM_DATA) return 'mostly from the data';
  return contraction >= PARTLY_FROM_DATA ? 'partly from the data' : 'little from the data';
}

function captionParameters(words: Words): Sentence {
  const guesses = words.facts.report.parameters.filter(
    (row) => ORDER.indexOf(row.id) < 6 && row.contraction < PARTLY_FROM_DATA,
  );
  const parts = [sentence('Middle of the draws and the interval that holds nine in ten of them.')];
  if (guesses.length > 0) {
    const count = guesses.length === 1 ? 'One row rests' : `${guesses.length} rows rest`;
    parts.push(sentence(`${count} more on what was assumed before than on the data.`));
  }
  return joinSentences(parts);
}

function tabulate(words: Words, rows: ParameterRow[]): FigureTable {
  const lines = rows.map((row) => describeParameter(words, row));
  return {
    title: 'Parameters',
    columns: ['Parameter', 'Value', '90\u00a0% interval', 'In words', 'Learnt'],
    rows: lines.map((line) => [line.label, line.value, line.interval, line.meaning, line.learnt]),
    raw: rows.map(({ id, posterior, contraction }) => [
      id,
      posterior.q50,
      posterior.q05,
      posterior.q95,
      contraction,
    ]),
  };
}

/** Applies a rising function to all three numbers. */
function mapInterval(interval: Interval, change: (value: number) => number): Interval {
  return { q05: change(interval.q05), q50: change(interval.q50), q95: change(interval.q95) };
}
