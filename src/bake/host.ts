/** Between the engine's coordinates, in which throws are written and recorded, and glTF's, in which everything is computed. */

import { determinant, type Mat3, multiplyVector, transpose } from "../math/mat3.js";
import type { Quat } from "../math/quat.js";
import { scale, type Vec3 } from "../math/vec3.js";
import type { Host, HostAxis } from "../throwfile/types.js";

/** Conversions of one way; lengths in metres on glTF's side and in the engine's unit on the other. */
export interface Conversion {
  length(value: number): number;
  /** Places, velocities, directions with a length. */
  vector(value: Vec3): Vec3;
  /** Angular velocities, rad/s: in a mirrored system they turn the other way. */
  angular(value: Vec3): Vec3;
  rotation(value: Quat): Quat;
}

export interface HostFrame {
  toWorld: Conversion;
  fromWorld: Conversion;
}

const GLTF: Host = { axes: ["x", "y", "z"], unit: 1 };

export function hostFrame(host: Host = GLTF): HostFrame {
  const rows: Mat3 = [direction(host.axes[0]), direction(host.axes[1]), direction(host.axes[2])];
  return { fromWorld: conversion(rows, 1 / host.unit), toWorld: conversion(transpose(rows), host.unit) };
}

function conversion(axes: Mat3, unit: number): Conversion {
  const hand = determinant(axes);
  const angular = (value: Vec3) => scale(multiplyVector(axes, value), hand);
  return {
    length: (value) => value * unit,
    vector: (value) => scale(multiplyVector(axes, value), unit),
    angular,
    rotation: ([x, y, z, w]) => [...angular([x, y, z]), w],
  };
}

function direction(axis: HostAxis): Vec3 {
  const sign = axis.startsWith("-") ? -1 : 1;
  const letter = axis.at(-1);
  return [letter === "x" ? sign : 0, letter === "y" ? sign : 0, letter === "z" ? sign : 0];
}
