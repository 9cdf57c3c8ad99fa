import { v7 } from 'uuid';

/** Random draws that a seed repeats exactly. */
export type SeededRandom = {
  /** Uniform in [0, 1). */
  readonly uniform: () => number;
  /** Standard normal. */
  readonly normal: () => number;
  /** Poisson count; `mean` up to about 100. */
  readonly poisson: (mean: number) => number;
  /** A whole number from `low` to `high`, both included. */
  readonly whole: (low: number, high: number) => number;
  readonly pick: <T>(list: readonly T[]) => T;
  /** A UUIDv7 of the given time, milliseconds since 1970. */
  readonly id: (timeMs: number) => string;
};

/** 32 bits from a text: FNV-1a (Fowler, Noll, Vo; RFC 9923), followed by a murmur finaliser so that near texts differ. */
function hash32(text: string): number {
  let hash = 0x811c9dc5;
  for (let i = 0; i < text.length; i += 1) hash = Math.imul(hash ^ text.charCodeAt(i), 0x01000193);
  hash = Math.imul(hash ^ (hash >>> 16), 0x85ebca6b);
  hash = Math.imul(hash ^ (hash >>> 13), 0xc2b2ae35);
  return (hash ^ (hash >>> 16)) >>> 0;
}

/**
 * A stream of draws. Give each purpose a stream of its own (`seed/what for`), so that one more draw for one purpose
 * changes nothing elsewhere. Generator: sfc32 (Doty-Humphrey, PractRand), of which the first 15 draws are dropped.
 */
export function seededRandom(seed: string): SeededRandom {
  let a = hash32(`${seed}#a`);
  let b = hash32(`${seed}#b`);
  let c = hash32(`${seed}#c`);
  let counter = 1;
  const next32 = () => {
    const sum = (((a + b) | 0) + counter) | 0;
    counter = (counter + 1) | 0;
    a = b ^ (b >>> 9);
    b = (c + (c << 3)) | 0;
    c = (c << 21) | (c >>> 11);
    c = (c + sum) | 0;
    return sum >>> 0;
  };
  for (let i = 0; i < 15; i += 1) next32();

  const uniform = () => next32() / 2 ** 32;
  const whole = (low: number, high: number) => low + Math.floor(uniform() * (high - low + 1));
  return {
    uniform,
    // Box–Muller; the second of the pair is not kept, so that a draw never depends on the one before.
    normal: () => Math.sqrt(-2 * Math.log(1 - uniform())) * Math.cos(2 * Math.PI * uniform()),
    poisson: (mean) => {
      // Knuth's product method: slow for large means, exact for all.
      const limit = Math.exp(-mean);
      let count = 0;
      for (let product = uniform(); product > limit; product *= uniform()) count += 1;
      return count;
    },
    whole,
    pick: (list) => {
      if (list.length === 0) throw new RangeError('There is nothing to pick from.');
      return list[whole(0, list.length - 1)]!;
    },
    id: (timeMs) => v7({ msecs: timeMs, random: Uint8Array.from({ length: 16 }, () => next32() & 0xff) }),
  };
}
