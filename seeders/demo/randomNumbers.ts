/**
 * Random numbers that are the same on every machine: the demo desk must come out alike wherever it is laid out.
 *
 * mulberry32 (Tommy Ettinger, 2017, public domain), 32 bits of state, seeded from a text by FNV-1a (Fowler, Noll,
 * Vo), 32 bits. Constants from memory; nothing rests on their quality but variety.
 */
export interface RandomNumbers {
  /** Even between 0 (in) and 1 (out). */
  readonly share: () => number;
  /** Even between the two. */
  readonly between: (low: number, high: number) => number;
  /** Whole number from `low` to `high`, both in. */
  readonly count: (low: number, high: number) => number;
  readonly oneOf: <T>(choices: readonly T[]) => T;
  /** About bell-shaped around 0, never outside -1 to 1. */
  readonly wobble: () => number;
}

export function randomNumbers(seed: string): RandomNumbers {
  let state = fnv1a(seed);
  const share = (): number => {
    state = (state + 0x6d2b79f5) | 0;
    let mixed = Math.imul(state ^ (state >>> 15), state | 1);
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61);
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4_294_967_296;
  };
  const between = (low: number, high: number): number => low + (high - low) * share();
  const count = (low: number, high: number): number => Math.floor(between(low, high + 1));
  return {
    share,
    between,
    count,
    oneOf: (choices) => {
      const chosen = choices[count(0, choices.length - 1)];
      if (chosen === undefined) throw new RangeError('oneOf requires at least one choice');
      return chosen;
    },
    wobble: () => (share() + share() + share()) / 1.5 - 1,
  };
}

function fnv1a(text: string): number {
  let hash = 0x811c9dc5;
  for (const byte of new TextEncoder().encode(text)) hash = Math.imul(hash ^ byte, 0x01000193);
  return hash >>> 0;
}
