import seedrandom from "seedrandom";

/** Names one draw: nothing else bears on what it gives. */
export interface StreamName {
  seed: string;
  throwName: string;
  /** From 1. */
  take: number;
  /** From 1. */
  candidate: number;
  /** Keys from the throw inwards. */
  path: readonly (string | number)[];
}

/**
 * The numbers of one draw, each evenly from 0 (included) to 1 (excluded) in steps of 2⁻⁵³.
 *
 * seedrandom's generator (RC4, its first 256 bytes dropped) keyed with the name as JSON in ASCII. Of its outputs only `int32` is used: its own
 * doubles rest on Math.pow. Two of them make a number as Matsumoto & Nishimura's genrand_res53 does (mt19937ar, 2002).
 */
export function stream(name: StreamName): () => number {
  const key = JSON.stringify([name.seed, name.throwName, name.take, name.candidate, name.path]);
  const generator = seedrandom(key.replace(/[^ -~]/g, escaped));
  return () => {
    const high = generator.int32() >>> 5;
    const low = generator.int32() >>> 6;
    return (high * 67108864 + low) / 9007199254740992;
  };
}

/** The generator takes a character for its low byte: others are spelt out as JSON does. */
const escaped = (character: string): string => `\\u${character.charCodeAt(0).toString(16).padStart(4, "0")}`;
