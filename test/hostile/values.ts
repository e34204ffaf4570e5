/** Values that are wrong, extreme or in the wrong place. */

import type { Chance } from "./chance.js";

const NUMBERS = [
  0,
  -0,
  1,
  -1,
  0.5,
  2,
  3.7,
  -12,
  360,
  1000,
  2001,
  65_535,
  1e6,
  2 ** 31,
  2 ** 32,
  2 ** 53,
  1e12,
  -1e12,
  1e-3,
  1e-7,
  1e-12,
  1e-160,
  5e-324,
  1e39,
  1e154,
  1e300,
  Number.MAX_VALUE,
  Number.EPSILON,
];

/** A number like this one, or far from it. */
export function otherNumber(chance: Chance, value: number): number {
  const way = chance.below(8);
  if (way === 0) return -value;
  if (way === 1) return Math.round(value);
  if (way === 2) return value * 10 ** (chance.below(13) - 6);
  if (way === 3) return value + chance.below(5) - 2;
  if (way < 6) return value * (0.5 + chance.part());
  return chance.pick(NUMBERS) * chance.pick([1, 1, -1]);
}

const WORDS = [
  "any",
  "rest",
  "release",
  "free",
  "up",
  "down",
  "ahead",
  "back",
  "left",
  "right",
  "flight",
  "long",
  "middle",
  "short",
  "-short",
  "x",
  "-y",
  "grip",
  "centerOfMass",
  "low",
  "high",
  "even",
  "chance",
  "linear",
  "cubic",
  "smallest",
  "frames",
  "one-node",
  "two-node",
  "turn-only",
  "per-throw",
  "per-take",
  "together",
  "glb",
  "gltf",
  "int16",
  "auto",
  "hull",
  "surface",
  "0..1",
  "1..0",
  "-1..1e9",
  "1 ± 0.2",
  "2 +- 1e300",
  "5f",
  "5f..9f",
  "1e9f",
  "0f",
  ".inf",
  ".nan",
  "1_000",
  "0x1f",
  "constructor",
  "__proto__",
  "toString",
  "",
  " ",
  "..",
  "../..",
  "/",
  "con",
  "\u0000",
  "\u202e",
  "\ud800",
  "ſ",
  "a".repeat(300),
];

/** Any value at all. */
export function anyValue(chance: Chance, depth = 0): unknown {
  const way = chance.below(depth > 3 ? 6 : 10);
  if (way < 2) return chance.pick(NUMBERS) * chance.pick([1, 1, -1]);
  if (way < 5) return chance.pick(WORDS);
  if (way === 5) return chance.pick<unknown>([null, true, false, {}, [], { toString: 1 }]);
  const values = (count: number) => Array.from({ length: count }, () => anyValue(chance, depth + 1));
  if (way === 6) return values(3);
  if (way === 7) return { [chance.pick(["pick", "each"])]: values(chance.few(4)) };
  if (way === 8) return values(chance.below(6));
  return Object.fromEntries(values(chance.few(3)).map((value) => [chance.pick(WORDS), value]));
}
