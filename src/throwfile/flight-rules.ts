/** What fixes the flight: which keys of a throw go together, told before any number is drawn. */

import type { Rules } from "./rules.js";

const AFTER = "arrive.after";
const AT = "arrive.at";
const FLOOR = "arrive.floor";
const VELOCITY = "release.velocity";
const HEADING = "arc.heading";
const SPEED = "arc.speed";
const SHAPE = ["arc.speed", "arc.elevation", "arc.apex", "arc.through"];
const TO_MARK = [AFTER, "arc.apex", "arc.through", SPEED, "arc.elevation"];

/** Counts the conditions; `turnOnly`: the bake moves nothing, so a flight time is enough. */
export function checkFlight(rules: Rules, turnOnly: boolean): void {
  const { has, together, tell } = rules;
  const free = rules.value("gravity") === "free";
  if (together([AT, FLOOR])) return;
  if (has(AT)) {
    if (together([AT, VELOCITY])) return;
    if (has(HEADING))
      rules.tellLatest(
        [HEADING, AT],
        `${AT} already says where it goes (found ${HEADING} too)`,
        `drop ${HEADING} or ${AT}`,
      );
    count(rules, TO_MARK, free ? 2 : 1, AT, free);
    const given = TO_MARK.filter(has);
    if (free && given.length === 2 && !has(AFTER) && !has(SPEED))
      tell(
        "gravity",
        `${list(given)} hold at any gravity, so none can be solved (found free)`,
        `one of the two must be ${AFTER} or ${SPEED}`,
      );
    return;
  }
  const launch = [VELOCITY, HEADING, ...SHAPE].filter(has);
  if (launch.length === 0) {
    if (turnOnly && has(AFTER)) {
      for (const key of ["limits.minHeight", "limits.maxHeight", "limits.clear", "limits.speed"])
        if (has(key))
          tell(
            key,
            "without a flight there is nothing to hold (found no place or launch)",
            `drop ${key}, or say where it flies`,
          );
      if (free)
        tell(
          "gravity",
          "without a flight there is none to solve (found free)",
          "drop gravity, or say where it flies",
        );
      return;
    }
    tell(
      "",
      "nothing says where it flies",
      turnOnly
        ? `add ${AFTER}`
        : `add ${AT} and one of ${list(TO_MARK, "or")}; or a launch (${VELOCITY}, or ${HEADING} and two of ${list(SHAPE)}) and ${AFTER} or ${FLOOR}`,
    );
    return;
  }
  if (has(VELOCITY)) {
    const extra = [HEADING, SPEED, "arc.elevation", ...(free ? [] : ["arc.apex", "arc.through"])].filter(has);
    if (extra.length > 0)
      rules.tellLatest(
        [VELOCITY, ...extra],
        `${VELOCITY} already fixes the launch (found ${list(extra)} too)`,
        `drop ${extra.length === 1 ? extra[0] : "these"} or ${VELOCITY}`,
      );
    if (free) count(rules, ["arc.apex", "arc.through"], 1, VELOCITY, free);
  } else if (!has(HEADING)) {
    tell("", `no direction for the launch (found ${list(launch)})`, `add ${HEADING}, or ${AT} instead`);
  } else {
    count(rules, SHAPE, free ? 3 : 2, HEADING, free);
    if (free && !has(SPEED) && SHAPE.filter(has).length === 3)
      tell(
        "gravity",
        "no gravity follows from the shape of the arc alone (found free)",
        `one of the three must be ${SPEED}`,
      );
  }
  if (together([AFTER, FLOOR])) return;
  if (!has(AFTER) && !has(FLOOR))
    tell("", `nothing ends the flight (found ${list(launch)})`, `add ${AFTER} or ${FLOOR}`);
}

/** Exactly `wanted` of `keys` beside `base`. */
function count(rules: Rules, keys: string[], wanted: number, base: string, free: boolean): void {
  const given = keys.filter(rules.has);
  const missing = wanted - given.length;
  const why = free ? " and gravity: free" : "";
  const how = (n: number) => ["", "one", "two", "three", "four", "five"][n];
  if (missing > 0) {
    const rest = keys.filter((key) => !given.includes(key));
    rules.tell(
      "",
      `too little fixes the flight (found ${list([base, ...given])}${why})`,
      `add ${missing === rest.length ? list(rest) : `${how(missing)} of ${list(rest, "or")}`}`,
    );
  } else if (missing < 0) {
    const one = missing === -1 && given.length === 2;
    const timed = given.includes(SPEED) || (base === AT && given.includes(AFTER));
    const canFree = !free && missing === -1 && timed;
    const option = canFree ? ", or write gravity: free to have it solved" : "";
    rules.tellLatest(
      given,
      `too much fixes the flight (found ${list([base, ...given])}${why})`,
      `drop ${one ? list(given, "or") : `${how(-missing)} of ${list(given)}`}${option}`,
    );
  }
}

function list(keys: readonly string[], last = "and"): string {
  return keys.length < 2 ? keys.join("") : `${keys.slice(0, -1).join(", ")} ${last} ${keys[keys.length - 1]}`;
}
