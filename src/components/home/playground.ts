import type { LadderEntry, LadderRow } from '@/components/ladder/rows';
import { createRowBuilder, type RowBuilder } from '@/components/ladder/rows';
import type { Fault } from '@/lib/mechanism/faults';
import { acceptLayout, type Layout } from '@/lib/mechanism/layout';
import { createMachine, type Machine } from '@/lib/mechanism/machine';
import type { Operation, Way } from '@/lib/mechanism/steps';

/**
 * The machine on the home page: a real one with a fault, read after every turn by somebody who never misreads,
 * and judged by the same comparer as every run. Same hands, same ladder: nothing here is left to chance.
 */
export interface PlayState {
  readonly rows: readonly LadderRow[];
  readonly result: string;
  readonly counter: string;
  /** Highest first, one digit a slide. */
  readonly slides: string;
  readonly carriage: number;
  readonly fault: Fault | null;
}

export interface Playground {
  readonly state: PlayState;
  /** Moves one slide; 1 = lowest. The setting becomes a row of the ladder with the next turn. */
  setSlide(slide: number, digit: number): PlayState;
  turn(way: Way): PlayState;
  shift(to: number): PlayState;
  clear(): PlayState;
  /** Gives the machine a fault, or heals it with null; the wheels stay as they stand. */
  give(fault: Fault | null): PlayState;
  /** Everything cleared, and the ladder empty; the fault stays. */
  restart(): PlayState;
}

function smallLayout(): Layout {
  const accepted = acceptLayout({ settingSlides: 5, resultWheels: 8, counterWheels: 4, carriagePositions: 4 });
  if (!accepted.ok) throw new Error('The layout of the home page is not a layout');
  return accepted.value;
}

/** Small enough for a telephone, large enough for a carry that runs. */
export const PLAY_LAYOUT = smallLayout();

/** What the visitor finds: the smoke test of the trade under way, the carry into wheel 2 not made. */
export const FIRST_FAULT: Fault = { kind: 'carry-missed', wheel: 2 };
const FIRST_TURNS = 5;

function rest(): Omit<PlayState, 'rows' | 'fault'> {
  return { result: '0'.repeat(8), counter: '0'.repeat(4), slides: '00007', carriage: 1 };
}

export function createPlayground(): Playground {
  let machine: Machine;
  let builder: RowBuilder;
  let state: PlayState;

  const load = (fault: Fault | null, from: Pick<PlayState, 'result' | 'counter' | 'slides' | 'carriage'>): void => {
    const start = { result: from.result, counter: from.counter };
    machine = createMachine(PLAY_LAYOUT, { start, faults: fault ? [fault] : [] });
    machine.apply({ do: 'set', slides: from.slides });
    machine.apply({ do: 'shift', to: from.carriage });
  };

  const record = (operations: readonly Operation[]): PlayState => {
    const rows = operations.map((operation, index): LadderRow => {
      const after = machine.apply(operation);
      const read = { result: after.result, counter: after.counter };
      const seen = operation.do === 'turn' || operation.do === 'clear';
      const entry: LadderEntry = {
        seq: state.rows.length + index + 1,
        step: seen ? { ...operation, read } : operation,
      };
      return builder.take(entry);
    });
    const { result, counter } = machine.state;
    state = { ...state, result, counter, rows: [...state.rows, ...rows] };
    return state;
  };

  /** Settings that the ladder does not know yet. */
  const settings = (): Operation[] => {
    const last = state.rows.at(-1);
    const { slides, carriage } = state;
    const operations: Operation[] = [];
    if ((last?.slides ?? '00000') !== slides) operations.push({ do: 'set', slides });
    if ((last?.carriage ?? 1) !== carriage) operations.push({ do: 'shift', to: carriage });
    return operations;
  };

  const restart = (): PlayState => {
    const standing = rest();
    state = { rows: [], fault: state.fault, ...standing };
    builder = createRowBuilder(PLAY_LAYOUT);
    load(state.fault, standing);
    return state;
  };

  const turn = (way: Way): PlayState => record([...settings(), { do: 'turn', way, times: 1 }]);

  state = { rows: [], fault: FIRST_FAULT, ...rest() };
  restart();
  for (let made = 0; made < FIRST_TURNS; made += 1) turn('add');

  return {
    get state() {
      return state;
    },
    setSlide: (slide, digit) => {
      const digits = [...state.slides];
      digits[digits.length - slide] = String(Math.min(9, Math.max(0, digit)));
      state = { ...state, slides: digits.join('') };
      return state;
    },
    turn,
    shift: (to) => {
      state = { ...state, carriage: Math.min(PLAY_LAYOUT.carriagePositions, Math.max(1, to)) };
      return state;
    },
    clear: () => record([...settings(), { do: 'clear', what: 'both' }]),
    give: (fault) => {
      load(fault, state);
      state = { ...state, fault };
      return state;
    },
    restart,
  };
}
