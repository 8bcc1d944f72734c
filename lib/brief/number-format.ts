/**
 * Numbers for reading. Rounding is honest: a number shows the digits that its 90 % interval supports (the rounding step is at most a
 * quarter of the interval's width, and one significant digit always stays), a chance or a forecast share is never shown as certain
 * ("<1 %", ">99 %"), zero has no sign. What is not finite is a caller's mistake and throws.
 */
import {
  createStepSpeller,
  DIGITS_WITHOUT_INTERVAL,
  type StepSpeller,
  shortestExponent,
  stepExponent,
  type Width,
} from './rounding';

export type { Width } from './rounding';

export interface NumberFormat {
  locale: string;
  /** Users as a whole number: "310,000", "<1". */
  users(value: number, width?: Width): string;
  /** "280,000 to 340,000". */
  usersInterval(width: Width): string;
  /** Signed users: "−4,200". */
  usersDifference(value: number, width?: Width): string;
  /** "−9,000 to −800". */
  usersDifferenceInterval(width: Width): string;
  /** A chance over draws, or a forecast share: "88 %", "<1 %" down to 0, ">99 %" up to 1. */
  chance(probability: number): string;
  /** "44 to 61 %", "<1 to 12 %". */
  chanceInterval(width: Width): string;
  /** A share that was observed: 0 and 100 % are possible. */
  seenShare(fraction: number): string;
  /** Difference of shares in points with its sign: "−4 points", "+0.5 points", "about 0 points". */
  points(fraction: number, width?: Width): string;
  /** The same without its sign: "4 points". */
  pointsSize(fraction: number, width?: Width): string;
  /** "−6 to −2 points". */
  pointsInterval(width: Width): string;
  /** A fraction as percent, any size: "62 %". */
  percent(fraction: number, width?: Width): string;
  percentInterval(width: Width): string;
  /** A plain number. */
  number(value: number, width?: Width): string;
  numberInterval(width: Width): string;
  /** A number with as many decimals as asked for, for quantities judged by one of them. */
  decimals(value: number, count: number): string;
  /** Short axis label: "400k", "1.2M". */
  axis(value: number): string;
}

/** Keeps a unit on the line of its number. */
export const UNIT_SPACE = '\u00a0';
export const MINUS = '\u2212';
/** Points of share are told to a tenth at most. */
const POINTS_FINEST = -1;

/** @param locale BCP 47 tag for digits and separators */
export function createNumberFormat(locale: string): NumberFormat {
  const speller = createStepSpeller(locale);
  return {
    locale,
    ...usersFormat(speller),
    ...shareFormat(speller),
    ...pointsFormat(speller),
    ...plainFormat(speller),
    axis: (value) => spellAxis(value, speller),
  };
}

function usersFormat({ spell }: StepSpeller) {
  const exponent = (value: number, width?: Width) => Math.max(0, stepExponent(value, width));
  const spellUsers = (value: number, step: number) =>
    value > 0 && value < 0.5 ? `<${spell(1, 0)}` : spell(value, step, 0);
  const spellDifference = (value: number, width?: Width) => {
    if (value !== 0 && Math.abs(value) < 0.5) return 'about 0';
    return withSign(spell(value, exponent(value, width), 0));
  };
  return {
    users: (value: number, width?: Width) => spellUsers(value, exponent(value, width)),
    usersInterval: (width: Width) => {
      const step = exponent(0, width);
      const [low, high] = [spellUsers(width.q05, step), spellUsers(width.q95, step)];
      return low === high ? low : `${low} to ${high}`;
    },
    usersDifference: spellDifference,
    usersDifferenceInterval: (width: Width) => {
      const [low, high] = [spellDifference(width.q05, width), spellDifference(width.q95, width)];
      return low === high ? low : `${low} to ${high}`;
    },
  };
}

function shareFormat({ spell }: StepSpeller) {
  const bare = (fraction: number) => {
    requireFraction(fraction);
    if (fraction < 0.01) return `<${spell(1, 0)}`;
    if (fraction > 0.99) return `>${spell(99, 0)}`;
    return spell(fraction * 100, 0, 0);
  };
  return {
    chance: (probability: number) => `${bare(probability)}${UNIT_SPACE}%`,
    chanceInterval: (width: Width) => {
      const [low, high] = [bare(width.q05), bare(width.q95)];
      return `${low === high ? low : `${low} to ${high}`}${UNIT_SPACE}%`;
    },
    seenShare: (fraction: number) => {
      const isWhole = fraction === 0 || fraction === 1;
      return `${isWhole ? spell(fraction * 100, 0) : bare(fraction)}${UNIT_SPACE}%`;
    },
  };
}

function pointsFormat({ spell, spellRange }: StepSpeller) {
  const exponent = (percent: number, width?: Width) => {
    if (!width) return Math.abs(percent) < 1 ? POINTS_FINEST : 0;
    return Math.max(POINTS_FINEST, Math.min(0, stepExponent(percent, width)));
  };
  const spellPoints = (fraction: number, width: Width | undefined, decorate: (text: string) => string) => {
    const percent = fraction * 100;
    if (percent === 0) return `${spell(0, 0)}${UNIT_SPACE}points`;
    const text = spell(percent, exponent(percent, width && scaleWidth(width, 100)), POINTS_FINEST);
    if (isZero(text)) return `about 0${UNIT_SPACE}points`;
    const isOne = text === spell(1, 0) || text === spell(-1, 0);
    return `${decorate(text)}${UNIT_SPACE}${isOne ? 'point' : 'points'}`;
  };
  return {
    points: (fraction: number, width?: Width) => spellPoints(fraction, width, withSign),
    pointsSize: (fraction: number, width?: Width) =>
      spellPoints(fraction, width, (text) => text.replace(MINUS, '')),
    pointsInterval: (width: Width) => {
      const percent = scaleWidth(width, 100);
      const step = exponent(0, percent);
      const isNothing = [percent.q05, percent.q95].every((end) => isZero(spell(end, step, POINTS_FINEST)));
      if (isNothing) return `${width.q05 === 0 && width.q95 === 0 ? '' : 'about '}0${UNIT_SPACE}points`;
      return `${spellRange(percent.q05, percent.q95, step, POINTS_FINEST, withSign)}${UNIT_SPACE}points`;
    },
  };
}

function plainFormat({ spell, spellRange }: StepSpeller) {
  const exponent = (value: number, width?: Width) =>
    width ? stepExponent(value, width) : shortestExponent(value, DIGITS_WITHOUT_INTERVAL);
  const percentExponent = (value: number, width?: Width) => Math.min(1, exponent(value, width));
  return {
    decimals: (value: number, count: number) => spell(value, -count, -count),
    percent: (fraction: number, width?: Width) =>
      `${spell(fraction * 100, percentExponent(fraction * 100, width && scaleWidth(width, 100)))}${UNIT_SPACE}%`,
    percentInterval: (width: Width) => {
      const percent = scaleWidth(width, 100);
      return `${spellRange(percent.q05, percent.q95, percentExponent(0, percent))}${UNIT_SPACE}%`;
    },
    number: (value: number, width?: Width) => spell(value, exponent(value, width)),
    numberInterval: (width: Width) => spellRange(width.q05, width.q95, exponent(0, width)),
  };
}

function scaleWidth(width: Width, factor: number): Width {
  return { q05: width.q05 * factor, q95: width.q95 * factor };
}

function requireFraction(fraction: number): void {
  if (!(fraction >= 0 && fraction <= 1)) {
    throw new RangeError(`a chance or share must be between 0 and 1, got ${fraction}`);
  }
}

function isZero(text: string): boolean {
  return !/[1-9]/.test(text);
}

/** "+4"; a number that rounds to 0 has neither sign nor decimals. */
function withSign(text: string): string {
  if (isZero(text)) return text.replace(MINUS, '').replace(/[.,]0+$/, '');
  return text.startsWith(MINUS) ? text : `+${text}`;
}

const AXIS_UNITS: [number, string][] = [
  [1e9, 'bn'],
  [1e6, 'M'],
  [1e3, 'k'],
];
/** Most significant digits of an axis label. */
const AXIS_DIGITS = 3;

function spellAxis(value: number, { spell }: StepSpeller): string {
  const [size, unit] = AXIS_UNITS.find(([limit]) => Math.abs(value) >= limit) ?? [1, ''];
  const scaled = value / size;
  return spell(scaled, shortestExponent(scaled, AXIS_DIGITS)) + unit;
}
