import { type RefObject, useCallback, useEffect, useRef, useState } from 'react';
import {
  type Command,
  command,
  type Deed,
  type Entry,
  enter,
  FRESH,
  type Ground,
  leave,
  type Outcome,
  typeIn,
} from './console';
import type { LiveRun } from './useRun';

export interface EntryControl {
  readonly entry: Entry;
  readonly input: RefObject<HTMLInputElement | null>;
  readonly onType: (text: string, pasted: boolean) => void;
  readonly onEnter: () => void;
  readonly onLeave: () => void;
  readonly onCommand: (name: Command) => void;
  readonly focus: () => void;
}

/** Whether a key pressed somewhere is meant for what has the focus and not for the line. */
function takesKeys(target: EventTarget | null): boolean {
  return (
    target instanceof Element && target.closest('input, textarea, select, button, a, summary, dialog, .ladder') !== null
  );
}

/** The entry line of a live run: what is typed is judged and logged at once, and the focus stays in it. */
export function useEntry(run: LiveRun, onDeed: (deed: Deed) => void): EntryControl {
  const [entry, setEntry] = useState<Entry>(FRESH);
  const input = useRef<HTMLInputElement>(null);
  const ground: Ground = { layout: run.layout, reversed: run.rows.at(-1)?.reversed ?? false };
  const focus = useCallback(() => input.current?.focus(), []);

  const take = (outcome: Outcome): void => {
    setEntry(outcome.entry);
    if (outcome.step) run.log(outcome.step, outcome.note ?? '');
    if (outcome.deed) onDeed(outcome.deed);
    else focus();
  };

  useEffect(() => {
    focus();
    const onKeyDown = (event: globalThis.KeyboardEvent): void => {
      if (event.ctrlKey || event.metaKey || event.altKey) return;
      const inLadder = event.target instanceof Element && event.target.closest('.ladder') !== null;
      if (event.key === '?' && (inLadder || !takesKeys(event.target))) {
        event.preventDefault();
        onDeed('keys');
      } else if (/^[\d~/]$/u.test(event.key) && (inLadder || !takesKeys(event.target))) focus();
    };
    addEventListener('keydown', onKeyDown);
    return () => removeEventListener('keydown', onKeyDown);
  }, [focus, onDeed]);

  return {
    entry,
    input,
    focus,
    onType: (text, pasted) => take(typeIn(entry, text, ground, pasted)),
    onEnter: () => take(enter(entry, ground)),
    onLeave: () => take(leave(entry)),
    onCommand: (name) => take(command(entry, name, ground)),
  };
}
