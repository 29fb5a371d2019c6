/**
 * Chance from a seed: xoshiro128** 1.1 (D. Blackman and S. Vigna, "Scrambled linear pseudorandom number
 * generators", ACM TOMS 47(4), 2021; reference code in the public domain), its state filled by SplitMix64 as the
 * authors advise. Written out here so that a seed gives the same run for ever, whatever the runtime does.
 */
export interface Chance {
  /** The next 32 bits, 0 … 2^32 − 1. */
  next(): number;
  /** Whether something that happens at this rate happens now. Rates of 0 and 1 use up no randomness. */
  happens(rate: number): boolean;
}

const MASK = (1n << 64n) - 1n;

/** SplitMix64 (G. Steele, D. Lea, C. Flood, OOPSLA 2014). Called twice a seed, so BigInt is quick enough. */
export function splitMix(seed: bigint): () => bigint {
  let state = seed & MASK;
  return () => {
    state = (state + 0x9e3779b97f4a7c15n) & MASK;
    let z = state;
    z = ((z ^ (z >> 30n)) * 0xbf58476d1ce4e5b9n) & MASK;
    z = ((z ^ (z >> 27n)) * 0x94d049bb133111ebn) & MASK;
    return z ^ (z >> 31n);
  };
}

const rotate = (x: number, by: number): number => (x << by) | (x >>> (32 - by));

/** The generator from its four words of state, which must not all be zero. */
export function chanceFromState(words: readonly [number, number, number, number]): Chance {
  let [a, b, c, d] = words.map((word) => word | 0) as [number, number, number, number];
  const next = (): number => {
    const out = Math.imul(rotate(Math.imul(b, 5), 7), 9) >>> 0;
    const t = b << 9;
    c ^= a;
    d ^= b;
    b ^= c;
    a ^= d;
    c ^= t;
    d = rotate(d, 11);
    return out;
  };
  return {
    next,
    happens: (rate) => rate >= 1 || (rate > 0 && next() < rate * 4_294_967_296),
  };
}

/** The generator for a seed: any whole number that JavaScript holds exactly. */
export function chanceFromSeed(seed: number): Chance {
  const mix = splitMix(BigInt(seed));
  const [first, second] = [mix(), mix()];
  const word = (value: bigint): number => Number(value & 0xffff_ffffn);
  return chanceFromState([word(first), word(first >> 32n), word(second), word(second >> 32n)]);
}
