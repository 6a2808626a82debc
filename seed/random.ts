/** A stream of random numbers that is the same on every machine. */
export interface Random {
  /** Even in [0, 1). */
  next(): number;
  between(low: number, high: number): number;
  /** Standard normal (Box & Muller 1958). */
  normal(): number;
  chance(probability: number): boolean;
  pick<T>(list: readonly [T, ...T[]]): T;
}

/**
 * Numbers from a 32-bit counter through a mixing function ("mulberry32", public domain, from memory): short,
 * the same everywhere, and good enough for an invented sky.
 */
export function randomFrom(seed: number): Random {
  let state = seed >>> 0;
  const next = () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
  return {
    next,
    between: (low, high) => low + (high - low) * next(),
    normal: () => Math.sqrt(-2 * Math.log(1 - next())) * Math.cos(2 * Math.PI * next()),
    chance: (probability) => next() < probability,
    pick: (list) => list[Math.floor(next() * list.length)] ?? list[0],
  };
}
