import { CatmullRomCurve3, Vector3 } from "three";
import { circle, hollow, lathe, move, sweep } from "../lib/solid.js";

const HEIGHT = 0.285; // from the foot to the middle of the handle
const ROUND = { segments: 18 };
const SHEET = 0.0006; // thickness of the tin plate

/**
 * A tin lantern with a candle: a hollow foot, a glass globe (its air is a cavity), a roof open below, four guard
 * wires and a wire handle with a wooden grip. It hangs: the origin is the middle of that grip, at the top.
 */
export function lantern() {
  const hung = (solid) => move(solid, { at: [0, -HEIGHT, 0] });
  return {
    name: "lantern",
    parts: [
      { name: "lantern_tin", material: "tin", solids: [foot(), roof(), ...ears()].map(hung), crease: 48 },
      { name: "lantern_wires", material: "steel", solids: [...guards(), handle()].map(hung), crease: 75 },
      { name: "lantern_grip", material: "ash", solids: [hung(woodenGrip())] },
      { name: "lantern_candle", material: "beeswax", solids: [hung(candle())] },
      { name: "lantern_globe", material: "glass", solids: [hung(globe())] },
    ],
    sockets: {
      grip: { at: [0, 0, 0] },
      flame: { at: [0, 0.112 - HEIGHT, 0] },
      foot: { at: [0, -HEIGHT, 0] },
    },
  };
}

function foot() {
  const outer = [
    [0, 0],
    [0.052, 0],
    [0.055, 0.003],
    [0.055, 0.024],
    [0.051, 0.0295],
    [0.036, 0.034],
    [0.032, 0.04],
    [0, 0.04],
  ];
  const inner = outer.map(([r, y], i) => [
    Math.max(0, r - (r && SHEET)),
    y + (i < 2 ? SHEET : i > 5 ? -SHEET : 0),
  ]);
  return hollow(lathe(outer, ROUND), lathe(inner, ROUND));
}

function globe() {
  const outer = [
    [0, 0.04],
    [0.026, 0.04],
    [0.035, 0.052],
    [0.0425, 0.068],
    [0.0448, 0.085],
    [0.0425, 0.103],
    [0.036, 0.122],
    [0.029, 0.14],
    [0.0285, 0.1455],
    [0, 0.1455],
  ];
  const wall = 0.0022;
  const inner = outer.map(([r, y], i) => [
    Math.max(0, r - (r && wall)),
    i < 2 ? 0.04 + wall : i > 7 ? 0.1455 - wall : y,
  ]);
  return hollow(lathe(outer, ROUND), lathe(inner, ROUND));
}

/** A bell of thin sheet: down its outside to the brim, up its inside. */
function roof() {
  const outside = [
    [0, 0.196],
    [0.017, 0.195],
    [0.0185, 0.192],
    [0.0175, 0.189],
    [0.0175, 0.176],
    [0.021, 0.173],
    [0.046, 0.152],
    [0.0485, 0.1455],
  ];
  const inside = outside.map(([r, y]) => [Math.max(0, r - (r && SHEET)), r === 0.0485 ? y : y - SHEET]);
  return lathe([...outside, ...inside.reverse()], ROUND);
}

/** Tabs under the brim's edge at ±x, which the handle hooks into. */
function ears() {
  return [-1, 1].map((side) =>
    move(
      lathe(
        [
          [0, -0.0035],
          [0.0045, -0.0035],
          [0.0055, -0.002],
          [0.0055, 0.002],
          [0.0045, 0.0035],
          [0, 0.0035],
        ],
        { segments: 8 },
      ),
      { turn: [0, 0, 90], at: [side * 0.0511, 0.149, 0] },
    ),
  );
}

function guards() {
  return [45, 135, 225, 315].map((degrees) => {
    const path = [
      [0.0515, 0.0293],
      [0.0525, 0.05],
      [0.0535, 0.085],
      [0.0525, 0.12],
      [0.0485, 0.1445],
    ].map(([r, y]) => new Vector3(0, y, r));
    const wire = sweep(new CatmullRomCurve3(path), () => circle(0.0013, 5), { steps: 6 });
    return move(wire, { turn: [0, degrees, 0] });
  });
}

function handle() {
  const side = [
    [0.0562, 0.149],
    [0.0595, 0.17],
    [0.0585, 0.215],
    [0.049, 0.262],
    [0.037, 0.2835],
    [0.026, HEIGHT],
  ];
  const path = [...side, [0, HEIGHT], ...side.toReversed().map(([x, y]) => [-x, y])];
  const curve = new CatmullRomCurve3(
    path.map(([x, y]) => new Vector3(x, y, 0)),
    false,
    "centripetal",
  );
  return sweep(curve, () => circle(0.0017, 6), { steps: 28 });
}

/** Bored for the wire. */
function woodenGrip() {
  const bore = 0.0022;
  const profile = [
    [bore, -0.026],
    [0.006, -0.026],
    [0.0072, -0.0245],
    [0.0085, -0.012],
    [0.009, 0],
    [0.0085, 0.012],
    [0.0072, 0.0245],
    [0.006, 0.026],
    [bore, 0.026],
  ];
  return move(lathe(profile, { segments: 12, closed: true }), { turn: [0, 0, 90], at: [0, HEIGHT, 0] });
}

function candle() {
  return lathe(
    [
      [0, 0.0422],
      [0.0105, 0.0422],
      [0.0105, 0.097],
      [0.0085, 0.0995],
      [0.003, 0.0985],
      [0.0009, 0.0985],
      [0.0006, 0.107],
      [0, 0.108],
    ],
    { segments: 12 },
  );
}
