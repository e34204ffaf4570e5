/** Which keys about turning, orientation and limits go together. */

import { shown } from "./errors.js";
import { isObject } from "./form.js";
import type { Rules } from "./rules.js";

const FACING = "arrive.facing";

export function checkSpin(rules: Rules): void {
  const { has, together, tell } = rules;
  together(["release.angularVelocity", "spin"]);
  together(["release.angularVelocity", FACING], "the spin is solved so that arrive.facing comes true");
  together(["spin.turns", "spin.rate"]);
  for (const key of ["spin.wobble", "spin.phase"])
    together([key as string, FACING], "an orientation at arrival leaves no freedom for it");
  if (has("spin") && !has(FACING)) checkAxis(rules);
  if (has("spin.turns") && has("arrive.floor"))
    rules.tellLatest(
      ["spin.turns", "arrive.floor"],
      "a count of turns and an open end exclude each other (found spin.turns and arrive.floor)",
      "use spin.rate",
    );
  if (has("arrive.scatter") && !has(FACING))
    tell(
      "arrive.scatter",
      "no orientation to scatter (found no arrive.facing)",
      `add ${FACING} or drop arrive.scatter`,
    );
  if (words(rules.value(FACING)).includes("rest")) {
    if (!has("arrive.floor"))
      tell(
        FACING,
        "rest needs a floor (found no arrive.floor)",
        "add arrive.floor, or name another orientation",
      );
    if (has("arrive.scatter"))
      rules.tellLatest(
        ["arrive.scatter", FACING],
        "what rests is not scattered (found arrive.scatter and rest)",
        "drop arrive.scatter",
      );
  }
  checkLimits(rules);
}

/** A spin that nothing solves needs an axis and an amount. */
function checkAxis({ has, tell }: Rules): void {
  const amount = has("spin.turns") || has("spin.rate");
  if (!has("spin.axis"))
    tell(
      "spin",
      `no axis${has("spin.turns") ? " (found spin.turns)" : has("spin.rate") ? " (found spin.rate)" : ""}`,
      amount ? "add spin.axis" : "add spin.axis and spin.turns or spin.rate, or drop spin",
    );
  else if (!amount)
    tell("spin", "an axis without an amount (found spin.axis)", "add spin.turns or spin.rate");
}

function checkLimits({ has, value, tell, tellLatest }: Rules): void {
  const low = value("limits.minHeight");
  const high = value("limits.maxHeight");
  if (typeof low === "number" && typeof high === "number" && low >= high)
    tellLatest(
      ["limits.minHeight", "limits.maxHeight"],
      `no height is left (found minHeight ${low} and maxHeight ${high})`,
      "minHeight below maxHeight",
    );
  const axis = value("spin.axis");
  if (has("limits.share") && (axis === undefined || words(axis).includes("any")))
    tell(
      "limits.share",
      `a share of the turning about no axis (found spin.axis ${shown(axis)})`,
      "name spin.axis, or drop limits.share",
    );
}

/** The word that stands there, or those chosen from. */
export function words(value: unknown): unknown[] {
  if (!isObject(value)) return [value];
  for (const key of ["pick", "each"]) if (Array.isArray(value[key])) return value[key];
  return [value];
}
