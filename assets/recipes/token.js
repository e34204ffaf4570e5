import { around, extrude, lathe, move } from "../lib/solid.js";

const FLOOR = 0.0011; // half thickness inside the rim
const RELIEF = 0.0006;
/** The pieces of a lantern, counter-clockwise: foot, two bars, flame, roof, ring. */
const LANTERN = [
  [
    [-0.0068, -0.0115],
    [0.0068, -0.0115],
    [0.0056, -0.0088],
    [-0.0056, -0.0088],
  ],
  ...[-0.0048, 0.0048].map((u) => [
    [u - 0.0006, -0.0085],
    [u + 0.0006, -0.0085],
    [u + 0.0006, 0.0022],
    [u - 0.0006, 0.0022],
  ]),
  [
    [-0.0009, -0.0072],
    [0.0009, -0.0072],
    [0.0021, -0.0056],
    [0.0022, -0.004],
    [0.0012, -0.0018],
    [0.0002, 0.0004],
    [-0.001, -0.0016],
    [-0.0022, -0.0038],
    [-0.0021, -0.0056],
  ],
  [
    [-0.0066, 0.0025],
    [0.0066, 0.0025],
    [0.0058, 0.0046],
    [0.0018, 0.0076],
    [-0.0018, 0.0076],
    [-0.0058, 0.0046],
  ],
  bow([0, 0.0098], 0.0032, 0.0021),
];

/**
 * A brass token, 44 mm across. Heads (+y) is an enamelled field with a brass lantern and a spark, tails three
 * waves and a moon; both reliefs sit off the axis, so its balance does too. The origin is the middle of its rim's edge.
 */
export function token() {
  const rim = 0.022;
  const disc = lathe(
    [
      [0, -FLOOR],
      [0.0178, -FLOOR],
      [0.0186, -0.0018],
      [0.0214, -0.0018],
      [rim, -0.0013],
      [rim, 0.0013],
      [0.0214, 0.0018],
      [0.0186, 0.0018],
      [0.0178, FLOOR],
      [0, FLOOR],
    ],
    { segments: 36 },
  );
  const field = 0.0003; // thickness of the enamel
  const tails = [...[-0.0075, -0.002, 0.0035].map((v) => wave(v)), crescent([0.0075, 0.0098], 0.0042)].map(
    (outline) => move(standing(outline, FLOOR, RELIEF), { turn: [180, 0, 0] }),
  );
  const toRim = (solid) => move(solid, { at: [0, 0, -rim] });
  return {
    name: "token",
    parts: [
      {
        name: "token_disc",
        material: "brass",
        solids: [
          disc,
          ...LANTERN.map((outline) =>
            standing(
              outline.map(([u, v]) => [u - 0.003, v]),
              FLOOR + field,
              RELIEF - field,
            ),
          ),
          standing(dot([0.009, 0.003], 0.0018, 12), FLOOR + field, RELIEF - field),
          ...tails,
        ].map(toRim),
        crease: 30,
      },
      {
        name: "token_field",
        material: "enamel",
        solids: [toRim(standing(dot([0, 0], 0.0176, 36), FLOOR, field))],
        crease: 30,
      },
    ],
    sockets: {
      grip: { at: [0, 0, 0] },
      heads: { at: [0, 0.0018, -rim] },
      tails: { at: [0, -0.0018, -rim], rotation: [1, 0, 0, 0] },
    },
  };
}

/** An outline (u right, v away from the looker) standing on the face at height y. */
function standing(outline, y, height) {
  return move(extrude(outline, height, 0.00012, { sharpFoot: true }), {
    turn: [-90, 0, 0],
    at: [0, y + height / 2, 0],
  });
}

function dot([u, v], radius, count = 16) {
  return around(count, (angle) => [u + radius * Math.cos(angle), v + radius * Math.sin(angle)]);
}

/** A ring that is open below, counter-clockwise. */
function bow([u, v], outer, inner) {
  const steps = 12;
  const arc = (radius) =>
    Array.from({ length: steps + 1 }, (_, i) => {
      const angle = Math.PI * (-0.4 + (1.8 * i) / steps);
      return [u + radius * Math.cos(angle), v + radius * Math.sin(angle)];
    });
  return [...arc(outer), ...arc(inner).reverse()];
}

/** Horns towards -u. */
function crescent([u, v], radius) {
  const points = [];
  const steps = 8;
  const horn = 0.72 * Math.PI; // the outer arc runs to this angle either way
  for (let i = 0; i <= steps; i++) {
    const angle = -horn + (2 * horn * i) / steps;
    points.push([u + radius * Math.cos(angle), v + radius * Math.sin(angle)]);
  }
  // Back along the circle through both horns whose middle lies 0.55 radii off.
  const centre = -0.45 * radius;
  const dx = radius * Math.cos(horn) - centre;
  const dy = radius * Math.sin(horn);
  const inner = Math.sqrt(dx * dx + dy * dy);
  const end = Math.atan2(dy, dx);
  for (let i = 1; i < steps; i++) {
    const angle = end - (2 * end * i) / steps;
    points.push([u + centre + inner * Math.cos(angle), v + inner * Math.sin(angle)]);
  }
  return points;
}

/** A band with two crests, across the face at v. */
function wave(v) {
  const steps = 12;
  const line = (offset) =>
    Array.from({ length: steps + 1 }, (_, i) => {
      const u = -0.0125 + (0.025 * i) / steps;
      return [u, v + offset + 0.0014 * Math.sin((4 * Math.PI * i) / steps + 0.2)];
    });
  return [...line(-0.0011), ...line(0.0011).reverse()];
}
