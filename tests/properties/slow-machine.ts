import type { Fault } from '@/lib/mechanism/faults';
import type { Operation } from '@/lib/mechanism/steps';

/**
 * A second machine, written straight from the mechanism's definition to hold the first one against: it moves every
 * wheel one step at a time, asks the list of faults at every step, loops over every turn, and shares no code with
 * the simulator. Slow and plain on purpose. Faults always act here.
 */
export interface PlainLayout {
  settingSlides: number;
  resultWheels: number;
  counterWheels: number;
  carriagePositions: number;
  subtraction: 'complement' | 'reverse' | 'none';
  complementColumns: number | null;
  resultCarry: number | null;
  counterCarry: boolean;
}

/** Carries into a wheel that are made or not whatever the wheel below does, in every turn of an operation. */
export interface Forced {
  result: ReadonlyMap<number, boolean>;
}

type Numeral = { at: number };

const fromText = (text: string, places: number): Numeral[] =>
  Array.from({ length: places }, (_, place) => ({ at: Number(text[text.length - 1 - place] ?? '0') }));
const toText = (wheels: Numeral[]): string => wheels.reduce((text, { at }) => `${at}${text}`, '');

/** Turns one wheel by one step; true when it goes past its edge. */
function step(wheel: Numeral, backward: boolean): boolean {
  const edge = backward ? 0 : 9;
  const past = wheel.at === edge;
  wheel.at = past ? 9 - edge : wheel.at + (backward ? -1 : 1);
  return past;
}

export class SlowMachine {
  private readonly result: Numeral[];
  private readonly counter: Numeral[];
  private slides: Numeral[];
  private position = 1;
  private lever = false;
  private readonly held = new Set<number>();
  private carries: number[] = [];
  private overflow = false;
  /** Wheels to which the wheel below owed a carry in the last operation, whether or not it was made. */
  readonly due = { result: new Set<number>(), counter: new Set<number>() };

  constructor(
    private readonly layout: PlainLayout,
    start: { result?: string | undefined; counter?: string | undefined } = {},
    private readonly faults: readonly Fault[] = [],
  ) {
    this.result = fromText(start.result ?? '', layout.resultWheels);
    this.counter = fromText(start.counter ?? '', layout.counterWheels);
    this.slides = fromText('', layout.settingSlides);
  }

  private has(wanted: Record<string, unknown>): boolean {
    return this.faults.some((fault) =>
      Object.entries(wanted).every(([name, value]) => (fault as unknown as Record<string, unknown>)[name] === value),
    );
  }

  /** The digit a column drives as: stuck first, then off. */
  private columnDigit(column: number): number {
    const slide = column + 1;
    let digit = this.slides[column]?.at ?? 0;
    for (const fault of this.faults) if (fault.kind === 'slide-stuck' && fault.slide === slide) digit = fault.at;
    for (const fault of this.faults)
      if (fault.kind === 'slide-off' && fault.slide === slide) digit = Math.min(9, Math.max(0, digit + fault.by));
    return digit;
  }

  private columnAmount(column: number, complement: boolean): number {
    const digit = this.columnDigit(column);
    const drum = complement ? 'subtract' : 'add';
    let amount = complement ? 9 - digit : digit;
    for (const tooth of [1, 2, 3, 4, 5, 6, 7, 8, 9])
      if (amount >= tooth && this.has({ kind: 'tooth-short', tooth, drum })) amount -= 1;
    return complement && column === 0 ? amount + 1 : amount;
  }

  private turnResult(subtract: boolean, force: Forced): void {
    const { layout } = this;
    const complement = subtract && layout.subtraction === 'complement';
    const backward = subtract && layout.subtraction === 'reverse';
    let lowest = this.position;
    for (const fault of this.faults)
      if (fault.kind === 'carriage-off' && fault.position === this.position) lowest += fault.by;
    const columns = complement ? (layout.complementColumns ?? 1_000) : layout.settingSlides;
    const raised = new Set(this.held);
    this.carries = [];
    for (let wheel = 1; wheel <= layout.resultWheels; wheel += 1) {
      const reached = layout.resultCarry === null || wheel <= lowest + layout.resultCarry;
      const forced = reached ? force.result.get(wheel) : undefined;
      if (forced === true) raised.add(wheel);
      if (forced === false) raised.delete(wheel);
      const column = wheel - lowest;
      const amount = column >= 0 && column < columns ? this.columnAmount(column, complement) : 0;
      if (this.has({ kind: 'carry-missed', wheel })) raised.delete(wheel);
      if (raised.has(wheel) && this.has({ kind: 'carry-held', wheel })) this.held.add(wheel);
      if (this.has({ kind: 'wheel-seized', wheel })) continue;
      let motion = amount;
      if (raised.has(wheel)) {
        motion += 1;
        this.carries.push(wheel);
      }
      if (amount > 0 && this.has({ kind: 'wheel-short', wheel })) motion -= 1;
      if (amount > 0 && this.has({ kind: 'wheel-over', wheel })) motion += 1;
      const numeral = this.result[wheel - 1] as Numeral;
      let past = false;
      for (let count = 0; count < motion; count += 1) past = step(numeral, backward) || past;
      if (!past) continue;
      if (wheel === layout.resultWheels) this.overflow = true;
      else if (layout.resultCarry === null || wheel + 1 <= lowest + layout.resultCarry) {
        raised.add(wheel + 1);
        this.due.result.add(wheel + 1);
      }
    }
  }

  private turnCounter(subtract: boolean): void {
    let backward = subtract;
    if (this.lever && !this.has({ kind: 'reverse-dead' })) backward = !backward;
    if (this.has({ kind: 'counter-inverted' })) backward = !backward;
    if (this.has({ kind: 'counter-missed', wheel: this.position })) return;
    for (let wheel = this.position; wheel <= this.layout.counterWheels; wheel += 1) {
      const past = step(this.counter[wheel - 1] as Numeral, backward);
      if (!past || !this.layout.counterCarry) return;
      this.due.counter.add(wheel + 1);
      if (this.has({ kind: 'counter-carry-missed', wheel: wheel + 1 })) return;
    }
  }

  private clear(register: 'result' | 'counter'): void {
    this[register].forEach((numeral, index) => {
      if (!this.has({ kind: 'clear-missed', register, wheel: index + 1 })) numeral.at = 0;
    });
  }

  apply(operation: Operation, force: Forced = { result: new Map() }) {
    this.due.result.clear();
    this.due.counter.clear();
    this.carries = [];
    this.overflow = false;
    if (operation.do === 'set') this.slides = fromText(operation.slides, this.layout.settingSlides);
    if (operation.do === 'shift') this.position = operation.to;
    if (operation.do === 'reverse') this.lever = operation.on;
    if (operation.do === 'clear' && operation.what !== 'counter') this.clear('result');
    if (operation.do === 'clear' && operation.what !== 'result') this.clear('counter');
    if (operation.do === 'turn')
      for (let turn = 0; turn < (operation.times ?? 1); turn += 1) {
        this.turnResult(operation.way === 'subtract', force);
        this.turnCounter(operation.way === 'subtract');
      }
    return {
      result: toText(this.result),
      counter: toText(this.counter),
      slides: toText(this.slides),
      carriage: this.position,
      reversed: this.lever,
      overflow: this.overflow,
      carries: this.carries,
    };
  }
}
