import { around, skin } from "../lib/solid.js";

const RADIUS = 0.092; // to the middle of the rope
const ROPE = 0.0145; // the rope's own radius
const DRAWN_IN = 0.94; // what a whipping leaves of it
const STATIONS = 84;
const TURNS = 7; // of the three strands on their way round
/** First and last station of each whipping; the long one covers the splice, so the balance is off the middle. */
const WHIPPINGS = [
  [2, 9],
  [32, 35],
  [59, 62],
];

/** A rope quoit of three-stranded hemp, 0.21 m across, whipped with red twine. It lies flat; origin in its middle. */
export function quoit() {
  return {
    name: "quoit",
    parts: [
      {
        name: "quoit_rope",
        material: "hemp",
        solids: [
          skin(
            around(STATIONS, (_, i) => ropeSection(i)),
            { closed: true },
          ),
        ],
        crease: 70,
      },
      { name: "quoit_whippings", material: "twine", solids: WHIPPINGS.map(whipping), crease: 50 },
    ],
    sockets: {
      rim: { at: [RADIUS, 0, 0] },
      splice: { at: place(5.5, 0, 0) },
    },
  };
}

/** Twelve points, four a strand: groove, shoulder, crest, shoulder; round under a whipping, which draws it in. */
function ropeSection(station) {
  const isWhipped = WHIPPINGS.some(([from, to]) => station >= from && station <= to);
  const shape = isWhipped ? [DRAWN_IN, DRAWN_IN, DRAWN_IN, DRAWN_IN] : [0.8, 1.0, 1.06, 1.0];
  const twist = (2 * Math.PI * TURNS * station) / STATIONS;
  return around(12, (angle, i) => place(station, angle + twist, ROPE * shape[i % 4]));
}

/** The point of the rope's section at a station, by angle and radius from the rope's middle. */
function place(station, angle, radius) {
  const round = (2 * Math.PI * station) / STATIONS;
  const out = RADIUS + radius * Math.cos(angle);
  return [out * Math.cos(round), radius * Math.sin(angle), -out * Math.sin(round)];
}

/**
 * A sleeve: over the outside, back along the rope. The rope twists by a whole point from station to station, so
 * that the sleeve, which does not, lies on the same points.
 */
function whipping([from, to]) {
  const stations = Array.from({ length: to - from + 1 }, (_, i) => from + i);
  const ring = (station, wall) => around(12, (angle) => place(station, angle, ROPE * DRAWN_IN + wall));
  const outside = stations.map((s) => ring(s, s === from || s === to ? 0.0008 : 0.0016));
  return skin([...outside, ...stations.toReversed().map((s) => ring(s, 0))], { closed: true });
}
