import type { Launch } from "../../src/flight/launch.js";
import type { Prop } from "../../src/prop/prop.js";

/** A lob of 0.8 s, turning once and a half about the short axis, which lies across the throw. */
export const boxTake = ({ principal: { moments } }: Prop): Launch => ({
  centerOfMass: [0, 1, 0],
  velocity: [0, 4, 3],
  gravity: [0, -9.80665, 0],
  // turns the short axis, z, onto +x
  orientation: [0, Math.SQRT1_2, 0, Math.SQRT1_2],
  spin: [0, 0, (1.5 * 2 * Math.PI) / 0.8],
  moments,
  duration: 0.8,
});
