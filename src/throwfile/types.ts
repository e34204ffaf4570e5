/**
 * A throw file, read and checked: the same tree as in the file, so that a value's path here is its key there. Angles stay
 * in degrees and numbers under `throws` in the host's axes and unit, as written; times are in seconds, frames already
 * converted. `like` is merged, keys with a plain default are filled in; an absent key is `undefined`.
 */

import type { WORLD_DIRECTIONS } from "../aim/world-directions.js";
import type { Vec3 } from "../math/vec3.js";
import type { Shape } from "../prop/shape-kind.js";

/** One of these, evenly; or take n gets the n-th, round and round. Never empty. */
export type Choice<T> = { readonly pick: readonly T[] } | { readonly each: readonly T[] };

/** A value still to be drawn. `T` is what comes out; only numbers have the first two. */
export type Spread<T> =
  /** Every value between has the same chance. With `frames` (a frame rate) only whole frames are drawn; the ends are in seconds. */
  | { readonly range: readonly [number, number]; readonly frames?: number }
  /** Bell curve: mean, standard deviation (0 or more); cut at three deviations. */
  | { readonly normal: readonly [number, number] }
  | Choice<T>;

/** What a plain value or a choice among such values is written as. */
export type Drawable<T> = T | Choice<T>;

export type DrawableNumber = number | Spread<number>;

/** Three numbers, each perhaps spread. */
export type SpreadVector = readonly [DrawableNumber, DrawableNumber, DrawableNumber];

/** Three numbers, each perhaps spread, or a choice among such vectors. */
export type DrawableVector = SpreadVector | Choice<SpreadVector>;

/** Four numbers [x, y, z, w], each perhaps spread, of any length but zero: normalise once drawn. */
export type SpreadQuat = readonly [DrawableNumber, DrawableNumber, DrawableNumber, DrawableNumber];

export function isSpread(value: unknown): value is Spread<unknown> {
  return (
    typeof value === "object" &&
    value !== null &&
    ("range" in value || "normal" in value || "pick" in value || "each" in value)
  );
}

/**
 * A direction of the prop, as written: one of `PROP_DIRECTIONS` or the name of one of its points, a leading `-` turns it
 * round; or [x, y, z] in the model's frame.
 */
export type PropDirection = string | SpreadVector;

/** A direction of the world, as written: one of `WORLD_DIRECTIONS` or [x, y, z]. */
export type WorldDirection = WorldDirectionName | SpreadVector;

export const PROP_DIRECTIONS = ["long", "middle", "short", "x", "y", "z"] as const;
export type WorldDirectionName = (typeof WORLD_DIRECTIONS)[number];

/** [direction of the prop, direction of the world] */
export type FacingPair = readonly [Drawable<PropDirection>, Drawable<WorldDirection>];

/** An orientation. */
export type Facing =
  /** The first pair holds exactly, the second as nearly as it can. */
  | readonly [FacingPair]
  | readonly [FacingPair, FacingPair]
  /** Rotation from the modelled pose; with `point`, of that point's axes. */
  | { readonly rotation: SpreadQuat | Choice<SpreadQuat>; readonly point?: Drawable<string> }
  /** Even over all orientations. */
  | "any"
  /** At arrival only: as it was at release. */
  | "release"
  /** At arrival on a floor only: flat on a stable face. */
  | "rest";

/** `props.NAME`, in the model's frame; not touched by `host`. */
export interface PropEntry {
  readonly name: string;
  /** A .glb or .gltf file, relative to the throw file. Exactly one of `model` and `shape` is there. */
  readonly model?: string;
  readonly shape?: Shape;
  /** Node of the model that is weighed and animated with all below it; default the whole scene. */
  readonly node?: string;
  /** Factor on the model, above 0; default 1. */
  readonly scale: number;
  /** kg/m³, 0 (left out) or more; a map goes from material or node name, `default` for the rest; default 1000. */
  readonly density: number | Readonly<Record<string, number>>;
  /** kg, above 0: the total. */
  readonly mass?: number;
  readonly solid: "auto" | "hull" | "surface";
  /** Wall thickness of thin surfaces, m, above 0. */
  readonly wall?: number;
  /** Point masses added, kg; default none. */
  readonly weights: readonly { readonly at: Vec3; readonly mass: number }[];
  /** m, scene frame of the model. */
  readonly centerOfMass?: Vec3;
  /** About the centre of mass, model's axes, kg m²: [xx, yy, zz] or [xx, yy, zz, xy, xz, yz] (tensor entries). */
  readonly inertia?: readonly number[];
  /** Own properties only (a point may be called `constructor`): a place in the model's scene frame, m, or a node. */
  readonly points: Readonly<Record<string, Vec3 | { readonly node: string }>>;
}

/** `throws.NAME` */
export interface ThrowEntry {
  readonly name: string;
  /** Name of a prop of this file. */
  readonly prop: string;
  /** How many (takes 1 to that), or the numbers wanted, ascending. See `takeNumbers`. */
  readonly takes: number | readonly number[];
  /** m/s² (host: its unit), 0 or more; default the file's, then `undefined`. `free` is solved for. */
  readonly gravity?: DrawableNumber | "free";
  readonly release: {
    /** Place of the release point at time 0, m; default where the model stands. */
    readonly at?: DrawableVector;
    /** `centerOfMass` or a named point. */
    readonly point: Drawable<string>;
    /** Never `release` or `rest`; default as modelled. */
    readonly facing?: Drawable<Facing>;
    /** Degrees, 0 to 180. */
    readonly scatter?: DrawableNumber;
    /** Of the release point, m/s. */
    readonly velocity?: DrawableVector;
    /** World frame, rad/s. */
    readonly angularVelocity?: DrawableVector;
  };
  readonly arrive: {
    /** Place of the arrival point at the end, m. */
    readonly at?: DrawableVector;
    /** Default what `release.point` is (drawn once for both). */
    readonly point?: Drawable<string>;
    /** Flight time, s, above 0. */
    readonly after?: DrawableNumber;
    readonly facing?: Drawable<Facing>;
    /** Degrees, 0 to 180. */
    readonly scatter?: DrawableNumber;
    /** Height, m. */
    readonly floor?: DrawableNumber;
  };
  readonly arc: {
    /** Rise of the centre of mass above its place at release, m, 0 or more. */
    readonly apex?: DrawableNumber;
    readonly through?: DrawableVector;
    /** m/s, 0 or more. */
    readonly speed?: DrawableNumber;
    /** Degrees above level, -90 to 90. */
    readonly elevation?: DrawableNumber;
    /** Degrees about +Y from +Z towards +X (of glTF). */
    readonly heading?: DrawableNumber;
    readonly branch: Drawable<"low" | "high">;
  };
  readonly spin?: {
    /** A word of the prop's or the world's directions, or `any`; a vector is the prop's. */
    readonly axis?: Drawable<PropDirection | WorldDirection | "any">;
    /** At most one of `turns` and `rate` (turns per second). */
    readonly turns?: DrawableNumber;
    readonly rate?: DrawableNumber;
    /** Degrees, 0 to below 90; default 0, but 3 near the middle axis of a body of three different moments. */
    readonly wobble?: DrawableNumber;
    /** Degrees; default drawn evenly. */
    readonly phase?: DrawableNumber;
  };
  readonly limits?: Limits;
  readonly vary: "even" | "chance";
  /** s, 0 or more. */
  readonly hold: { readonly before: DrawableNumber; readonly after: DrawableNumber };
}

/** Bounds every take holds: plain numbers, never drawn. */
export interface Limits {
  /** m */
  readonly minHeight?: number;
  readonly maxHeight?: number;
  /** Boxes no part of the prop enters: two corners, the first below the second in every coordinate; degrees about +Y. */
  readonly clear: readonly { readonly box: readonly [Vec3, Vec3]; readonly turn: number }[];
  /** Greatest of the centre of mass, m/s. */
  readonly speed?: number;
  /** Greatest angular speed, turns per second. */
  readonly rate?: number;
  /** Least and most turns, 0 or more. */
  readonly turns?: readonly [number, number];
  /** Least share of the turning that is about `spin.axis`, 0 to 1. */
  readonly share?: number;
}

/** `chains.NAME`: at least two throws of one prop, one after the other; equal numbers of takes. */
export interface ChainEntry {
  readonly name: string;
  readonly throws: readonly string[];
  readonly loop: boolean;
}

export interface BakeSettings {
  /** m, above 0; default the smaller of 0.001 and 0.5 % of the reach. */
  readonly tolerance?: number;
  readonly keys: "linear" | "cubic" | "smallest" | "frames";
  readonly layout: "one-node" | "two-node" | "turn-only";
  readonly files: "per-throw" | "per-take" | "together";
  readonly container: "glb" | "gltf";
  readonly mesh: boolean;
  readonly pack: "float" | "int16";
}

export type HostAxis = "x" | "y" | "z" | "-x" | "-y" | "-z";

/** The engine's coordinates. */
export interface Host {
  /** The engine's X, Y, Z as directions of glTF: each of x, y, z once. */
  readonly axes: readonly [HostAxis, HostAxis, HostAxis];
  /** The engine's unit in metres, above 0. */
  readonly unit: number;
}

export interface Position {
  /** From 1. */
  readonly line: number;
  /** From 1, in UTF-16 units. */
  readonly column: number;
}

export type KeyPath = readonly (string | number)[];

/** A throw file, checked. Values under `throws` stay as they are written: degrees, and the host's axes and unit. */
export interface ThrowFile {
  /** As given to `parseThrowFile`, for messages. */
  readonly name: string;
  /** A number as its decimal digits; default "0". */
  readonly seed: string;
  /** m/s² along -Y, never in the host's unit. */
  readonly gravity: number;
  /** Frames per second. */
  readonly frameRate: number;
  readonly host?: Host;
  readonly bake: BakeSettings;
  /** These three in file order, perhaps empty. */
  readonly props: ReadonlyMap<string, PropEntry>;
  readonly throws: ReadonlyMap<string, ThrowEntry>;
  readonly chains: ReadonlyMap<string, ChainEntry>;
  /** Where a key is written (an inherited one: where it really is), or else the nearest written key around it. */
  locate(path: KeyPath): Position;
}

/** The numbers of a throw's takes, ascending. */
export const takeNumbers = (takes: number | readonly number[]): readonly number[] =>
  typeof takes === "number" ? Array.from({ length: takes }, (_, i) => i + 1) : takes;
