import type { JudgedReading, LadderWheel } from '@/lib/comparison/compare';
import type { Clearable, Operation, Register } from '@/lib/mechanism/steps';

/** The words of the ladder: what was done, what a wheel shows, what that means. Pure, so that they can be tested. */

const CLEARED: Record<Clearable, string> = { result: 'clear result', counter: 'clear counter', both: 'clear both' };

/** Slides or a register without the zeros in front that say nothing. */
function bare(digits: string): string {
  return digits.replace(/^0+(?=\d)/u, '');
}

/** An operation in a few characters: `turn + ×9`, `set 305`, `carriage 3`. */
export function operationWords(operation: Operation): string {
  switch (operation.do) {
    case 'set':
      return `set ${bare(operation.slides)}`;
    case 'turn':
      return `turn ${operation.way === 'add' ? '+' : '−'} ×${operation.times ?? 1}`;
    case 'shift':
      return `carriage ${operation.to}`;
    case 'reverse':
      return `reverse ${operation.on ? 'on' : 'off'}`;
    case 'clear':
      return CLEARED[operation.what];
  }
}

/** An operation as a sentence without its full stop, for ears and for the detail. */
export function operationSentence(operation: Operation): string {
  switch (operation.do) {
    case 'set':
      return `slides set to ${bare(operation.slides)}`;
    case 'turn': {
      const times = operation.times ?? 1;
      return `${times === 1 ? 'one turn' : `${times} turns`} ${operation.way === 'add' ? 'adding' : 'subtracting'}`;
    }
    case 'shift':
      return `carriage shifted to position ${operation.to}`;
    case 'reverse':
      return operation.on ? 'reversing lever thrown' : 'reversing lever put back';
    case 'clear':
      return operation.what === 'both' ? 'result and counter cleared' : `${operation.what} cleared`;
  }
}

/** What happened in the gutter between a wheel and the one below it. */
export const CARRY_MARKS = ['made', 'missed', 'unasked'] as const;
export type CarryMark = (typeof CARRY_MARKS)[number];

export const CARRY_WORDS: Record<CarryMark, string> = {
  made: 'carry made',
  missed: 'carry missed',
  unasked: 'carry nobody asked for',
};

/** The lowest wheel has none below it that could ask for a carry: a step too far is its own there. */
export function carryMark(wheel: LadderWheel): CarryMark | null {
  if (wheel.wheel === 1 || wheel.carryMade === null || wheel.carryDue === null) return null;
  if (wheel.carryDue) return wheel.carryMade ? 'made' : 'missed';
  return wheel.carryMade ? 'unasked' : null;
}

/** Whether a wheel is wrong by itself: not left out, and not only because of the wheels below it. */
export function isOwnFault(wheel: LadderWheel): boolean {
  if (wheel.verdict === 'between') return true;
  return wheel.verdict === 'differs' && !wheel.follows;
}

const NAME: Record<Register, string> = { result: 'wheel', counter: 'counter wheel' };

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}

/** `4~` stands between 4 and 5. */
export function betweenOf(glyph: string): readonly [number, number] {
  const lower = Number(glyph.charAt(0));
  return [lower, (lower + 1) % 10];
}

function readWords(glyph: string): string {
  if (glyph === '?') return 'not read';
  if (glyph.length === 1) return glyph;
  const [lower, upper] = betweenOf(glyph);
  return `between ${lower} and ${upper}`;
}

/** One cell as it is read out: `wheel 2: 1, expected 2, carry missed`. */
export function cellWords(register: Register, wheel: LadderWheel): string {
  const parts = [`${NAME[register]} ${wheel.wheel}: ${readWords(wheel.read)}`];
  const wrong = wheel.verdict === 'differs' || wheel.verdict === 'between';
  if (wrong && wheel.expectedFromLast !== null) parts.push(`expected ${wheel.expectedFromLast}`);
  if (wheel.follows) parts.push('follows from the wheels below');
  if (wheel.verdict === 'excluded') parts.push('left out');
  const mark = carryMark(wheel);
  if (mark) parts.push(CARRY_WORDS[mark]);
  return parts.join(', ');
}

/** Steps off in words: `one step short`, `3 steps too far`. */
export function stepsOffWords(steps: number): string {
  const count = Math.abs(steps);
  return `${count === 1 ? 'one step' : `${count} steps`} ${steps < 0 ? 'short' : 'too far'}`;
}

/** Why a wheel differs, as far as one reading tells. */
function reasonWords(register: Register, wheel: LadderWheel): string {
  const below = `${NAME[register]} ${wheel.wheel - 1}`;
  const mark = carryMark(wheel);
  if (mark === 'missed') return `the carry from ${below} was due and was not made`;
  if (mark === 'unasked') return `moved on as by a carry, and ${below} had asked for none`;
  if (wheel.follows) return `that follows from what ${below} did`;
  if (wheel.stepsOff !== null) return stepsOffWords(wheel.stepsOff);
  return 'no reading before it allows that';
}

/** One wheel in a sentence; null where there is nothing to say. */
export function wheelSentence(register: Register, wheel: LadderWheel): string | null {
  const name = capital(`${NAME[register]} ${wheel.wheel}`);
  const wanted = wheel.expectedFromLast;
  switch (wheel.verdict) {
    case 'differs':
      return `${name} shows ${wheel.read}${wanted === null ? '' : `, ${wanted} was expected`}: ${reasonWords(register, wheel)}.`;
    case 'between': {
      const [lower, upper] = betweenOf(wheel.read);
      return `${name} stands between ${lower} and ${upper}${wanted === null ? '' : `; ${wanted} was expected`}.`;
    }
    case 'agrees': {
      const mark = carryMark(wheel);
      if (mark === 'missed')
        return `${name} agrees, although the carry from ${NAME[register]} ${wheel.wheel - 1} was not made.`;
      return mark === 'unasked' ? `${name} agrees, although it took a carry that nobody asked for.` : null;
    }
    case 'unread':
    case 'excluded':
      return null;
  }
}

/** `wheels 3, 7 and 8` */
function listWheels(register: Register, wheels: readonly number[]): string {
  const last = wheels.at(-1);
  const rest = wheels.slice(0, -1);
  const name = `${NAME[register]}${wheels.length > 1 ? 's' : ''}`;
  return rest.length === 0 ? `${name} ${last}` : `${name} ${rest.join(', ')} and ${last}`;
}

function numbersOf(wheels: readonly LadderWheel[], verdict: LadderWheel['verdict']): number[] {
  return wheels.filter((wheel) => wheel.verdict === verdict).map(({ wheel }) => wheel);
}

function registerSentences(register: Register, wheels: readonly LadderWheel[]): string[] {
  const sentences = wheels.flatMap((wheel) => wheelSentence(register, wheel) ?? []);
  const unread = numbersOf(wheels, 'unread');
  const excluded = numbersOf(wheels, 'excluded');
  if (wheels.length > 0 && wheels.every(({ read }) => read === '?')) sentences.push(`The ${register} was not read.`);
  else if (unread.length > 0)
    sentences.push(`${capital(listWheels(register, unread))} ${unread.length > 1 ? 'were' : 'was'} not read.`);
  if (excluded.length > 0)
    sentences.push(
      `${capital(listWheels(register, excluded))} ${excluded.length > 1 ? 'are' : 'is'} left out of the judgement.`,
    );
  return sentences;
}

/** A reading in sentences, causes before what follows from them. Begins with `Agrees.` where nothing is wrong. */
export function readingSentences(reading: JudgedReading): string[] {
  const sentences = [...registerSentences('result', reading.result), ...registerSentences('counter', reading.counter)];
  const wrong = [...reading.result, ...reading.counter].some(
    ({ verdict }) => verdict === 'differs' || verdict === 'between',
  );
  return wrong ? sentences : ['Agrees with what was expected.', ...sentences];
}

/** The fault of one wheel in a few words, for the margin: `carry into 2 missed`. */
function shortFault(register: Register, wheel: LadderWheel): string {
  const at = register === 'counter' ? `counter ${wheel.wheel}` : `${wheel.wheel}`;
  const mark = carryMark(wheel);
  if (wheel.verdict === 'between') return `${at} between numerals`;
  if (mark === 'missed') return `carry into ${at} missed`;
  if (mark === 'unasked') return `carry into ${at} nobody asked for`;
  return wheel.stepsOff === null ? `${at} differs` : `${at}: ${stepsOffWords(wheel.stepsOff)}`;
}

/** A reading's own faults for the margin of its row; empty where it has none. */
export function shortWords(reading: JudgedReading): string {
  const faults = (['result', 'counter'] as const).flatMap((register) =>
    reading[register].filter(isOwnFault).map((wheel) => shortFault(register, wheel)),
  );
  return faults.length > 2 ? `${faults.slice(0, 2).join(', ')} and ${faults.length - 2} more` : faults.join(', ');
}
