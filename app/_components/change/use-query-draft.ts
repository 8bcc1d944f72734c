'use client';

/**
 * Keeps the draft in the address of the page, so that a reload, the back button and a shared address bring it back. An address that
 * cannot be read is left alone: the draft then begins as without one.
 */
import { useEffect, useRef } from 'react';
import type { ScenarioDraft } from './scenario-draft';

/** The address follows when the hand rests. */
const PAUSE_MS = 300;
/** What the query of a scenario uses; other parts of an address stay. */
const NAMES = ['push', 'money', 'name'];

/** The reading and writing of the query carries the validator: it is fetched when there is something to read or write. */
const loadQuery = () => import('@/lib/scenario/scenario-query');

/** @param onFound takes what the address holds, on arrival and on the way back; null: the address is not looked at */
export function useQueryDraft(
  draft: ScenarioDraft,
  isChanged: boolean,
  onFound: ((draft: ScenarioDraft) => void) | null,
): void {
  const written = useRef<string | null>(null);

  useEffect(() => {
    if (!onFound) return;
    const read = async () => {
      const { search } = window.location;
      if (!new URLSearchParams(search).has('push') || search === written.current) return;
      const { readScenarioQuery } = await loadQuery();
      const found = readScenarioQuery(search);
      if (!found) return;
      written.current = search;
      onFound({ pushes: found.pushes, open: 0, money: found.money });
    };
    read();
    window.addEventListener('popstate', read);
    return () => window.removeEventListener('popstate', read);
  }, [onFound]);

  useEffect(() => {
    if (!onFound || !isChanged) return;
    const timer = setTimeout(async () => {
      const { writeScenarioQuery } = await loadQuery();
      const query = new URLSearchParams(window.location.search);
      for (const name of NAMES) query.delete(name);
      const own = writeScenarioQuery({ name: '', pushes: draft.pushes, money: draft.money });
      for (const [name, value] of new URLSearchParams(own)) query.append(name, value);
      const search = query.size > 0 ? `?${query}` : '';
      written.current = search;
      window.history.replaceState(null, '', `${window.location.pathname}${search}${window.location.hash}`);
    }, PAUSE_MS);
    return () => clearTimeout(timer);
  }, [draft, isChanged, onFound]);
}
