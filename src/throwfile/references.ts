/** What a throw names: points of its prop, and directions of the world that must be known. */

import { WORLD_DIRECTIONS } from "../aim/world-directions.js";
import { shown } from "./errors.js";
import type { Tell } from "./form.js";
import { nearest, nearestHint } from "./nearest.js";
import { isSpread, PROP_DIRECTIONS, type ThrowEntry } from "./types.js";

type KeyPart = string | number;

/** `points`: names of the prop's. */
export function checkReferences(entry: ThrowEntry, points: readonly string[], tell: Tell): void {
  const { release, arrive, arc, spin } = entry;
  const aimed = arrive.at !== undefined || arc.heading !== undefined || release.velocity !== undefined;

  const point = (word: unknown, path: KeyPart[]) => {
    if (typeof word !== "string" || word === "centerOfMass" || points.includes(word)) return;
    tell(
      `no point of prop ${shown(entry.prop)} (found ${shown(word)})`,
      `${nearestHint(word, ["centerOfMass", ...points], "point")} (a place and axes are given under props.${entry.prop}.points)`,
      ...path,
    );
  };
  const axes = (word: unknown, path: KeyPart[]) => {
    if (word === "centerOfMass")
      tell("a point without axes (found centerOfMass)", "a named point, or no point at all", ...path);
    else point(word, path);
  };
  const world = (word: unknown, path: KeyPart[]) => {
    if (aimed || typeof word !== "string" || !AIMED.includes(word)) return;
    tell(
      `no such direction here (found ${shown(word)})`,
      "needs arrive.at, arc.heading or release.velocity; else up, down or [x, y, z]",
      ...path,
    );
  };
  const prop = (word: unknown, path: KeyPart[], more: readonly string[] = []) => {
    if (typeof word !== "string") return;
    const bare = word.replace(/^-/, "");
    const known = [...PROP_DIRECTIONS, ...points, ...more];
    if (known.includes(bare)) return;
    tell(
      `neither a direction nor a point of prop ${shown(entry.prop)} (found ${shown(word)})`,
      `the nearest is ${nearest(bare, known)} (a direction: ${[...PROP_DIRECTIONS, ...more].join(", ")}; or a point)`,
      ...path,
    );
  };
  const facing = (value: unknown, path: KeyPart[]) => {
    if (Array.isArray(value))
      for (const [i, pair] of value.entries()) {
        each(pair[0], [...path, i, 0], prop);
        each(pair[1], [...path, i, 1], world);
      }
    else if (typeof value === "object" && value !== null && "point" in value)
      each(value.point, [...path, "point"], axes);
  };

  each(release.point, ["release", "point"], point);
  each(arrive.point, ["arrive", "point"], point);
  each(release.facing, ["release", "facing"], facing);
  each(arrive.facing, ["arrive", "facing"], facing);
  each(spin?.axis, ["spin", "axis"], (word, path) => {
    if (isWorld(word)) world(word, path);
    else prop(word, path, [...WORLD_DIRECTIONS, "any"]);
  });
}

/** Directions that lie in the line of the throw. */
const AIMED: readonly string[] = ["ahead", "back", "left", "right", "flight"];

const isWorld = (word: unknown) => (WORLD_DIRECTIONS as readonly unknown[]).includes(word);

/** The value, or every one that is chosen from, with its path. */
function each(value: unknown, path: KeyPart[], visit: (value: unknown, path: KeyPart[]) => void): void {
  if (!isSpread(value)) {
    visit(value, path);
    return;
  }
  const key = "pick" in value ? "pick" : "each";
  const choices = (value as Record<string, unknown>)[key];
  if (Array.isArray(choices)) for (const [i, item] of choices.entries()) visit(item, [...path, key, i]);
}
