'use client';

/** The scenario that is being tried: one draft for the controls, the figures, keeping and issuing; written into the address of the page. */
import { createContext, type ReactNode, useCallback, useContext, useMemo, useState } from 'react';
import { LOCALE } from '@/app/_lib/locale';
import type { BriefFacts } from '@/lib/brief/facts';
import { createWords, type Words } from '@/lib/brief/words';
import type { MarketScale } from '@/lib/scenario/push-limits';
import type { PricedPush } from '@/lib/scenario/spend';
import type { CounterQuestion } from './counter-form';
import { readMarketScale } from './market-scale';
import {
  type DraftHistory,
  firstDraft,
  listPushes,
  nameScenario,
  redo,
  type ScenarioDraft,
  startHistory,
  takeStep,
  undo,
} from './scenario-draft';
import { useQueryDraft } from './use-query-draft';

interface ScenarioState {
  facts: BriefFacts;
  words: Words;
  scale: MarketScale;
  draft: ScenarioDraft;
  /** @param step what is changed, so that the moves of one slider are undone at once; null: a step of its own */
  change: (next: (draft: ScenarioDraft) => ScenarioDraft, step?: string | null) => void;
  undo: (() => void) | null;
  redo: (() => void) | null;
  /** Those that push. */
  pushes: PricedPush[];
  /** What is pushed, in a few words; empty when nothing is. */
  name: string;
  /** The last question about a counter-push that was looked for; null: none yet. */
  asked: CounterQuestion | null;
  setAsked: (question: CounterQuestion) => void;
}

const ScenarioContext = createContext<ScenarioState | null>(null);

interface ScenarioProviderProps {
  facts: BriefFacts;
  /** Where to begin; absent: a first push, or what the address of the page says. */
  start?: ScenarioDraft;
  children: ReactNode;
}

export function ScenarioProvider({ facts, start, children }: ScenarioProviderProps) {
  const words = useMemo(() => createWords(facts, LOCALE), [facts]);
  const scale = useMemo(() => readMarketScale(facts), [facts]);
  const [history, setHistory] = useState<DraftHistory>(() => startHistory(start ?? firstDraft(scale)));
  const [asked, setAsked] = useState<CounterQuestion | null>(null);
  const isChanged = history.past.length > 0 || history.future.length > 0;
  const reset = useCallback((draft: ScenarioDraft) => setHistory(startHistory(draft)), []);
  useQueryDraft(history.now, isChanged, start ? null : reset);

  const change = useCallback<ScenarioState['change']>(
    (next, step = null) => setHistory((known) => takeStep(known, next(known.now), step)),
    [],
  );
  const state = useMemo<ScenarioState>(() => {
    const pushes = listPushes(history.now);
    const back = undo(history);
    const forth = redo(history);
    return {
      facts,
      words,
      scale,
      draft: history.now,
      change,
      undo: back && (() => setHistory(back)),
      redo: forth && (() => setHistory(forth)),
      pushes,
      name: nameScenario(words, pushes),
      asked,
      setAsked,
    };
  }, [facts, words, scale, history, change, asked]);
  return <ScenarioContext value={state}>{children}</ScenarioContext>;
}

/** @throws outside a ScenarioProvider */
export function useScenario(): ScenarioState {
  const state = useContext(ScenarioContext);
  if (!state) throw new Error('useScenario: no ScenarioProvider above');
  return state;
}
