'use client';

/** The push that is being tried: one draft for the controls, the figures, saving and issuing. */
import { createContext, type ReactNode, useContext, useMemo, useState } from 'react';
import { LOCALE } from '@/app/_lib/locale';
import type { BriefFacts } from '@/lib/brief/facts';
import { createWords, type Words } from '@/lib/brief/words';
import type { Push } from '@/lib/dynamics/push';
import type { MarketScale } from '@/lib/scenario/push-limits';
import { readMarketScale } from './market-scale';
import { firstDraft, namePush, type PushDraft, toPush } from './push-draft';

interface PushState {
  facts: BriefFacts;
  words: Words;
  scale: MarketScale;
  draft: PushDraft;
  change: (change: Partial<PushDraft>) => void;
  /** null: nothing is pushed. */
  push: Push | null;
  /** What is pushed, in a few words: the name of its scenario. */
  name: string;
}

const PushContext = createContext<PushState | null>(null);

interface PushProviderProps {
  facts: BriefFacts;
  children: ReactNode;
}

export function PushProvider({ facts, children }: PushProviderProps) {
  const words = useMemo(() => createWords(facts, LOCALE), [facts]);
  const scale = useMemo(() => readMarketScale(facts), [facts]);
  const [draft, setDraft] = useState(() => firstDraft(scale));
  const state = useMemo<PushState>(() => {
    const push = toPush(draft);
    return {
      facts,
      words,
      scale,
      draft,
      change: (change) => setDraft((known) => ({ ...known, ...change })),
      push,
      name: push ? namePush(words, push) : '',
    };
  }, [facts, words, scale, draft]);
  return <PushContext value={state}>{children}</PushContext>;
}

/** @throws outside a PushProvider */
export function usePush(): PushState {
  const state = useContext(PushContext);
  if (!state) throw new Error('usePush: no PushProvider above');
  return state;
}
