/** The frozen answers of a scenario in words. */
import { writeBreakEven, writeLastUsefulMonth, writeSmallestPush } from '../brief/answer-words';
import { buildChanceMapView, type ChanceMapView } from '../brief/chance-map-view';
import type { Sentence } from '../brief/types';
import type { Words } from '../brief/words';
import type { Answers } from '../scenario/answers';

/** Empty or null where the question was not asked. */
export interface OpenedAnswers {
  smallestPush: Sentence[];
  lastUsefulMonth: Sentence[];
  breakEven: Sentence[];
  chanceMap: ChanceMapView | null;
}

export function openAnswers(words: Words, answers: Answers, currency: string | undefined): OpenedAnswers {
  const { smallestPush, lastUsefulMonth, breakEven, chanceMap } = answers;
  return {
    smallestPush: smallestPush ? writeSmallestPush(words, smallestPush, currency) : [],
    lastUsefulMonth: lastUsefulMonth ? writeLastUsefulMonth(words, lastUsefulMonth) : [],
    breakEven: breakEven ? writeBreakEven(words, breakEven) : [],
    chanceMap: chanceMap ? buildChanceMapView(words, chanceMap) : null,
  };
}
