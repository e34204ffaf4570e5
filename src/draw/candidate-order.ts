/** Which candidate of a take is tried first, second, … */

import type { ThrowEntry } from "../throwfile/types.js";
import { drawDistance, type Features } from "./distance.js";
import { type DrawContext, drawCandidate } from "./draw-throw.js";

/** Candidates a take has before it is given up. */
const MOST_CANDIDATES = 1000;
/** Of these the most unlike is taken. */
const COMPARED = 32;
/** Takes that keep clear of one another. */
const BLOCK = 256;

/** Whose candidates are meant. */
export type TakeContext = Omit<DrawContext, "candidate">;

/**
 * A take's candidates in order of preference, from 1 to 1,000, lazily; candidate 1 alone where nothing is left to chance.
 *
 * `vary: chance`: 1, 2, 3, … `vary: even`: of the first 32 the one whose draws are furthest from the nearest of the first choices of the
 * earlier takes of its block of 256 comes first, then the next furthest, equals by number, then 33, 34, … (Mitchell's best candidate, SIGGRAPH
 * 1991). The first take of a block has nothing to keep clear of: 1, 2, 3, … Nothing but draws decides, so a take can be made without another.
 *
 * First choices are remembered as long as the entry lives: a whole block costs 256 × 32 draws of the throw.
 */
export function* candidateOrder(entry: ThrowEntry, context: TakeContext): Iterable<number> {
  if (drawCandidate(entry, { ...context, candidate: 1 }).features.size === 0) return yield 1;
  let next = 1;
  if (entry.vary === "even") {
    yield* preferred(entry, context);
    next = COMPARED + 1;
  }
  while (next <= MOST_CANDIDATES) yield next++;
}

/** First choices by block; a pure function of the key, remembered. */
const remembered = new WeakMap<ThrowEntry, Map<string, Features[]>>();

/** The compared candidates' numbers in order of preference. */
function preferred(entry: ThrowEntry, context: TakeContext): number[] {
  const { seed, throwName, wobblesByDefault } = context;
  const start = context.take - ((context.take - 1) % BLOCK);
  const blocks = remembered.get(entry) ?? new Map<string, Features[]>();
  remembered.set(entry, blocks);
  const key = JSON.stringify([seed, throwName, start, wobblesByDefault ?? null]);
  const choices = blocks.get(key) ?? [];
  blocks.set(key, choices);
  let order: number[] = [];
  for (let take = Math.min(context.take, start + choices.length); take <= context.take; take++) {
    const features = Array.from(
      { length: COMPARED },
      (_, i) => drawCandidate(entry, { ...context, take, candidate: i + 1 }).features,
    );
    order = ranked(features, choices.slice(0, take - start));
    if (choices.length === take - start) choices.push(features[order[0]]);
  }
  return order.map((index) => index + 1);
}

/** Indices of the candidates, the most unlike all earlier choices first. */
function ranked(candidates: readonly Features[], earlier: readonly Features[]): number[] {
  const clearance = candidates.map((candidate) =>
    earlier.reduce(
      (least, other) => Math.min(least, drawDistance(candidate, other)),
      Number.POSITIVE_INFINITY,
    ),
  );
  const indices = candidates.map((_, i) => i);
  return indices.sort((a, b) => (clearance[a] === clearance[b] ? a - b : clearance[b] - clearance[a]));
}
