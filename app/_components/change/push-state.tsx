'use client';

/** The push that is being tried: one draft for the controls, the figures, saving and issuing. */
import { createContext, type ReactNode, useContext, useMemo, useState } from 'react';
import { LOCALE } from '@/app/_lib/locale';
import { createMonthFormat } from '@/lib/brief/month-words';
import { createNumberFormat } from '@/lib/brief/number-format';
import type { Push } from '@/lib/dynamics/push';
import { firstDraft, type PushDraft, toPush, wordPush } from './push-draft';
import type { PushMarket } from './push-market';

interface PushState {
  market: PushMarket;
  draft: PushDraft;
  change: (change: Partial<PushDraft>) => void;
  /** null: nothing is pushed. */
  push: Push | null;
  /** What is pushed, in a few words: the name of its scenario. */
  name: string;
}

const PushContext = createContext<PushState | null>(null);

interface PushProviderProps {
  market: PushMarket;
  children: ReactNode;
}

export function PushProvider({ market, children }: PushProviderProps) {
  const [draft, setDraft] = useState(() => firstDraft(market));
  const state = useMemo<PushState>(
    () => ({
      market,
      draft,
      change: (change) => setDraft((known) => ({ ...known, ...change })),
      push: toPush(draft),
      name: wordPush(draft, market, createNumberFormat(LOCALE), createMonthFormat(LOCALE)),
    }),
    [market, draft],
  );
  return <PushContext value={state}>{children}</PushContext>;
}

/** @throws outside a PushProvider */
export function usePush(): PushState {
  const state = useContext(PushContext);
  if (!state) throw new Error('usePush: no PushProvider above');
  return state;
}
