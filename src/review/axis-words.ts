/** What a throw about a principal axis does, in words for people who never heard of a wobble's rate. */

import { type AxisBehaviour, WOBBLE_DEGREES } from "../prop/kind.js";

/** Goes on from "a throw about it …". */
export function throwAbout(axis: AxisBehaviour): string {
  const off = `started ${WOBBLE_DEGREES}° off`;
  switch (axis.behaviour) {
    case "steady":
      return `stays steady; ${off}, the axis stays as near and circles ${rate(axis.wobblesPerTurn)}`;
    case "tumbles":
      return `tumbles: whatever it is off grows ${figures(axis.growthPerTurn)}-fold with each turn; ${off}, it ${turning(axis)}`;
    case "leans":
      return `stays steady only if nothing is off: ${off}, the spin leans over to the ${axis.turnsRound} axis, and it ${turning(axis)}`;
    case "drifts":
      return `stays steady for some turns: ${off}, it ${turning(axis)}`;
  }
}

/** The same in a word or two. */
export const throwAboutInShort = (axis: AxisBehaviour): string =>
  ({
    steady: "stays steady",
    tumbles: "tumbles",
    leans: "stays steady only if nothing is off",
    drifts: "stays steady for some turns",
  })[axis.behaviour];

function turning({ turnsPerFlip, turnsRound }: Exclude<AxisBehaviour, { behaviour: "steady" }>): string {
  return turnsPerFlip < 0.5
    ? `rolls round the ${turnsRound} axis ${rate(1 / (2 * turnsPerFlip))}`
    : `turns over, round the ${turnsRound} axis, every ${turnsPerFlip === 1 ? "turn" : `${figures(turnsPerFlip)} turns`}`;
}

/** "twice a turn", "once in 52 turns" */
function rate(perTurn: number): string {
  if (perTurn < ALMOST_NEVER) return "hardly at all";
  const text = figures(perTurn);
  if (text === "1") return "once a turn";
  if (text === "2") return "twice a turn";
  return perTurn > 1 ? `${text} times a turn` : `once in ${figures(1 / perTurn)} turns`;
}

/** Times a turn: nobody sees it. */
const ALMOST_NEVER = 1e-4;

const figures = (value: number): string => String(Number(value.toPrecision(3)));
