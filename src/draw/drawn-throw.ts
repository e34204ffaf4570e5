import type { Quat } from "../math/quat.js";
import type { Vec3 } from "../math/vec3.js";
import type { Limits, WorldDirectionName } from "../throwfile/types.js";

/**
 * One throw without spreads: the tree of `ThrowEntry` with every value drawn. Numbers are the throw file's (the host's axes and units, degrees);
 * what was left to chance is drawn evenly, which is the same in any axes.
 */
export interface DrawnThrow {
  readonly name: string;
  readonly prop: string;
  readonly gravity?: number | "free";
  readonly release: {
    readonly at?: Vec3;
    readonly point: string;
    readonly facing?: DrawnFacing;
    readonly scatter?: DrawnScatter;
    readonly velocity?: Vec3;
    readonly angularVelocity?: Vec3;
  };
  readonly arrive: {
    readonly at?: Vec3;
    /** That of the release where none is stated. */
    readonly point: string;
    readonly after?: number;
    readonly facing?: DrawnArrivalFacing;
    readonly scatter?: DrawnScatter;
    readonly floor?: number;
  };
  readonly arc: {
    readonly apex?: number;
    readonly through?: Vec3;
    readonly speed?: number;
    readonly elevation?: number;
    readonly heading?: number;
    readonly branch: "low" | "high";
  };
  readonly spin?: {
    /** A word, or a vector in the prop's frame. `any` is such a vector; with an `arrive.facing` it wishes for nothing and is absent. */
    readonly axis?: string | Vec3;
    readonly turns?: number;
    readonly rate?: number;
    readonly wobble?: number;
    /** Degrees; where the throw file leaves it open, drawn. */
    readonly phase: number;
  };
  readonly limits?: Limits;
  readonly hold: { readonly before: number; readonly after: number };
  /** Everything that was drawn, by dotted key path, in the order of this tree. */
  readonly draws: Readonly<Record<string, unknown>>;
}

/** [direction of the prop, direction of the world]: words or vectors. */
export type DrawnPair = readonly [string | Vec3, WorldDirectionName | Vec3];

export type DrawnFacing =
  | readonly [DrawnPair]
  | readonly [DrawnPair, DrawnPair]
  /** From the modelled pose; any length but zero, as written. */
  | { readonly rotation: Quat; readonly point?: string }
  /** `any`: from the modelled pose, unit length. */
  | { readonly orientation: Quat };

export type DrawnArrivalFacing =
  | DrawnFacing
  | "release"
  /** Which of the faces the prop can rest on: 0 to 1 (excluded), of all orientations those that tip onto it. */
  | { readonly rest: number };

/** Degrees by which the pose is turned about an evenly drawn unit vector (world). */
export interface DrawnScatter {
  readonly angle: number;
  readonly axis: Vec3;
}

export { drawThrow } from "./draw-throw.js";
