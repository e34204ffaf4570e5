import { exp } from "../math/elementary.js";
import type { Vec3 } from "../math/vec3.js";
import { NAMES_TIE, tieGroups } from "./principal.js";
import { typicalWobble } from "./wobble.js";

/** What a body is to mechanics; moments within 1 % count as equal. */
export type BodyKind = "spherical top" | "oblate symmetric top" | "prolate symmetric top" | "asymmetric top";

/** The axis that a body turns about while another of its axes turns over. */
type TurnsRound = "long" | "short";

/** What a throw about a principal axis does. "At the wobble": with the angular momentum tilted by `WOBBLE_DEGREES`. */
export type AxisBehaviour =
  /** The axis circles the angular momentum and stays as near to it as it began. */
  | {
      readonly behaviour: "steady";
      /** How often it goes round per turn, for a tilt near zero, and at the wobble. */
      readonly wobblesPerTurn: number;
      readonly wobblesPerTurnAtWobble: number;
    }
  /** Any tilt grows by this factor per turn, until the body turns over: at the wobble every so many turns. */
  | {
      readonly behaviour: "tumbles";
      readonly growthPerTurn: number;
      readonly turnsPerFlip: number;
      readonly turnsRound: TurnsRound;
    }
  /** Steady without a wobble only: at the wobble the spin leans to another axis, round which this one turns over soon. */
  | { readonly behaviour: "leans"; readonly turnsPerFlip: number; readonly turnsRound: TurnsRound }
  /** As good as steady for a while: at the wobble it turns over after more than ten turns. */
  | { readonly behaviour: "drifts"; readonly turnsPerFlip: number; readonly turnsRound: TurnsRound };

/** What a body is, and what a throw about each of its principal axes does. */
export interface Kind {
  readonly kind: BodyKind;
  readonly axes: {
    readonly long: AxisBehaviour;
    readonly middle: AxisBehaviour;
    readonly short: AxisBehaviour;
  };
}

/** The default of `spin.wobble` about a middle axis. */
export const WOBBLE_DEGREES = 3;
/** What turns over within so many turns at the wobble is not steady. */
const SOON = 10;
/** Growth per turn from which a tilt of its own makes a body turn over; below it is the lean of a slender one. */
const GROWS = 2;

/** The kind of body with these principal moments (ascending, all above 0), and what a throw about each axis does. */
export function kindOf(moments: Vec3): Kind {
  return {
    kind: bodyKind(moments),
    axes: { long: behaviourOf(moments, 0), middle: behaviourOf(moments, 1), short: behaviourOf(moments, 2) },
  };
}

function bodyKind(moments: Vec3): BodyKind {
  const groups = tieGroups(moments, NAMES_TIE);
  if (groups.length === 1) return "spherical top";
  if (groups.length === 3) return "asymmetric top";
  return groups[0].length === 2 ? "oblate symmetric top" : "prolate symmetric top";
}

/**
 * In the small: near a steady axis a the angular momentum goes round it in the body at κ times the spin, κ² = (I_a − I_b)(I_a − I_c) / (I_b I_c),
 * the way the body turns where I_a is the greatest moment and the other way where it is the least (Landau & Lifshitz, Mechanics, §37,
 * small oscillations about the axes). Seen from outside the axis therefore goes round it 1 + κ or 1 − κ times per turn; for a
 * symmetric top both are I_a / I_b, the regular precession of §33: rate L / I_b where the spin is L / I_a. Near the middle axis the
 * tilt grows as exp(γ × angle), γ² = (I2 − I1)(I3 − I2) / (I1 I3).
 */
function behaviourOf(moments: Vec3, axis: 0 | 1 | 2): AxisBehaviour {
  const [a, b, c] = moments;
  const { turnsPerFlip, round, wobblesPerTurn } = typicalWobble(
    moments,
    axis,
    (WOBBLE_DEGREES * Math.PI) / 180,
  );
  if (turnsPerFlip === Number.POSITIVE_INFINITY) {
    const kappa =
      axis === 0
        ? -Math.sqrt(((b - a) * (c - a)) / (b * c))
        : axis === 2
          ? Math.sqrt(((c - a) * (c - b)) / (a * b))
          : 0;
    return { behaviour: "steady", wobblesPerTurn: 1 + kappa, wobblesPerTurnAtWobble: wobblesPerTurn };
  }
  const turnsRound = round === 0 ? "long" : "short";
  if (turnsPerFlip > SOON) return { behaviour: "drifts", turnsPerFlip, turnsRound };
  const growthPerTurn = axis === 1 ? exp(2 * Math.PI * Math.sqrt(((b - a) * (c - b)) / (a * c))) : 1;
  return growthPerTurn < GROWS
    ? { behaviour: "leans", turnsPerFlip, turnsRound }
    : { behaviour: "tumbles", growthPerTurn, turnsPerFlip, turnsRound };
}
