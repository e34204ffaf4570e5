/** A wish for the turning as it is written in a throw file: rounded, its axis by name or in the model's frame. */

import type { WayWish } from "../aim/way.js";
import type { Rounding } from "../aim/wish-for.js";
import { rotate, rotateBack } from "../math/quat.js";
import { distance, normalize, type Vec3 } from "../math/vec3.js";
import { propDirection } from "../prop/directions.js";
import type { Prop } from "../prop/prop.js";

/** `spin` as it is written in a throw file. */
export interface WrittenSpin {
  axis?: string | Vec3;
  turns?: number;
  rate?: number;
}

const NAMES = ["long", "-long", "middle", "-middle", "short", "-short"] as const;

/** Those of `NAMES`, in the principal frame. */
export const plainAxes = (prop: Prop): Vec3[] =>
  NAMES.map((name) => rotateBack(prop.principal.axes, propDirection(prop, name)));

const thousandths = (value: number): number => Math.round(value * 1000) / 1000 + 0;

/** In the model's frame, as it is written. */
const modelAxis = (prop: Prop, axis: Vec3): Vec3 => {
  const [x, y, z] = rotate(prop.principal.axes, axis);
  return [thousandths(x), thousandths(y), thousandths(z)];
};

export const rounding = (prop: Prop): Rounding => ({
  axis: (axis) => normalize(rotateBack(prop.principal.axes, modelAxis(prop, axis))),
  turns: (turns) => Math.round(turns * 100) / 100,
});

/** @param open s: the time of a flight that a floor ends, where a rate is written, as no count of turns goes with that */
export function written(prop: Prop, { axis, turns = 0 }: WayWish, open?: number): WrittenSpin {
  const named = axis && NAMES[plainAxes(prop).findIndex((plain) => distance(plain, axis) < 1e-9)];
  const amount = open === undefined ? { turns } : { rate: thousandths(turns / open) };
  return { ...(axis && { axis: named ?? modelAxis(prop, axis) }), ...amount };
}
