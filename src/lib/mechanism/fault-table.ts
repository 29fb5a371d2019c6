import type { Fault } from './faults';
import type { Layout } from './layout';

/** What a setting slide's fault does to the digit it drives as. */
export interface SlideFault {
  readonly rate: number;
  /** Drives as this digit; null for a slide that is off. */
  readonly at: number | null;
  readonly by: number;
}

export interface ToothFault {
  readonly tooth: number;
  readonly rate: number;
}

export interface CarriageFault {
  readonly rate: number;
  readonly by: number;
}

/**
 * Faults laid out by place, so that a turn looks each place up once whatever the length of the list. Rates stand
 * at index 0 = wheel 1; 0 means that there is no such fault.
 */
export interface FaultTable {
  /** Whether any fault acts only sometimes, so that turns cannot be counted ahead. */
  readonly random: boolean;
  /** Whether the drive of a turn may differ from the last one's with the same setting. */
  readonly randomDrive: boolean;
  readonly missed: Float64Array;
  readonly held: Float64Array;
  readonly short: Float64Array;
  readonly over: Float64Array;
  readonly seized: Float64Array;
  /** Stuck before off, as they act. */
  readonly slides: readonly (readonly SlideFault[])[];
  /** From tooth 1 up. */
  readonly teeth: { readonly add: readonly ToothFault[]; readonly subtract: readonly ToothFault[] };
  /** Result wheels at which any fault sits, as bits: the others turn without asking. */
  readonly touched: number;
  readonly clear: {
    readonly result: Float64Array;
    readonly counter: Float64Array;
  };
  readonly counterMissed: Float64Array;
  readonly counterCarryMissed: Float64Array;
  readonly reverseDead: number;
  readonly counterInverted: number;
  readonly carriage: readonly (readonly CarriageFault[])[];
}

interface Draft extends FaultTable {
  slides: SlideFault[][];
  teeth: { add: ToothFault[]; subtract: ToothFault[] };
  carriage: CarriageFault[][];
  reverseDead: number;
  counterInverted: number;
}

function emptyTable(layout: Layout): Draft {
  const wheels = (): Float64Array => new Float64Array(layout.resultWheels);
  const counters = (): Float64Array => new Float64Array(layout.counterWheels);
  return {
    random: false,
    randomDrive: false,
    missed: wheels(),
    held: wheels(),
    short: wheels(),
    over: wheels(),
    seized: wheels(),
    slides: Array.from({ length: layout.settingSlides }, () => []),
    teeth: { add: [], subtract: [] },
    touched: 0,
    clear: { result: wheels(), counter: counters() },
    counterMissed: counters(),
    counterCarryMissed: counters(),
    reverseDead: 0,
    counterInverted: 0,
    carriage: Array.from({ length: layout.carriagePositions }, () => []),
  };
}

function raise(rates: Float64Array, place: number, rate: number): void {
  rates[place - 1] = rate;
}

/** Behind the stuck ones before it, so that the last one listed has its way, and ahead of those that are off. */
function enterStuck(slide: SlideFault[], fault: SlideFault): void {
  slide.splice(slide.filter(({ at }) => at !== null).length, 0, fault);
}

function enter(table: Draft, fault: Fault): void {
  const rate = fault.rate ?? 1;
  switch (fault.kind) {
    case 'carry-missed':
      raise(table.missed, fault.wheel, rate);
      return;
    case 'carry-held':
      raise(table.held, fault.wheel, rate);
      return;
    case 'wheel-short':
      raise(table.short, fault.wheel, rate);
      return;
    case 'wheel-over':
      raise(table.over, fault.wheel, rate);
      return;
    case 'wheel-seized':
      raise(table.seized, fault.wheel, rate);
      return;
    case 'slide-stuck':
      enterStuck(table.slides[fault.slide - 1] ?? [], { rate, at: fault.at, by: 0 });
      return;
    case 'slide-off':
      table.slides[fault.slide - 1]?.push({ rate, at: null, by: fault.by });
      return;
    case 'tooth-short':
      table.teeth[fault.drum].push({ tooth: fault.tooth, rate });
      table.teeth[fault.drum].sort((a, b) => a.tooth - b.tooth);
      return;
    case 'clear-missed':
      raise(table.clear[fault.register], fault.wheel, rate);
      return;
    case 'counter-missed':
      raise(table.counterMissed, fault.wheel, rate);
      return;
    case 'counter-carry-missed':
      raise(table.counterCarryMissed, fault.wheel, rate);
      return;
    case 'reverse-dead':
      table.reverseDead = rate;
      return;
    case 'counter-inverted':
      table.counterInverted = rate;
      return;
    case 'carriage-off':
      table.carriage[fault.position - 1]?.push({ rate, by: fault.by });
      return;
  }
}

function touchedWheels(table: FaultTable): number {
  const rates = [table.missed, table.held, table.short, table.over, table.seized];
  return table.missed.reduce((bits, _, wheel) => {
    const any = rates.some((each) => (each[wheel] ?? 0) > 0);
    return any ? bits | (1 << wheel) : bits;
  }, 0);
}

const DRIVE_KINDS: readonly Fault['kind'][] = ['slide-stuck', 'slide-off', 'tooth-short', 'carriage-off'];

/** One cause listed twice is still one cause: the higher rate stands. */
function distinct(faults: readonly Fault[]): Fault[] {
  const known = new Map<string, Fault>();
  for (const fault of faults) {
    const { rate = 1, ...place } = fault;
    const key = JSON.stringify(place, Object.keys(place).sort());
    if ((known.get(key)?.rate ?? 0) <= rate) known.set(key, { ...fault, rate });
  }
  return [...known.values()];
}

/** Lays accepted faults out by place. */
export function tableOf(layout: Layout, listed: readonly Fault[]): FaultTable {
  const faults = distinct(listed);
  const table = emptyTable(layout);
  for (const fault of faults) enter(table, fault);
  const sometimes = faults.filter(({ rate }) => rate !== undefined && rate > 0 && rate < 1);
  return {
    ...table,
    touched: touchedWheels(table),
    random: sometimes.length > 0,
    randomDrive: sometimes.some(({ kind }) => DRIVE_KINDS.includes(kind)),
  };
}
