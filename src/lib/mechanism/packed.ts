import type { Drive } from './drive';

/**
 * The quick way to turn a healthy register whose carries reach everywhere: seven wheels to a 32-bit word, four bits
 * a wheel, added as packed decimals. Every wheel stands in its own four bits and every carry in the bit above them,
 * so nothing is lost against moving them one by one.
 */
const WHEELS_A_WORD = 7;
const EACH_WHEEL = 0x0fff_ffff;
const SIXES = 0x0666_6666;
/** The bit that a wheel's carry comes out at: the lowest of the next wheel's four. */
const CARRIES = 0x1111_1110;

export interface Packed {
  /** Wheels 1 to 7 in the first word, wheel 1 in its lowest four bits; nines' complements while `backward`. */
  readonly words: Int32Array;
  /** Steps that each wheel is driven, with a six added to each so that a ten carries out of four bits. */
  readonly amounts: Int32Array;
  /** The end-around one of a complement subtraction, by word: it is added like a carry, and is none. */
  readonly ones: Int32Array;
  /** Carries out of each wheel in the last turn, each at the lowest of the next wheel's four bits. */
  readonly outs: Int32Array;
  /** The bits of a word that hold wheels. */
  readonly masks: Int32Array;
  /** Wheels that there are, as bits. */
  readonly wheels: number;
  /** Bit of the last word's carries that leaves the register. */
  readonly overflowAt: number;
  /** Backward turns are forward turns of the nines' complements. */
  backward: boolean;
}

export function createPacked(wheels: number): Packed {
  const words = Math.ceil(wheels / WHEELS_A_WORD);
  const overflowAt = 4 * (wheels - (words - 1) * WHEELS_A_WORD);
  return {
    words: new Int32Array(words),
    amounts: new Int32Array(words),
    ones: new Int32Array(words),
    outs: new Int32Array(words),
    masks: new Int32Array(words).fill(EACH_WHEEL).fill((1 << overflowAt) - 1, -1),
    wheels: wheels === 32 ? -1 : (1 << wheels) - 1,
    overflowAt,
    backward: false,
  };
}

/** Puts digits into words. */
export function pack(packed: Packed, digits: Uint8Array): void {
  packed.words.fill(0);
  for (let wheel = 0; wheel < digits.length; wheel += 1) {
    const digit = digits[wheel] as number;
    const word = Math.floor(wheel / WHEELS_A_WORD);
    const shown = packed.backward ? 9 - digit : digit;
    packed.words[word] = (packed.words[word] as number) | (shown << (4 * (wheel % WHEELS_A_WORD)));
  }
}

/** Takes digits out of words. */
export function unpack(packed: Packed, digits: Uint8Array): void {
  for (let wheel = 0; wheel < digits.length; wheel += 1) {
    const word = packed.words[Math.floor(wheel / WHEELS_A_WORD)] as number;
    const shown = (word >>> (4 * (wheel % WHEELS_A_WORD))) & 15;
    digits[wheel] = packed.backward ? 9 - shown : shown;
  }
}

/** Takes over the drive of the turns to come. The words must be packed after it. */
export function setDrive(packed: Packed, drive: Drive): void {
  packed.backward = drive.backward;
  packed.amounts.fill(SIXES);
  packed.ones.fill(0);
  for (let wheel = 0; wheel < drive.amounts.length; wheel += 1) {
    const amount = drive.amounts[wheel] as number;
    const word = Math.floor(wheel / WHEELS_A_WORD);
    const at = 4 * (wheel % WHEELS_A_WORD);
    // Ten steps, which only the lowest driven wheel makes, are nine and the end-around one.
    if (amount === 10) packed.ones[word] = 1 << at;
    packed.amounts[word] = (packed.amounts[word] as number) + (Math.min(9, amount) << at);
  }
}

/** Seven carry bits, four apart, side by side. */
function sideBySide(carries: number): number {
  const pairs = (carries | (carries >>> 3)) & 0x0303_0303;
  const fours = (pairs | (pairs >>> 6)) & 0x000f_000f;
  return (fours | (fours >>> 12)) & 0xff;
}

/** One turn of the register; tells whether a carry left its highest wheel. */
export function turnPacked(packed: Packed): boolean {
  const { words, amounts, ones, masks, outs } = packed;
  let out = 0;
  for (let word = 0; word < words.length; word += 1) {
    const before = words[word] as number;
    const amount = amounts[word] as number;
    const one = ones[word] as number;
    const sum = (before + amount + one + (out >>> 28)) | 0;
    out = (sum ^ before ^ amount ^ one) & CARRIES;
    outs[word] = out;
    // The sixes are taken back from wheels that made no carry.
    const none = out ^ CARRIES;
    words[word] = (sum - ((none >>> 2) | (none >>> 3))) & (masks[word] as number);
  }
  return ((out >>> packed.overflowAt) & 1) !== 0;
}

/** Wheels that received a carry in the last turn, as bits, bit 0 = wheel 1. */
export function packedCarries(packed: Packed): number {
  let made = 0;
  for (let word = 0; word < packed.outs.length; word += 1)
    made |= sideBySide((packed.outs[word] as number) >>> 4) << (word * WHEELS_A_WORD + 1);
  return made & packed.wheels;
}
