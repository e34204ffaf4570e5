import { Document } from "@gltf-transform/core";
import { resample } from "@gltf-transform/functions";
import { bench, describe } from "vitest";
import { linearTrack } from "../../src/clip/linear.js";
import type { Flight } from "../../src/flight/flight.js";
import { conjugate, multiply, rotate } from "../../src/math/quat.js";
import { subtract } from "../../src/math/vec3.js";
import { plannedFlights } from "../clip/flights.js";

const flights = plannedFlights();
const body = { centerOfMass: [0, 0.02, 0], axes: [0, 0, 0, 1], reach: 0.15 } as const;

/** One document a clip with a key of both channels every 1/240 s, as a simulation that was recorded has. */
function recorded(flight: Flight): Document {
  const document = new Document();
  const buffer = document.createBuffer();
  const count = Math.floor(240 * flight.duration) + 1;
  const translations = new Float32Array(3 * count);
  const rotations = new Float32Array(4 * count);
  for (let i = 0; i < count; i++) {
    const turn = multiply(flight.orientation(i / 240), conjugate(body.axes));
    rotations.set(turn, 4 * i);
    translations.set(subtract(flight.centerOfMass(i / 240), rotate(turn, body.centerOfMass)), 3 * i);
  }
  const times = Float32Array.from({ length: count }, (_, i) => i / 240);
  const accessor = (array: Float32Array<ArrayBuffer>, type: "SCALAR" | "VEC3" | "VEC4") =>
    document.createAccessor().setArray(array).setType(type).setBuffer(buffer);
  const node = document.createNode("prop");
  document.createScene().addChild(node);
  const input = accessor(times, "SCALAR");
  const animation = document.createAnimation("throw");
  for (const [path, output] of [
    ["translation", accessor(translations, "VEC3")],
    ["rotation", accessor(rotations, "VEC4")],
  ] as const) {
    const sampler = document
      .createAnimationSampler()
      .setInterpolation("LINEAR")
      .setInput(input)
      .setOutput(output);
    const channel = document
      .createAnimationChannel()
      .setTargetNode(node)
      .setTargetPath(path)
      .setSampler(sampler);
    animation.addSampler(sampler).addChannel(channel);
  }
  return document;
}

// Twelve clips of 1.6 s on average in each round.
describe("twelve clips", () => {
  bench("linear keys at 1 mm, proved", () => {
    for (const flight of flights) linearTrack(flight, body, 0.001);
  });

  bench("linear keys at 0.75 mm, proved", () => {
    for (const flight of flights) linearTrack(flight, body, 0.00075);
  });

  bench("recorded at 240 Hz", () => {
    for (const flight of flights) recorded(flight);
  });

  bench("recorded at 240 Hz and cut by a general keyframe resampler", async () => {
    for (const flight of flights) await recorded(flight).transform(resample());
  });
});
