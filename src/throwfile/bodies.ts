/** Forms of what a prop is made of: shapes, densities, points, stated inertia. */

import { RequestError } from "../math/request-error.js";
import type { Shape, ShapeKind } from "../prop/shape-kind.js";
import { statedInertia } from "../prop/stated-inertia.js";
import { shown } from "./errors.js";
import { fields } from "./fields.js";
import { at, type Form, isObject, list, text } from "./form.js";
import { nearest } from "./nearest.js";
import { number, vector } from "./numbers.js";

const SHAPES: Record<ShapeKind, string> = {
  box: "whole edges [x, y, z], m",
  sphere: "radius, m",
  ellipsoid: "half axes [a, b, c], m",
  cylinder: "axis +Y, m",
  cone: "axis +Y, its base at -Y, m",
  capsule: "axis +Y; length over all, m",
  ring: "torus about +Y: radius to the middle of the tube, thickness: the tube's diameter, m",
  disc: "axis +Y, m",
  tube: "axis +Y; outer and inner radius, m",
};

const size = number({ above: 0, unit: "m" });
const sizes = vector({ above: 0, unit: "m" });

/** `shape`: exactly one primitive. */
export const shape: Form<Shape> = (() => {
  const rounded = { radius: size, length: size };
  const flat = { radius: size, thickness: size };
  const kinds: Record<ShapeKind, Form<unknown>> = {
    box: sizes,
    sphere: size,
    ellipsoid: sizes,
    cylinder: fields(rounded),
    cone: fields(rounded),
    capsule: fields(rounded, {}, (s, tell) => {
      if (s.length < 2 * s.radius)
        tell(
          `shorter than its two round ends (found ${s.length})`,
          `its length over all, at least ${2 * s.radius}`,
          "length",
        );
    }),
    ring: fields(flat, {}, (s, tell) => {
      if (s.thickness >= 2 * s.radius)
        tell(
          `a tube so thick that it closes the hole (found ${s.thickness})`,
          `the tube's diameter, below ${2 * s.radius}`,
          "thickness",
        );
    }),
    disc: fields(flat),
    tube: fields({ outer: size, inner: size, length: size }, {}, (s, tell) => {
      if (s.inner >= s.outer)
        tell(
          `an inner radius that is not below the outer (found ${s.inner})`,
          `a number below ${s.outer}`,
          "inner",
        );
    }),
  };
  const names = Object.keys(kinds) as ShapeKind[];
  const expects = `one of ${names.join(", ")}, such as {sphere: 0.1}`;
  return {
    read(value, tell) {
      const keys = isObject(value) ? Object.keys(value) : [];
      if (!isObject(value) || keys.length !== 1) {
        tell(
          keys.length > 1
            ? `several shapes in one (found ${keys.slice(0, 4).join(", ")})`
            : `not a shape (found ${shown(value)})`,
          expects,
        );
        return undefined;
      }
      const key = names.find((name) => name === keys[0]);
      if (!key) {
        tell("unknown shape", `the nearest known shape is ${nearest(keys[0], names)}`, keys[0]);
        return undefined;
      }
      const read = kinds[key].read(value[key], at(tell, key));
      return read === undefined ? undefined : ({ [key]: read } as unknown as Shape);
    },
    json: {
      type: "object",
      properties: Object.fromEntries(
        names.map((key) => [key, { description: SHAPES[key], ...kinds[key].json }]),
      ),
      minProperties: 1,
      maxProperties: 1,
      additionalProperties: false,
    },
    expects,
  };
})();

/** `density`: one number or a map. */
export const density: Form<number | Record<string, number>> = (() => {
  const single = number({ min: 0, unit: "kg/m³" });
  const expects = "a number, 0 or more (kg/m³), or a map from material or node name to such numbers";
  return {
    read(value, tell) {
      if (!isObject(value)) {
        if (typeof value === "number") return single.read(value, tell);
        tell(`not a density (found ${shown(value)})`, expects);
        return undefined;
      }
      const read = Object.entries(value).map(([key, v]) => [key, single.read(v, at(tell, key))] as const);
      if (read.length === 0) tell("an empty map", expects);
      return read.some(([, v]) => v === undefined)
        ? undefined
        : (Object.fromEntries(read) as Record<string, number>);
    },
    json: { anyOf: [single.json, { type: "object", additionalProperties: single.json, minProperties: 1 }] },
    expects,
  };
})();

/** A point: a place, or a node's place and axes. */
export const point: Form<[number, number, number] | { node: string }> = (() => {
  const place = vector({ unit: "m" });
  const node = fields({ node: text("the name of a node of the model") });
  const expects = "[x, y, z] (m), or {node: NAME}";
  return {
    read(value, tell) {
      if (Array.isArray(value)) return place.read(value, tell);
      if (isObject(value)) return node.read(value, tell);
      tell(`not a place (found ${shown(value)})`, expects);
      return undefined;
    },
    json: { anyOf: [place.json, node.json] },
    expects,
  };
})();

/** `weights` */
export const weights = list(
  fields({ at: vector({ unit: "m" }), mass: number({ above: 0, unit: "kg" }) }),
  0,
  Number.POSITIVE_INFINITY,
  "a list of point masses {at: [x, y, z], mass: kg}",
);

/** `inertia`: a tensor that a body can have. */
export const inertia: Form<number[]> = (() => {
  const entry = number({ unit: "kg m²" });
  const expects = "[xx, yy, zz] or [xx, yy, zz, xy, xz, yz] (kg m²)";
  const numbers = list(entry, 3, 6, expects);
  return {
    read(value, tell) {
      const read = numbers.read(value, tell);
      if (read === undefined) return undefined;
      try {
        statedInertia(read);
      } catch (error) {
        if (!(error instanceof RequestError)) throw error;
        tell(`${error.fault} (found ${shown(read)})`, error.remedy);
        return undefined;
      }
      return read;
    },
    json: { anyOf: [3, 6].map((n) => ({ type: "array", items: entry.json, minItems: n, maxItems: n })) },
    expects,
  };
})();
