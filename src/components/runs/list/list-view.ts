import { RUN_STATES, type RunState, TROUBLES, type Trouble } from './list-row';

/** What the list can be sorted by; also the ids of the table's columns. */
export const SORTS = ['number', 'machine', 'title', 'tester', 'started', 'turns', 'readings', 'trouble'] as const;
export type Sort = (typeof SORTS)[number];

export const SIZES = [10, 25, 50, 100] as const;
export type Size = (typeof SIZES)[number];

/** How the list stands. It is kept in the address, so that a link and the way back lead to the same list. */
export interface ListView {
  readonly text: string;
  /** Id of a machine. */
  readonly machine: string | null;
  readonly state: RunState | null;
  readonly trouble: Trouble | null;
  readonly sort: Sort;
  readonly falling: boolean;
  /** From 1. */
  readonly page: number;
  readonly size: Size;
}

/** Latest first. */
export const PLAIN_VIEW: ListView = {
  text: '',
  machine: null,
  state: null,
  trouble: null,
  sort: 'started',
  falling: true,
  page: 1,
  size: 25,
};

function among<T>(values: readonly T[], wanted: unknown): T | undefined {
  return values.find((value) => String(value) === wanted);
}

/** Reads a list's address; what it does not know takes its plain value. */
export function readView(search: string): ListView {
  const from = new URLSearchParams(search);
  const page = /^[1-9]\d{0,5}$/u.test(from.get('page') ?? '') ? Number(from.get('page')) : 1;
  const machine = from.get('machine') ?? '';
  return {
    text: (from.get('text') ?? '').slice(0, 80),
    machine: /^[0-9a-f-]{36}$/u.test(machine) ? machine : null,
    state: among(RUN_STATES, from.get('state')) ?? null,
    trouble: among(TROUBLES, from.get('trouble')) ?? null,
    sort: among(SORTS, from.get('sort')) ?? PLAIN_VIEW.sort,
    falling: from.has('sort') ? from.get('order') === 'falling' : from.get('order') !== 'rising',
    page,
    size: among(SIZES, from.get('size')) ?? PLAIN_VIEW.size,
  };
}

/** Writes a list's address: only what is not plain, with its question mark; empty when all is plain. */
export function writeView(view: ListView): string {
  const to = new URLSearchParams();
  if (view.text !== '') to.set('text', view.text);
  if (view.machine) to.set('machine', view.machine);
  if (view.state) to.set('state', view.state);
  if (view.trouble) to.set('trouble', view.trouble);
  if (view.sort !== PLAIN_VIEW.sort) {
    to.set('sort', view.sort);
    if (view.falling) to.set('order', 'falling');
  } else if (!view.falling) to.set('order', 'rising');
  if (view.page !== 1) to.set('page', String(view.page));
  if (view.size !== PLAIN_VIEW.size) to.set('size', String(view.size));
  const written = to.toString();
  return written === '' ? '' : `?${written}`;
}
