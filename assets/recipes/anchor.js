import { CatmullRomCurve3, Vector3 } from "three";
import { around, circle, extrude, move, oval, skin, sweep } from "../lib/solid.js";

const ARM = 0.0075; // the arms' radius in the middle
const SHANK = [0.0074, 0.244]; // from the arms to the eye
const EYE = { radius: 0.0085, wire: 0.003 };
const RING = { radius: 0.02, wire: 0.003 };
const TIP = [0.098, 0.058]; // where an arm ends and its fluke begins, x and z
const LEAN = 37; // degrees of the fluke from z

/**
 * A dinghy's anchor, 0.29 m long with its ring: a steel shank along z, two arms with flukes across x, a brass ring at the far end. The origin is the
 * middle of the arms' bend.
 */
export function anchor() {
  return {
    name: "anchor",
    parts: [
      {
        name: "anchor_iron",
        material: "steel",
        solids: [shank(), eye(), arms(), fluke(1), fluke(-1)],
        crease: 50,
      },
      { name: "anchor_ring", material: "brass", solids: [ring()], crease: 60 },
    ],
    sockets: {
      grip: { at: [0, 0, 0.2] },
      crown: { at: [0, 0, -ARM] },
    },
  };
}

/** With a collar that the hand stops at. */
function shank() {
  const stations = [
    [SHANK[0], 0.0085, 0.0065],
    [0.02, 0.0075, 0.006],
    [0.166, 0.0068, 0.0055],
    [0.168, 0.0105, 0.0095],
    [0.176, 0.0105, 0.0095],
    [0.178, 0.0068, 0.0055],
    [0.225, 0.006, 0.005],
    [SHANK[1], 0.006, 0.0035],
  ];
  return move(skin(stations.map((station) => oval(station, 16))), { turn: [90, 0, 0] });
}

function eye() {
  const { radius, wire } = EYE;
  const middle = SHANK[1] + radius + wire;
  return hoop(EYE, 20, (out, across) => [out[0], across, middle + out[1]]);
}

/** Upright through the eye. */
function ring() {
  const middle = SHANK[1] + EYE.radius + EYE.wire + (EYE.radius - EYE.wire - RING.wire) + RING.radius;
  return hoop(RING, 28, (out, across) => [across, out[0], middle + out[1]]);
}

/** A round wire in a circle; `place` puts a point in the circle's plane, and across it, into the model. */
function hoop({ radius, wire }, steps, place) {
  const section = (round) =>
    around(10, (angle) => {
      const out = radius + wire * Math.cos(angle);
      return place([out * Math.sin(round), out * Math.cos(round)], wire * Math.sin(angle));
    });
  return skin(around(steps, section), { closed: true });
}

function arms() {
  const side = [[0.035, 0.004], [0.072, 0.024], TIP];
  const points = [...side.toReversed().map(([x, z]) => [-x, z]), [0, 0], ...side];
  const curve = new CatmullRomCurve3(points.map(([x, z]) => new Vector3(x, 0, z)));
  return sweep(curve, (along) => circle(ARM - 0.004 * Math.abs(2 * along - 1), 10), { steps: 24 });
}

/** A flat spade in line with the arm, its face to the shank. */
function fluke(side) {
  const outline = [
    [-0.012, 0],
    [0.012, 0],
    [0.022, 0.012],
    [0.004, 0.046],
    [-0.004, 0.046],
    [-0.022, 0.012],
  ];
  const [sine, cosine] = [Math.sin((LEAN * Math.PI) / 180), Math.cos((LEAN * Math.PI) / 180)];
  const { points, triangles } = extrude(outline, 0.005, 0.0008);
  const place = ([across, along, thick]) => [
    side * (TIP[0] + along * sine - thick * cosine),
    -side * across,
    TIP[1] + along * cosine + thick * sine,
  ];
  return { points: points.map(place), triangles };
}
