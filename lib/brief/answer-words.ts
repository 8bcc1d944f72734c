/** The answers of a push in sentences: smallest counter-push, last useful month, break-even spend. */
import type { BreakEven, LastUsefulMonth, Reach, SmallestPush, Target } from '../scenario/answers';
import type { PricedPush } from '../scenario/spend';
import { spellMoney } from './money-words';
import { describePush, firmOfPush } from './push-words';
import { possessive, sentence, strong } from './text';
import type { Sentence } from './types';
import { type FirmRole, otherFirm, type Words } from './words';

function firmOfTarget({ firm }: Target): FirmRole {
  return firm === 1 ? 'focal' : 'rival';
}

/** "Quillfern’s share at 33 % or more in December 2027". */
export function spellTarget(words: Words, target: Target): string {
  const month = words.months.long(words.lastMonth + target.month);
  return `${possessive(words.name(firmOfTarget(target)))} share at ${spellShare(words, target.share)} or more in ${month}`;
}

/** A wished share, as it was set: not rounded to whole percent. */
function spellShare(words: Words, share: number): string {
  return words.numbers.percent(share);
}

/** @param currency label of the money in which a bought push is priced */
export function writeSmallestPush(words: Words, answer: SmallestPush, currency?: string): Sentence[] {
  const { target, reach } = answer;
  const wished = words.numbers.chance(target.chance);
  const keeps = spellTarget(words, target);
  switch (answer.code) {
    case 'not-needed':
      return [
        sentence(
          strong('No counter-push is needed'),
          `: without one the chance of keeping ${keeps} is ${words.numbers.chance(reach.chance)}, and ${wished} was asked for.`,
        ),
      ];
    case 'found':
      return [
        sentence(strong(`${describePush(words, answer.push)}${spellPrice(words, answer.push, currency)}.`)),
        sentence(
          `This is the smallest that keeps ${keeps} with a chance of ${wished}; with 2\u00a0% less the chance is below that.`,
        ),
      ];
    case 'no-size-does':
      return [
        sentence(
          strong('No size does it'),
          `: even the largest looked at (${describePush(words, answer.push)}) keeps ${keeps} with a chance of only ${words.numbers.chance(reach.chance)}.`,
        ),
        bestSentence(words, target, reach),
      ];
  }
}

export function writeLastUsefulMonth(words: Words, answer: LastUsefulMonth): Sentence[] {
  const { target, reach } = answer;
  const wished = words.numbers.chance(target.chance);
  const keeps = spellTarget(words, target);
  const pusher = words.name(firmOfPush(answer.push));
  const monthOf = (ahead: number) => words.months.long(words.lastMonth + ahead);
  switch (answer.code) {
    case 'not-needed':
      return [
        sentence(
          strong('The push is not needed'),
          `: without it the chance of keeping ${keeps} is ${words.numbers.chance(reach.chance)}, and ${wished} was asked for.`,
        ),
      ];
    case 'found':
      return [
        sentence(
          'The last useful month to start is ',
          strong(monthOf(answer.startMonth)),
          `: ${possessive(pusher)} push then keeps ${keeps} with a chance of ${words.numbers.chance(reach.chance)}; in any later month the chance is below ${wished}.`,
        ),
      ];
    case 'no-month-does':
      return [
        sentence(
          strong('No start month does it'),
          `: ${possessive(pusher)} push does best when it starts in ${monthOf(answer.startMonth)}, and then keeps ${keeps} with a chance of only ${words.numbers.chance(reach.chance)}.`,
        ),
        bestSentence(words, target, reach),
      ];
  }
}

function bestSentence(words: Words, target: Target, { shareKept }: Reach): Sentence {
  const rival = words.name(otherFirm(firmOfTarget(target)));
  const kept = words.numbers.chance(shareKept);
  return sentence(
    `The best that can be had with a chance of ${words.numbers.chance(target.chance)} is a share of ${kept} against ${rival}.`,
  );
}

/** ", 4,000 EUR a month"; nothing when the push has no price. */
function spellPrice(words: Words, { spendPerMonth }: PricedPush, currency?: string): string {
  if (spendPerMonth === undefined) return '';
  return `, ${currency ? spellMoney(words, spendPerMonth, currency) : words.numbers.number(spendPerMonth)} a month`;
}

export function writeBreakEven(words: Words, answer: BreakEven): Sentence[] {
  const pusher = possessive(words.name(firmOfPush(answer.push)));
  const spell = (amount: number) => `${spellMoney(words, amount, answer.money.currency)} a month`;
  switch (answer.code) {
    case 'never-pays':
      return [
        sentence(
          strong('It never pays'),
          `: on average, ${pusher} push does not bring back even the first money spent on it.`,
        ),
      ];
    case 'always-pays':
      return [
        sentence(
          `On average ${pusher} push brings back what it costs at any spend that was looked at, up to ${spell(answer.spendPerMonth)}.`,
        ),
      ];
    case 'found': {
      const interval = answer.interval
        ? ` (90\u00a0% interval ${words.numbers.numberInterval(answer.interval)})`
        : '';
      return [
        sentence(
          `On average ${pusher} push brings back what it costs up to `,
          strong(spell(answer.spendPerMonth)),
          `${interval}.`,
        ),
      ];
    }
  }
}
