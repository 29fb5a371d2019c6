import { useEffect, useMemo, useRef, useState, useSyncExternalStore } from 'react';
import { v7 } from 'uuid';
import { createRowBuilder, type LadderRow, type RowBuilder } from '@/components/ladder/rows';
import { type Answer, problemWords } from '@/lib/client/call';
import { Outbox, type OutboxState } from '@/lib/client/outbox';
import { browserStorage, shelfFor, type Unsaved } from '@/lib/client/unsaved';
import type { Layout } from '@/lib/mechanism/layout';
import type { Reading, Step } from '@/lib/mechanism/steps';
import type { Logged } from '@/lib/schemas/run-shapes';
import { ladderEntry } from '../ladder-entries';
import { type Kept, keptOf, unpackEntries } from '../pack';
import { type RunCalls, runCalls } from '../run-calls';
import { layoutOf, type RunProps } from '../run-props';
import { momentNow } from '../times';

/** A run under the tester's hand: its rows, what is saved, and everything that can be done with it. */
export interface LiveRun {
  readonly layout: Layout;
  readonly rows: readonly LadderRow[];
  readonly saving: OutboxState;
  readonly log: (step: Step, note: string) => void;
  /** Null when it is done, else why not. */
  readonly takeBack: (seq: number, reason: string) => Promise<string | null>;
  readonly correct: (seq: number, reading: Reading, reason: string) => Promise<string | null>;
  readonly finish: () => Promise<string | null>;
  readonly remove: () => Promise<string | null>;
  /** Goes on after the server has refused: behind what came from elsewhere, or without what was typed here. */
  readonly again: () => void;
  readonly putAfter: () => Promise<string | null>;
  readonly discard: () => Promise<string | null>;
}

/** Rows and the steps they are made of, kept together: a row is made once, and all of them anew after a change. */
class Book {
  kept: Kept[];
  rows: readonly LadderRow[] = [];
  #builder: RowBuilder;

  constructor(
    readonly layout: Layout,
    readonly run: RunProps,
    kept: Kept[],
  ) {
    this.kept = kept;
    this.#builder = createRowBuilder(layout, run);
    this.rebuild();
  }

  get nextSeq(): number {
    return this.kept.length + 1;
  }

  add(one: Kept): void {
    this.kept.push(one);
    this.rows = [...this.rows, this.#builder.take(ladderEntry(one, this.run.zone))];
  }

  rebuild(kept: Kept[] = this.kept): void {
    this.kept = kept;
    this.#builder = createRowBuilder(this.layout, this.run);
    this.rows = kept.map((one) => this.#builder.take(ladderEntry(one, this.run.zone)));
  }

  /** Takes over what the server stored; whether the rows must be made anew is the caller's to say. */
  take({ entries }: Logged): void {
    for (const entry of entries) this.kept[entry.seq - 1] = keptOf(entry);
  }
}

function keptFrom({ seq, entry }: Unsaved): Kept {
  const { id, step, note = '', at = null } = entry;
  return { seq, id, step, note, at, readingId: null, corrections: [], withdrawn: null };
}

const words = (answer: Answer<unknown>): string | null => (answer.ok ? null : problemWords(answer.problem));

/** Steps that an earlier page left on this device, without those that the server turns out to have. */
function leftOver(outbox: Outbox, kept: readonly Kept[]): Unsaved[] {
  const stored = new Set(kept.map(({ id }) => id));
  const { shelf } = outbox.parts;
  return shelf.all().filter(({ entry }) => {
    if (!stored.has(entry.id)) return true;
    shelf.drop(entry.id);
    return false;
  });
}

interface Parts {
  readonly book: Book;
  readonly calls: RunCalls;
  readonly outbox: Outbox;
}

function createParts(run: RunProps): Parts {
  const calls = runCalls(run.id);
  const book = new Book(layoutOf(run.layout), run, unpackEntries(run.packed));
  const outbox = new Outbox({
    shelf: shelfFor(browserStorage(), run.person, run.id),
    post: calls.append,
    onStored: (logged) => book.take(logged),
  });
  return { book, calls, outbox };
}

/** Loads the run as the server has it and puts what is waiting here behind it. */
async function reload({ book, calls, outbox }: Parts, keep: boolean): Promise<string | null> {
  const answer = await calls.load();
  if (!answer.ok) return problemWords(answer.problem);
  const stored = answer.value.entries.map(keptOf);
  if (!keep) outbox.discard();
  outbox.forget(new Set(stored.map(({ id }) => id)));
  const moved = outbox.moveTo(stored.length + 1);
  book.rebuild([...stored, ...moved.map(keptFrom)]);
  return null;
}

function useLeaving(outbox: Outbox): void {
  useEffect(() => {
    const leaving = (event: BeforeUnloadEvent): void => {
      if (outbox.state.waiting > 0) event.preventDefault();
    };
    const online = (): void => {
      if (outbox.state.is === 'trying-again') outbox.again();
    };
    addEventListener('beforeunload', leaving);
    addEventListener('online', online);
    return () => {
      removeEventListener('beforeunload', leaving);
      removeEventListener('online', online);
      outbox.close();
    };
  }, [outbox]);
}

export function useRun(run: RunProps): LiveRun {
  const [parts] = useState(() => createParts(run));
  const { book, calls, outbox } = parts;
  const [rows, setRows] = useState(book.rows);
  const adopted = useRef(false);
  const state = (): OutboxState => outbox.state;
  const saving = useSyncExternalStore(outbox.subscribe, state, state);
  useLeaving(outbox);

  useEffect(() => {
    if (adopted.current || !run.mayLog) return;
    adopted.current = true;
    const left = leftOver(outbox, book.kept);
    for (const one of left) book.add(keptFrom({ ...one, seq: book.nextSeq }));
    outbox.adopt(left, book.nextSeq - left.length);
    setRows(book.rows);
  }, [book, outbox, run.mayLog]);

  return useMemo<LiveRun>(() => {
    const changed = (answer: Answer<Logged>): string | null => {
      if (answer.ok) {
        book.take(answer.value);
        book.rebuild();
        setRows(book.rows);
      }
      return words(answer);
    };
    const reloaded = async (keep: boolean): Promise<string | null> => {
      const trouble = await reload(parts, keep);
      setRows(book.rows);
      return trouble;
    };
    return {
      layout: book.layout,
      rows,
      saving,
      log: (step, note) => {
        const seq = book.nextSeq;
        const entry = { id: v7(), step, ...(note !== '' && { note }), at: momentNow() };
        outbox.add(seq, entry);
        book.add(keptFrom({ seq, entry }));
        setRows(book.rows);
      },
      takeBack: async (seq, reason) => {
        const unsent = seq === book.kept.length ? outbox.takeLast() : null;
        if (unsent) {
          book.rebuild(book.kept.slice(0, -1));
          setRows(book.rows);
          return null;
        }
        if (outbox.state.waiting > 0) return 'This step is still on its way to the server. Try again when it is saved.';
        return changed(await calls.takeBack(seq, reason));
      },
      correct: async (seq, reading, reason) => {
        if (outbox.state.waiting > 0) return 'Wait until everything is saved, then correct it.';
        const replaces = book.kept[seq - 1]?.readingId ?? null;
        return changed(await calls.correct({ seq, reading, replaces, ...(reason !== '' && { reason }) }));
      },
      finish: async () => {
        if (outbox.state.waiting > 0) return 'Some steps are not saved yet. Wait until they are, then finish.';
        return words(await calls.finish());
      },
      remove: async () => words(await calls.remove()),
      again: () => outbox.again(),
      putAfter: () => reloaded(true),
      discard: () => reloaded(false),
    };
  }, [book, calls, outbox, parts, rows, saving]);
}
