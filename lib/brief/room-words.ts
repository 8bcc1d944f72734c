/**
 * Competition coefficients in words: alpha is the part of the focal firm's room that a full rival takes, beta the reverse;
 * 1 is all of it. Intervals that run very low or very high are said as one-sided.
 */
import type { Interval } from '../forecast/report';
import type { Words } from './words';

/** Below this part the lower end of an interval reads as "up to". */
const NONE_BELOW = 0.02;
/** Above this part the upper end of an interval reads as "or more". */
const WITHOUT_BOUND_ABOVE = 10;

export function findParameter(words: Words, id: string): Interval {
  const row = words.facts.report.parameters.find((one) => one.id === id);
  if (!row) throw new RangeError(`report.parameters must hold ${id}`);
  return row.posterior;
}

/** A part this close to 1 reads as "about all". */
const ALL_WITHIN = 0.1;

/** "anywhere from 40 to 210 % fits". */
export function spellRoomRange(words: Words, id: 'alpha' | 'beta'): string {
  return `anywhere ${spellRoomInterval(words, findParameter(words, id))} fits`;
}

/** "from 40 to 210 %", "up to 150 %", "above 20 %". */
export function spellRoomInterval(words: Words, room: Interval): string {
  const isFromNone = room.q05 < NONE_BELOW;
  const isUnbounded = room.q95 > WITHOUT_BOUND_ABOVE;
  if (isFromNone && isUnbounded) return 'from nothing to everything';
  if (isFromNone) return `up to ${words.numbers.percent(room.q95, room)}`;
  if (isUnbounded) return `above ${words.numbers.percent(room.q05)}`;
  return `from ${words.numbers.percentInterval(room)}`;
}

/** "hardly any of Quillfern’s room", "about 60 % of ...", "all of ..., 1.6 times over". `whose` is a possessive. */
export function spellRoomTaken(words: Words, room: Interval, whose: string): string {
  if (room.q50 < NONE_BELOW) return `hardly any of ${whose} room`;
  if (Math.abs(room.q50 - 1) <= ALL_WITHIN) return `about all of ${whose} room`;
  if (room.q50 < 1) return `about ${words.numbers.percent(room.q50, room)} of ${whose} room`;
  if (room.q50 > WITHOUT_BOUND_ABOVE) return `all of ${whose} room, many times over`;
  return `all of ${whose} room, ${words.numbers.number(room.q50, room)} times over`;
}
