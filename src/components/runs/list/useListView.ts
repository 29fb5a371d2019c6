import { useEffect, useRef, useState } from 'react';
import { type ListView, readView, writeView } from './list-view';

/** Milliseconds without a key before what was typed stands in the address: browsers refuse to rewrite it at every key. */
const TYPING_PAUSE = 300;

/** A change of the list: a step that the way back undoes, or part of one (typing). */
export type Change = (change: Partial<ListView>, how?: 'step' | 'typing') => void;

/** How the list stands, kept in the address. `search` is what the server drew the list by. */
export function useListView(search: string): readonly [ListView, Change] {
  const [view, setView] = useState(() => readView(search));
  const pause = useRef<ReturnType<typeof setTimeout>>(undefined);

  useEffect(() => {
    const back = (): void => setView(readView(location.search));
    addEventListener('popstate', back);
    return () => {
      removeEventListener('popstate', back);
      clearTimeout(pause.current);
    };
  }, []);

  const change: Change = (changed, how = 'step') => {
    const next = { ...view, page: 1, ...changed };
    setView(next);
    clearTimeout(pause.current);
    const address = `${location.pathname}${writeView(next)}`;
    if (how === 'step') history.pushState(null, '', address);
    else pause.current = setTimeout(() => history.replaceState(null, '', address), TYPING_PAUSE);
  };
  return [view, change];
}
