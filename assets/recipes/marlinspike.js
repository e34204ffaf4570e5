import { CatmullRomCurve3, Vector3 } from "three";
import { around, circle, oval, skin, sweep } from "../lib/solid.js";

/**
 * A marlinspike, 0.28 m: a steel taper that flattens to a blunt chisel point, a grooved brass grip with a knob,
 * and an eye for the lanyard. The point is at +y; the origin is the middle of the grip.
 */
export function marlinspike() {
  const spike = [
    [0.034, 0.0104],
    [0.06, 0.0104],
    [0.1, 0.0091],
    [0.14, 0.0075],
    [0.18, 0.0056, 0.0052],
    [0.205, 0.0044, 0.0034],
    [0.223, 0.0035, 0.0019],
    [0.23, 0.0026, 0.0012],
    [0.232, 0.0014, 0.0006],
  ];
  const grip = [
    [-0.052, 0.004],
    [-0.0505, 0.0085],
    [-0.046, 0.0118],
    [-0.0405, 0.0128],
    [-0.035, 0.0118],
    [-0.031, 0.0092],
    [-0.028, 0.0086],
    ...[-0.0205, -0.0095, 0.0015, 0.0125].flatMap((y) => [
      [y - 0.0045, 0.0099],
      [y, 0.0106],
      [y + 0.0045, 0.0099],
      [y + 0.0055, 0.009],
    ]),
    [0.022, 0.0105],
    [0.024, 0.0124],
    [0.031, 0.0124],
    [0.034, 0.0112],
  ];
  const eye = new CatmullRomCurve3(
    around(12, (angle) => new Vector3(0.0068 * Math.cos(angle), -0.0575 + 0.0068 * Math.sin(angle), 0)),
    true,
  );
  return {
    name: "marlinspike",
    parts: [
      { name: "marlinspike_spike", material: "steel", solids: [skin(spike.map((s) => oval(s)))] },
      {
        name: "marlinspike_grip",
        material: "brass",
        solids: [
          skin(grip.map((s) => oval(s))),
          sweep(eye, () => circle(0.0016), { steps: 20, closed: true }),
        ],
      },
    ],
    sockets: {
      grip: { at: [0, 0, 0] },
      point: { at: [0, 0.232, 0] },
      eye: { at: [0, -0.0575, 0] },
    },
  };
}
