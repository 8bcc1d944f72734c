/** What pushes are worth, in sentences and one table. Amounts show the digits that their interval supports; nothing is converted. */
import type { ScenarioComparison } from '../scenario/comparison';
import type { FirmMoney, MoneyResult } from '../scenario/money';
import type { Width } from './number-format';
import { possessive, sentence } from './text';
import type { FigureTable, Sentence } from './types';
import type { Words } from './words';

const UNIT_SPACE = '\u00a0';
/** In a cell that has nothing to say. */
const NOTHING = '–';

/** "12,000 EUR". */
export function spellMoney(words: Words, amount: number, currency: string, width?: Width): string {
  return `${words.numbers.number(amount, width)}${UNIT_SPACE}${currency}`;
}

/** Our own pushes first, then all pushes together, then the rival's side where its margin is known. */
export function writeMoney(words: Words, money: MoneyResult): Sentence[] {
  const { focal, focalAnswer, rival, assumed, months } = money;
  const sentences: Sentence[] = [];
  if (focalAnswer) {
    sentences.push(
      sentence(
        valueSentence(
          words,
          `With ${possessive(words.rival)} pushes as they are, ${possessive(words.focal)} own are`,
          focalAnswer,
          money,
        ),
      ),
      ...paybackSentences(words, focalAnswer),
      sentence(
        valueSentence(
          words,
          `Against no push by either firm, all together are to ${words.focal}`,
          focal,
          money,
        ),
      ),
    );
  } else {
    sentences.push(
      sentence(valueSentence(words, `To ${words.focal} this is`, focal, money)),
      ...paybackSentences(words, focal),
    );
  }
  if (rival) sentences.push(sentence(valueSentence(words, `To ${words.rival} it is`, rival, money)));
  sentences.push(
    sentence(
      `Counted over ${spellMonths(months)}, discounted at ${words.numbers.percent(assumed.discountRatePerYear)} a year; what comes after is not counted.`,
    ),
  );
  return sentences;
}

function valueSentence(words: Words, subject: string, firm: FirmMoney, { assumed }: MoneyResult): string {
  const { currency } = assumed;
  const interval = `90\u00a0% interval ${words.numbers.numberInterval(firm.value)}`;
  const spend = firm.spend > 0 ? `, after ${spellMoney(words, firm.spend, currency)} of spending` : '';
  const chance = `; the chance that this is positive is ${words.numbers.chance(firm.chancePositive)}`;
  return `${subject} worth ${spellMoney(words, firm.expectedValue, currency, firm.value)} on average (${interval})${spend}${chance}.`;
}

function paybackSentences(words: Words, { spend, paybackMonths, chancePositive }: FirmMoney): Sentence[] {
  if (!(spend > 0)) return [];
  if (!paybackMonths) return [sentence('The money does not come back within the months counted.')];
  const when = `${spellMonths(paybackMonths.q50)}${spellSpread(paybackMonths)}`;
  const chance = words.numbers.chance(chancePositive);
  return [sentence(`The money is back after ${when}, in the ${chance} of the draws in which it comes back.`)];
}

/** One row per scenario, the focal firm's side. */
export function tabulateMoney(
  words: Words,
  scenarios: readonly { name: string; comparison: ScenarioComparison }[],
): FigureTable {
  const told = scenarios.flatMap(({ name, comparison: { money } }) => (money ? [{ name, money }] : []));
  return {
    title: `What it is worth to ${words.focal}`,
    columns: [
      'Scenario',
      'Spend',
      'Margin gained',
      'Value',
      'Value, 90\u00a0%',
      'Chance positive',
      'Money back after',
    ],
    rows: told.map(({ name, money: { focal, focalAnswer, assumed } }) => {
      const { spend, gain, value, expectedValue, chancePositive, paybackMonths } = focalAnswer ?? focal;
      return [
        focalAnswer ? `${name} (own pushes)` : name,
        spend > 0 ? spellMoney(words, spend, assumed.currency) : NOTHING,
        spellMoney(words, gain.q50, assumed.currency, gain),
        spellMoney(words, expectedValue, assumed.currency, value),
        words.numbers.numberInterval(value),
        words.numbers.chance(chancePositive),
        paybackMonths ? `${spellMonths(paybackMonths.q50)}${spellSpread(paybackMonths)}` : NOTHING,
      ];
    }),
    raw: told.map(({ name, money: { focal, focalAnswer } }) => {
      const { spend, gain, value, expectedValue, chancePositive, paybackMonths } = focalAnswer ?? focal;
      return [
        name,
        spend,
        gain.q50,
        expectedValue,
        `${value.q05} to ${value.q95}`,
        chancePositive,
        paybackMonths?.q50 ?? '',
      ];
    }),
  };
}

/** Whole months. */
function spellMonths(months: number): string {
  const whole = Math.round(months);
  return `${whole} ${whole === 1 ? 'month' : 'months'}`;
}

/** " (6 to 15)"; nothing when all draws agree. */
function spellSpread({ q05, q95 }: Width): string {
  const [from, to] = [Math.round(q05), Math.round(q95)];
  return from === to ? '' : ` (${from} to ${to})`;
}
