import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import type { Append, Logged, NewEntry } from '@/lib/schemas/run-shapes';
import type { Answer } from './call';
import { Outbox } from './outbox';
import { shelfFor } from './unsaved';

/** A browser's storage in memory. */
class Memory implements Storage {
  readonly kept = new Map<string, string>();
  get length(): number {
    return this.kept.size;
  }
  key(index: number): string | null {
    return [...this.kept.keys()][index] ?? null;
  }
  getItem(key: string): string | null {
    return this.kept.get(key) ?? null;
  }
  setItem(key: string, value: string): void {
    this.kept.set(key, value);
  }
  removeItem(key: string): void {
    this.kept.delete(key);
  }
  clear(): void {
    this.kept.clear();
  }
}

const entry = (id: string): NewEntry => ({ id, step: { do: 'turn', way: 'add', times: 1 } });
const offline: Answer<Logged> = { ok: false, kind: 'offline', problem: { status: 0, detail: 'away', errors: [] } };
const refused = (status: number): Answer<Logged> => ({
  ok: false,
  kind: status === 401 ? 'signed-out' : 'refused',
  problem: { status, detail: 'no', errors: [] },
});

/** A server that stores by id, and answers as it is told to. */
function server() {
  const stored: string[] = [];
  const answers: (Answer<Logged> | 'lost')[] = [];
  const post = async (body: Append): Promise<Answer<Logged>> => {
    const answer = answers.shift();
    if (answer && answer !== 'lost') return answer;
    for (const { id } of body.entries) if (!stored.includes(id)) stored.push(id);
    return answer === 'lost' ? offline : { ok: true, value: { entries: [] } as unknown as Logged };
  };
  return { stored, answers, post };
}

beforeEach(() => {
  vi.useFakeTimers();
});
afterEach(() => {
  vi.useRealTimers();
});

function setUp() {
  const memory = new Memory();
  const shelf = shelfFor(memory, 'person', 'run');
  const far = server();
  const outbox = new Outbox({ shelf, post: far.post, onStored: () => {} });
  return { memory, shelf, far, outbox };
}

describe('the outbox', () => {
  it('keeps a step on the shelf until the server has it', async () => {
    const { memory, far, outbox } = setUp();
    outbox.add(1, entry('a'));
    expect(memory.length).toBe(1);
    expect(outbox.state).toEqual({ is: 'saving', waiting: 1 });
    await vi.runAllTimersAsync();
    expect(far.stored).toEqual(['a']);
    expect(outbox.state).toEqual({ is: 'saved', waiting: 0 });
    expect(memory.length).toBe(0);
  });

  it('sends in order, once each, over a network that comes and goes and loses answers', async () => {
    const { memory, far, outbox } = setUp();
    far.answers.push(offline, 'lost', offline, 'lost');
    for (const [index, id] of ['a', 'b', 'c', 'd'].entries()) outbox.add(index + 1, entry(id));
    await vi.advanceTimersByTimeAsync(0);
    expect(outbox.state).toMatchObject({ is: 'trying-again', why: 'offline', waiting: 4 });
    await vi.runAllTimersAsync();
    expect(far.stored).toEqual(['a', 'b', 'c', 'd']);
    expect(outbox.state.waiting).toBe(0);
    expect(memory.length).toBe(0);
  });

  it.each([
    [401, 'signed-out'],
    [409, 'taken'],
    [400, 'refused'],
  ] as const)('stops at %i, holds on to everything, and goes on when told', async (status, why) => {
    const { memory, far, outbox } = setUp();
    far.answers.push(refused(status));
    outbox.add(7, entry('a'));
    await vi.runAllTimersAsync();
    outbox.add(8, entry('b'));
    await vi.runAllTimersAsync();
    expect(outbox.state).toMatchObject({ is: 'stopped', why, waiting: 2 });
    expect(memory.length).toBe(2);
    expect(far.stored).toEqual([]);
    const moved = outbox.moveTo(9);
    expect(moved.map(({ seq }) => seq)).toEqual([9, 10]);
    await vi.runAllTimersAsync();
    expect(far.stored).toEqual(['a', 'b']);
  });

  it('is taken up by the next page, in order', async () => {
    const first = setUp();
    first.far.answers.push(offline);
    first.outbox.add(4, entry('a'));
    first.outbox.add(5, entry('b'));
    first.outbox.close();
    await vi.runAllTimersAsync();
    const left = shelfFor(first.memory, 'person', 'run').all();
    expect(left.map(({ seq }) => seq)).toEqual([4, 5]);
    expect(shelfFor(first.memory, 'somebody else', 'run').all()).toEqual([]);
    const far = server();
    const second = new Outbox({ shelf: shelfFor(first.memory, 'person', 'run'), post: far.post, onStored: () => {} });
    second.adopt(left, 6);
    await vi.runAllTimersAsync();
    expect(far.stored).toEqual(['a', 'b']);
    expect(first.memory.length).toBe(0);
  });

  it('gives a step back only while the server cannot have it', async () => {
    const { memory, far, outbox } = setUp();
    far.answers.push(offline);
    outbox.add(1, entry('a'));
    outbox.add(2, entry('b'));
    expect(outbox.takeLast()?.entry.id).toBe('b');
    expect(outbox.takeLast()).toBeNull();
    await vi.runAllTimersAsync();
    expect(far.stored).toEqual(['a']);
    expect(memory.length).toBe(0);
  });

  it('gives everything up when told to', async () => {
    const { memory, far, outbox } = setUp();
    far.answers.push(refused(409));
    outbox.add(1, entry('a'));
    await vi.runAllTimersAsync();
    outbox.discard();
    expect(outbox.state).toEqual({ is: 'saved', waiting: 0 });
    expect(memory.length).toBe(0);
  });

  it('lives without storage, and passes over what is not its own in it', () => {
    expect(shelfFor(null, 'p', 'r').put({ seq: 1, entry: entry('a') })).toBe(false);
    const memory = new Memory();
    memory.setItem('nineover.unsaved.p.r.x', '{"seq":"one"}');
    memory.setItem('nineover.unsaved.p.r.y', 'not json');
    memory.setItem('something else', '{}');
    expect(shelfFor(memory, 'p', 'r').all()).toEqual([]);
  });
});
