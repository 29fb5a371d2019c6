import type { Append, Logged, NewEntry } from '@/lib/schemas/run-shapes';
import { type Answer, problemWords } from './call';
import type { Shelf, Unsaved } from './unsaved';

/** How what was typed stands with the server. `waiting` counts the steps that it has not confirmed. */
export type OutboxState =
  | { readonly is: 'saved'; readonly waiting: 0 }
  | { readonly is: 'saving'; readonly waiting: number }
  | {
      readonly is: 'trying-again';
      readonly waiting: number;
      readonly why: 'offline' | 'busy';
    }
  | {
      readonly is: 'stopped';
      readonly waiting: number;
      readonly why: 'signed-out' | 'taken' | 'refused';
      readonly detail: string;
    };

export interface OutboxParts {
  readonly shelf: Shelf;
  readonly post: (body: Append) => Promise<Answer<Logged>>;
  /** Told of steps that the server has stored. */
  readonly onStored: (logged: Logged) => void;
  /** Milliseconds to the next try after so many failed ones. */
  readonly pause?: (tries: number) => number;
}

/** Most steps in one call, as the server takes them. */
const AT_ONCE = 500;
const doubling = (tries: number): number => Math.min(30_000, 1_000 * 2 ** tries);

/**
 * Sends steps in their order, one call at a time, and keeps each until the server has confirmed it: on the shelf, so
 * that a reload or a dead tab loses none. Where the server refuses, it stops and holds on to everything.
 */
export class Outbox {
  #queue: Unsaved[] = [];
  #state: OutboxState = { is: 'saved', waiting: 0 };
  #sending = false;
  #tries = 0;
  #timer: ReturnType<typeof setTimeout> | undefined;
  #closed = false;
  /** Steps that were sent at least once: the server may have them, even where no answer came. */
  readonly #sent = new Set<string>();
  readonly #listeners = new Set<() => void>();

  constructor(readonly parts: OutboxParts) {}

  get state(): OutboxState {
    return this.#state;
  }

  /** Steps not confirmed yet, in their order. */
  get waiting(): readonly Unsaved[] {
    return this.#queue;
  }

  subscribe = (listener: () => void): (() => void) => {
    this.#listeners.add(listener);
    return () => this.#listeners.delete(listener);
  };

  /** Takes a step in: it is on the shelf before this returns. */
  add(seq: number, entry: NewEntry): void {
    const unsaved = { seq, entry };
    this.parts.shelf.put(unsaved);
    this.#queue.push(unsaved);
    this.#tell(this.#state.is === 'stopped' ? { ...this.#state, waiting: this.#queue.length } : this.#at('saving'));
    this.#send();
  }

  /** Takes in what an earlier page left on the shelf, numbered from `seq` on. */
  adopt(left: readonly Unsaved[], seq: number): void {
    this.#queue.push(...this.#renumbered(left, seq));
    if (left.length > 0) this.again();
  }

  /** Tries at once: the network is back, somebody has signed in again. */
  again(): void {
    clearTimeout(this.#timer);
    this.#tries = 0;
    this.#tell(this.#queue.length > 0 ? this.#at('saving') : { is: 'saved', waiting: 0 });
    this.#send();
  }

  /** Puts what is waiting behind steps that came from elsewhere meanwhile, and sends it. */
  moveTo(seq: number): readonly Unsaved[] {
    this.#queue = this.#renumbered(this.#queue, seq);
    this.again();
    return this.#queue;
  }

  /** Takes out steps that the server turns out to have. */
  forget(stored: ReadonlySet<string | null>): void {
    for (const { entry } of this.#queue) if (stored.has(entry.id)) this.parts.shelf.drop(entry.id);
    this.#queue = this.#queue.filter(({ entry }) => !stored.has(entry.id));
  }

  /** Gives up what is waiting, for good. */
  discard(): void {
    for (const { entry } of this.#queue) this.parts.shelf.drop(entry.id);
    this.#queue = [];
    this.#tell({ is: 'saved', waiting: 0 });
  }

  /** Takes out the last step if the server was never told of it; null where it may have been. */
  takeLast(): Unsaved | null {
    const last = this.#queue.at(-1);
    if (!last || this.#sent.has(last.entry.id)) return null;
    this.#queue.pop();
    this.parts.shelf.drop(last.entry.id);
    this.#tell(
      this.#queue.length > 0
        ? ({ ...this.#state, waiting: this.#queue.length } as OutboxState)
        : { is: 'saved', waiting: 0 },
    );
    return last;
  }

  close(): void {
    this.#closed = true;
    clearTimeout(this.#timer);
  }

  #renumbered(left: readonly Unsaved[], seq: number): Unsaved[] {
    return left.map(({ entry }, index) => {
      const unsaved = { seq: seq + index, entry };
      this.parts.shelf.put(unsaved);
      return unsaved;
    });
  }

  #at(is: 'saving'): OutboxState {
    return { is, waiting: this.#queue.length };
  }

  #tell(state: OutboxState): void {
    this.#state = state;
    for (const listener of this.#listeners) listener();
  }

  async #send(): Promise<void> {
    const [first] = this.#queue;
    if (this.#sending || this.#closed || this.#state.is === 'stopped' || !first) return;
    this.#sending = true;
    const sent = this.#queue.slice(0, AT_ONCE);
    for (const { entry } of sent) this.#sent.add(entry.id);
    const answer = await this.parts.post({
      seq: first.seq,
      entries: sent.map(({ entry }) => entry),
    });
    this.#sending = false;
    if (this.#closed) return;
    if (answer.ok) this.#stored(sent, answer.value);
    else this.#failed(answer);
  }

  #stored(sent: readonly Unsaved[], logged: Logged): void {
    this.#tries = 0;
    const ids = new Set(sent.map(({ entry }) => entry.id));
    for (const id of ids) this.parts.shelf.drop(id);
    this.#queue = this.#queue.filter(({ entry }) => !ids.has(entry.id));
    this.parts.onStored(logged);
    this.#tell(this.#queue.length > 0 ? this.#at('saving') : { is: 'saved', waiting: 0 });
    this.#send();
  }

  #failed(answer: Exclude<Answer<Logged>, { ok: true }>): void {
    const waiting = this.#queue.length;
    const { kind, problem } = answer;
    if (kind === 'signed-out' || kind === 'refused') {
      const why = kind === 'refused' && problem.status === 409 ? 'taken' : kind;
      this.#tell({
        is: 'stopped',
        waiting,
        why,
        detail: problemWords(problem),
      });
      return;
    }
    this.#tell({ is: 'trying-again', waiting, why: kind });
    this.#timer = setTimeout(() => this.#send(), (this.parts.pause ?? doubling)(this.#tries));
    this.#tries += 1;
  }
}
