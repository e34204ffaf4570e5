import { oval, skin } from "../lib/solid.js";

/**
 * A skiff's oar, 2.1 m: ash shaft and blade with a painted tip, and a leather collar where it lies in the
 * rowlock. It stands along y, the blade up, its flat faces towards ±z; the origin is the middle of the handle.
 */
export function oar() {
  // y, half width (x), half thickness (z), squareness of the section (2 is an ellipse)
  const handleToBlade = [
    [-0.072, 0.007, 0.007, 2],
    [-0.069, 0.0125, 0.0125, 2],
    [-0.06, 0.0165, 0.0165, 2],
    [0.0, 0.0155, 0.0155, 2],
    [0.06, 0.0165, 0.0165, 2],
    [0.072, 0.021, 0.021, 2],
    [0.09, 0.0225, 0.0225, 2],
    [0.43, 0.0225, 0.0225, 2],
    [0.65, 0.0225, 0.0225, 2],
    [1.25, 0.019, 0.02, 2],
    [1.4, 0.0195, 0.018, 2],
    [1.46, 0.024, 0.0165, 2.1],
    [1.53, 0.038, 0.0145, 2.2],
    [1.6, 0.054, 0.0125, 2.3],
    [1.68, 0.0645, 0.0105, 2.4],
    [1.78, 0.0705, 0.0085, 2.5],
    [1.88, 0.0735, 0.007, 2.6],
  ];
  const tip = [
    handleToBlade.at(-1),
    [1.96, 0.0745, 0.006, 2.7],
    [2.01, 0.072, 0.0053, 2.7],
    [2.028, 0.064, 0.0046, 2.7],
    [2.034, 0.053, 0.003, 2.7],
  ];
  const collar = [
    [0.45, 0.0225],
    [0.45, 0.025],
    [0.453, 0.0262],
    [0.585, 0.0262],
    // the button that keeps the oar from slipping through
    [0.588, 0.033],
    [0.594, 0.0375],
    [0.606, 0.0375],
    [0.612, 0.033],
    [0.614, 0.0262],
    [0.63, 0.0262],
    [0.633, 0.025],
    [0.633, 0.0225],
  ];
  return {
    name: "oar",
    parts: [
      { name: "oar_loom", material: "ash", solids: [skin(handleToBlade.map((s) => oval(s)))] },
      { name: "oar_tip", material: "painted_ash", solids: [skin(tip.map((s) => oval(s)))] },
      {
        name: "oar_collar",
        material: "leather",
        solids: [
          skin(
            collar.map(([y, r]) => oval([y, r])),
            { closed: true },
          ),
        ],
      },
    ],
    sockets: {
      grip: { at: [0, 0, 0] },
      collar: { at: [0, 0.54, 0] },
      tip: { at: [0, 2.034, 0] },
    },
  };
}
