/** What sheets are drawn from: plain data, whoever baked it. */

import type { Motion, TakeMotion } from "../bake/take-motion.js";
import type { Quat } from "../math/quat.js";
import type { Vec3 } from "../math/vec3.js";
import type { Prop } from "../prop/prop.js";
import type { Solid } from "./outline.js";

/** A prop as sheets show it; model's frame, m. */
export interface SheetProp {
  name: string;
  solid: Solid;
  /** Turns x, y, z onto long, middle, short. */
  axes: Quat;
  centerOfMass: Vec3;
  points?: Readonly<Record<string, Vec3>>;
  /** Of the furthest point from the centre of mass. */
  reach: number;
}

export interface SheetFlight {
  /** Of the throw. */
  name?: string;
  from: number;
  to: number;
}

export interface SheetTake {
  /** Of the clip. */
  name: string;
  motion: Motion;
  /** Marks, cues and how the take was launched; of a clip that tossbake did not bake none is known. */
  take?: TakeMotion;
  /** In all; worked out where it is left out. */
  turns?: number;
  /** Where no take is known, the flights within the clip, s; left out, the whole clip is one. */
  flights?: readonly SheetFlight[];
}

/** A throw or chain, or any clip of one rigid body. */
export interface ThrowSheetInput {
  /** Name of the throw or chain. */
  title: string;
  prop: SheetProp;
  /** At least one. */
  takes: readonly SheetTake[];
  /** How many there are in all, where these are but some of them. */
  takeCount?: number;
}

export const sheetProp = (prop: Prop, solid: Solid): SheetProp => ({
  name: prop.name,
  solid,
  axes: prop.principal.axes,
  centerOfMass: prop.centerOfMass,
  points: Object.fromEntries(Object.entries(prop.points).map(([name, { position }]) => [name, position])),
  reach: prop.reach,
});
