import { useEffect, useRef, useState } from 'react';

/** Milliseconds without a key before what was typed stands in the address: browsers refuse to rewrite it at every key. */
const TYPING_PAUSE = 300;

/** A change of a list: a step that the way back undoes, or part of one (typing). */
export type Change<View> = (change: Partial<View>, how?: 'step' | 'typing') => void;

/** How a view is read from the query of an address, and written to it. */
export interface AddressForm<View> {
  readonly read: (search: string) => View;
  readonly write: (view: View) => string;
}

/**
 * How a list stands, kept in the address, so that links and the way back work. `search` is what the server drew the
 * list by. Every change but one of the page begins at the first page again.
 */
export function useAddressView<View extends { readonly page: number }>(
  search: string,
  { read, write }: AddressForm<View>,
): readonly [View, Change<View>] {
  const [view, setView] = useState(() => read(search));
  const pause = useRef<ReturnType<typeof setTimeout>>(undefined);

  useEffect(() => {
    const back = (): void => setView(read(location.search));
    addEventListener('popstate', back);
    return () => {
      removeEventListener('popstate', back);
      clearTimeout(pause.current);
    };
  }, [read]);

  const change: Change<View> = (changed, how = 'step') => {
    const next = { ...view, page: 1, ...changed };
    setView(next);
    clearTimeout(pause.current);
    const address = `${location.pathname}${write(next)}`;
    if (how === 'step') history.pushState(null, '', address);
    else pause.current = setTimeout(() => history.replaceState(null, '', address), TYPING_PAUSE);
  };
  return [view, change];
}
