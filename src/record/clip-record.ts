/** What takes.json holds: the memory of a bake, for people, version control and engines. */

import type { MotionState } from "../bake/motion.js";
import type { Mat3 } from "../math/mat3.js";
import type { Quat } from "../math/quat.js";
import type { Vec3 } from "../math/vec3.js";

/** A prop's entry in takes.json: kg, m, kg m², in the model's scene frame. */
export interface PropRecord {
  /** The model's path as the throw file writes it, or the shape as JSON. */
  source: string;
  sha256: string;
  mass: number;
  volume: number;
  /** m, the model's scene frame. */
  centerOfMass: Vec3;
  /** kg m², about the centre of mass, axes of the model's scene frame. */
  inertia: Mat3;
  principal: { moments: Vec3; axes: Quat };
  reach: number;
  warnings: string[];
}

/** A throw within a chain's clip. */
export interface PartRecord {
  throw: string;
  /** Within the clip, and how long it flies, s. */
  start: number;
  time: number;
  turns: number;
  release: MotionState;
  arrival: MotionState;
}

/** A take's entry in takes.json: SI units and rad; the host's coordinates where the throw file names one, else glTF's. */
export interface ClipRecord {
  name: string;
  /** Name of the throw, or of the chain. */
  throw: string;
  take: number;
  prop: string;
  file: string;
  /** Of the whole clip, s. */
  duration: number;
  /** About the angular momentum, 0 or more. */
  turns: number;
  /** Of the turning, about long, middle and short. */
  share: Vec3;
  /** Of the centre of mass, above its release; s within the clip. Null where nothing but the turning is known. */
  apex: { time: number; rise: number } | null;
  release: MotionState;
  arrival: MotionState;
  /** From what the throw file asks at arrival, m and rad; null where it asks nothing. */
  miss: { position: number | null; angle: number | null };
  tolerance: number;
  error: number;
  keys: { translation: number; rotation: number };
  bytes: number;
  /** Not of a chain, whose throws have their own. */
  candidate?: number;
  draws: Record<string, unknown>;
  /** Within the clip, which may stand still before and after it, s; a chain has parts instead. */
  flight?: { start: number; time: number };
  parts?: PartRecord[];
  /** Null where no earlier take was made in the same run. */
  nearest: { take: number; distance: number } | null;
}

/** All of takes.json. */
export interface TakesRecord {
  format: 1;
  tossbake: string;
  throwFile: { name: string; sha256: string };
  props: Record<string, PropRecord>;
  clips: ClipRecord[];
}
