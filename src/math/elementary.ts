/**
 * The elementary functions, made of + − × ÷ √ alone. ECMAScript leaves the last digits of Math.sin and its kin to the
 * engine; IEEE 754 fixes those of these operations, so that what is computed here is the same on every machine. Angles in
 * radians; special values (NaN, ±0, ±Infinity, subnormals) as ECMAScript's Math has them; nothing throws. Errors stay below
 * 1 ulp (tan: 2).
 */
export { cbrt } from "./elementary/cbrt.js";
export { exp, log } from "./elementary/exp-log.js";
export { hypot } from "./elementary/hypot.js";
export { acos, asin, atan, atan2 } from "./elementary/inverse-trig.js";
export { pow } from "./elementary/power.js";
export { cos, sin, tan } from "./elementary/trig.js";
