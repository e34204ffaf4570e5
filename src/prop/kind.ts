import { exp } from "../math/elementary.js";
import type { Vec3 } from "../math/vec3.js";
import { NAMES_TIE, tieGroups } from "./principal.js";

/** What a body is to mechanics; moments within 1 % count as equal. */
export type BodyKind = "spherical top" | "oblate symmetric top" | "prolate symmetric top" | "asymmetric top";

/** What becomes of a spin about a principal axis that was tilted a little at the start. */
export type AxisBehaviour =
  /** The axis circles the angular momentum, that often per turn, and stays as near to it as it began. */
  | { readonly behaviour: "steady"; readonly wobblesPerTurn: number }
  /** The tilt grows by this factor per turn, until the body turns over. */
  | { readonly behaviour: "tumbles"; readonly growthPerTurn: number }
  /** One of several axes of equal moment: the body turns slowly round its own odd axis, at a rate that grows with the tilt. */
  | { readonly behaviour: "drifts" };

export interface Kind {
  readonly kind: BodyKind;
  readonly axes: {
    readonly long: AxisBehaviour;
    readonly middle: AxisBehaviour;
    readonly short: AxisBehaviour;
  };
}

/**
 * The kind of body with these principal moments (ascending, all above 0), and what a throw about each axis does, in the limit
 * of a small tilt.
 *
 * Near a steady axis a the angular momentum goes round it in the body at κ times the spin, κ² = (I_a − I_b)(I_a − I_c) / (I_b I_c),
 * the way the body turns where I_a is the greatest moment and the other way where it is the least (Landau & Lifshitz, Mechanics, §37,
 * small oscillations about the axes). Seen from outside the axis therefore goes round it 1 + κ or 1 − κ times per turn; for a
 * symmetric top both are I_a / I_b, the regular precession of §33: rate L / I_b where the spin is L / I_a. Near the middle axis the
 * tilt grows as exp(γ × angle), γ² = (I2 − I1)(I3 − I2) / (I1 I3).
 */
export function kindOf(moments: Vec3): Kind {
  const groups = tieGroups(moments, NAMES_TIE);
  const [a, b, c] = moments;
  const long: AxisBehaviour = {
    behaviour: "steady",
    wobblesPerTurn: 1 - Math.sqrt(((b - a) * (c - a)) / (b * c)),
  };
  const short: AxisBehaviour = {
    behaviour: "steady",
    wobblesPerTurn: 1 + Math.sqrt(((c - a) * (c - b)) / (a * b)),
  };
  if (groups.length === 1) {
    const any: AxisBehaviour = { behaviour: "steady", wobblesPerTurn: 1 };
    return { kind: "spherical top", axes: { long: any, middle: any, short: any } };
  }
  const drifts: AxisBehaviour = { behaviour: "drifts" };
  if (groups.length === 3) {
    const rate = Math.sqrt(((b - a) * (c - b)) / (a * c));
    const middle: AxisBehaviour = { behaviour: "tumbles", growthPerTurn: exp(2 * Math.PI * rate) };
    return { kind: "asymmetric top", axes: { long, middle, short } };
  }
  return groups[0].length === 2
    ? { kind: "oblate symmetric top", axes: { long: drifts, middle: drifts, short } }
    : { kind: "prolate symmetric top", axes: { long, middle: drifts, short: drifts } };
}
