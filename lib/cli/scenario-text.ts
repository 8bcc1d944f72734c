/** What `elbowroom scenario FILE` prints for people: each scenario in the words of the page, then all of them side by side. */
import { writeBreakEven, writeLastUsefulMonth, writeSmallestPush } from '../brief/answer-words';
import { writeCautions } from '../brief/cautions';
import type { BriefFacts } from '../brief/facts';
import { writeMoney } from '../brief/money-words';
import { buildPushBrief } from '../brief/push-brief';
import { describePush } from '../brief/push-words';
import { buildSideBySide } from '../brief/side-by-side';
import { plainText } from '../brief/text';
import type { FigureTable, Sentence } from '../brief/types';
import { createWords, type Words } from '../brief/words';
import type { ComparedScenario } from './run-scenario';
import { renderTable, wrapText } from './text-layout';

export function renderScenarios(facts: BriefFacts, scenarios: readonly ComparedScenario[]): string {
  const words = createWords(facts);
  const blocks = scenarios.flatMap((scenario) => renderScenario(words, scenario));
  if (scenarios.length > 1) blocks.push(renderFigureTable(buildSideBySide(scenarios, facts).table));
  const cautions = writeCautions(words, true).map(({ text }) => wrapText(`- ${text}`, 2));
  blocks.push(section('Cautions', cautions.join('\n')));
  return `${blocks.join('\n\n')}\n`;
}

function renderScenario(words: Words, { name, comparison, answers }: ComparedScenario): string[] {
  const { pushes, money } = comparison;
  const brief = buildPushBrief(comparison, words.facts, words.locale);
  const { smallestPush, lastUsefulMonth, breakEven } = answers;
  const currency = money?.assumed.currency;
  return [
    [name, ...pushes.map((push) => wrapText(`- ${describePush(words, push)}`, 2))].join('\n'),
    renderSentences(brief.sentences),
    section(
      'Odds before and after',
      renderTable(brief.odds.map(({ label, before, after }) => [label, before, after])),
    ),
    ...(comparison.checkpoints.length > 0 ? [renderFigureTable(brief.checkpoints)] : []),
    ...(money ? [section('Money', renderSentences(writeMoney(words, money)))] : []),
    ...(smallestPush
      ? [section('Smallest counter-push', renderSentences(writeSmallestPush(words, smallestPush, currency)))]
      : []),
    ...(lastUsefulMonth
      ? [section('Last useful month', renderSentences(writeLastUsefulMonth(words, lastUsefulMonth)))]
      : []),
    ...(breakEven ? [section('Break-even spend', renderSentences(writeBreakEven(words, breakEven)))] : []),
  ];
}

function renderSentences(sentences: readonly Sentence[]): string {
  return sentences.map((one) => wrapText(plainText(one))).join('\n');
}

function renderFigureTable({ title, columns, rows }: FigureTable): string {
  return section(title, renderTable([columns, ...rows]));
}

function section(title: string, body: string): string {
  return `${title}\n${body}`;
}
