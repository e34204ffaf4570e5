import { CatmullRomCurve3, Vector3 } from "three";
import { box, circle, lathe, move, sweep } from "../lib/solid.js";

const [X, Y, Z] = [0.36, 0.24, 0.26]; // over all, without battens, lid and handles
const BOARD = 0.009;
const BEVEL = 0.0012;
const GAP = 0.0015;

/**
 * A tea crate of deal boards with ash battens and rope handles. It stands on the floor: the origin is the middle
 * of its underside. It is empty; a throw file puts the tea in as a weight.
 */
export function crate() {
  return {
    name: "crate",
    parts: [
      { name: "crate_boards", material: "deal", solids: boards(), crease: 50 },
      { name: "crate_battens", material: "ash", solids: battens(), crease: 50 },
      { name: "crate_handles", material: "hemp", solids: [handle(1), handle(-1), ...knots()], crease: 60 },
    ],
    sockets: {
      grip: { at: [X / 2 + 0.055, 0.15, 0] },
      far_grip: { at: [-X / 2 - 0.055, 0.15, 0] },
      lid: { at: [0, Y + BOARD, 0] },
    },
  };
}

/** Where boards of uneven width lie side by side: pairs [middle, width]. */
function rows(length, shares) {
  const whole = shares.reduce((sum, share) => sum + share, 0);
  let start = -length / 2;
  return shares.map((share) => {
    const width = (length * share) / whole;
    start += width;
    return [start - width / 2, width - GAP];
  });
}

function boards() {
  const solids = [];
  const add = (size, at) => solids.push(move(box(size, BEVEL), { at }));
  for (const [y, height] of rows(Y - BOARD, [1, 1.15, 0.95])) {
    const middle = y + (Y + BOARD) / 2;
    for (const side of [-1, 1]) {
      add([X, height, BOARD], [0, middle, (side * (Z - BOARD)) / 2]);
      add([BOARD, height, Z - 2 * BOARD - GAP], [(side * (X - BOARD)) / 2, middle, 0]);
    }
  }
  for (const [z, width] of rows(Z, [1.1, 0.9, 1])) add([X, BOARD - GAP, width], [0, (BOARD - GAP) / 2, z]);
  for (const [z, width] of rows(Z, [0.95, 1.1, 1.05])) add([X, BOARD, width], [0, Y + BOARD / 2 + GAP, z]);
  return solids;
}

/** Upright at the corners of both ends, two across the lid, and a rail that the handles go through. */
function battens() {
  const solids = [];
  const thick = 0.012;
  const wide = 0.034;
  for (const side of [-1, 1]) {
    const x = side * (X / 2 + thick / 2 + 0.0002);
    for (const end of [-1, 1]) {
      solids.push(move(box([thick, Y - 0.004, wide], 0.0016), { at: [x, Y / 2, (end * (Z - wide)) / 2] }));
    }
    solids.push(move(box([thick, 0.03, Z - 2 * wide - 0.001], 0.0016), { at: [x, 0.19, 0] }));
    solids.push(
      move(box([wide, thick * 0.8, Z - 0.006], 0.0016), {
        at: [side * 0.11, Y + BOARD + GAP + thick * 0.4 + 0.0002, 0],
      }),
    );
  }
  return solids;
}

const ROPE = 0.0055;
const KNOT = [X / 2 + 0.013, 0.19, 0.048];

function handle(side) {
  const [x, y, z] = KNOT;
  const half = [
    [x + 0.006, y, z],
    [x + 0.018, y - 0.006, z + 0.002],
    [x + 0.03, y - 0.022, z - 0.008],
    [x + 0.041, y - 0.037, z - 0.028],
  ];
  const path = [...half, [x + 0.0445, y - 0.041, 0], ...half.toReversed().map(([u, v, w]) => [u, v, -w])];
  const curve = new CatmullRomCurve3(path.map(([u, v, w]) => new Vector3(side * u, v, side * w)));
  return sweep(curve, () => circle(ROPE), { steps: 20 });
}

function knots() {
  const [x, y, z] = KNOT;
  const knot = lathe(
    [
      [0, -0.009],
      [0.007, -0.007],
      [0.0105, 0],
      [0.0075, 0.006],
      [0, 0.0075],
    ],
    { segments: 10 },
  );
  return [-1, 1].flatMap((side) =>
    [-1, 1].map((end) => move(knot, { turn: [0, 0, side * 90], at: [side * (x + 0.007), y, end * z] })),
  );
}
