/** The grammar of `props.NAME`. */

import * as z from "zod";
import { density, inertia, point, shape, weights } from "./bodies.js";
import { NAME, text, word } from "./form.js";
import { defaulting, keys, leaf, optional } from "./key.js";
import { number, vector } from "./numbers.js";

export const propSchema = keys(
  {
    model: optional(
      text("a .glb or .gltf file, relative to this file"),
      "a .glb or .gltf file, relative to this file; this or shape",
    ),
    shape: optional(shape, "a primitive with a mesh of its own, axis +Y, centred, m; this or model"),
    node: optional(
      text("the name of a node of the model"),
      "weigh and animate this node of the model and all below it; default: the whole scene",
    ),
    scale: defaulting(number({ above: 0 }), 1, "a factor on the model (0.01 for a model in centimetres)"),
    density: defaulting(
      density,
      1000,
      "kg/m³: one number, or a map from material name, else node name; `default` for the rest; 0 leaves out",
    ),
    mass: optional(number({ above: 0, unit: "kg" }), "kg; scales the density so that the total is this"),
    solid: defaulting(
      word("auto", "hull", "surface"),
      "auto",
      "auto: closed parts are solid, flat openings are capped, what stays open is a thin surface; hull: the convex hull; surface: thin walls",
    ),
    wall: optional(
      number({ above: 0, unit: "m" }),
      "m; thin walls: mass = density × wall × area. Surfaces take 0.002 unless stated; stated, no opening is capped",
    ),
    weights: defaulting(weights, [], "point masses added: [{at: [x, y, z], mass: kg}]"),
    centerOfMass: optional(vector({ unit: "m" }), "[x, y, z], m, stated instead of worked out"),
    inertia: optional(
      inertia,
      "about the centre of mass in the model's axes, kg m²: [xx, yy, zz] or [xx, yy, zz, xy, xz, yz]; stated instead of worked out",
    ),
    points: z
      .record(
        z.string().regex(NAME),
        leaf(point, "[x, y, z] in the model's scene frame, m, or {node: NAME}: that node's place and axes"),
      )
      .default({})
      .meta({ description: "named points of the prop" }),
  },
  "what is thrown",
);
