import { extrude, move, skin } from "../lib/solid.js";

const DEGREES = Math.PI / 180;
const SHANK = [0.02, 0.0066]; // width and thickness where the sleeve sits

/**
 * An open-ended spanner for 24 and 19 mm, 0.25 m long, with a rubber sleeve on the small jaw's half.
 * It lies in the x-z plane, the large jaw towards +z; the origin is the middle of the sleeve.
 */
export function spanner() {
  const sleeve = [-0.043, 0.043];
  const largeNeck = 0.1;
  const smallNeck = -0.062;
  const large = move(jaw({ width: 0.024, radius: 0.0265, tilt: 15, neck: 0.0124 }), {
    at: [0, largeNeck, 0],
  });
  const small = move(jaw({ width: 0.019, radius: 0.0215, tilt: 15, neck: 0.0112 }), {
    turn: [0, 0, 180],
    at: [0, smallNeck, 0],
  });
  // The shank thickens towards both heads and ends flat against them.
  const shank = skin(
    [
      [smallNeck, 0.0212, 0.008],
      [-0.052, 0.0202, 0.0072],
      [sleeve[0], ...SHANK],
      [sleeve[1], ...SHANK],
      [0.068, 0.0206, 0.0068],
      [0.088, 0.022, 0.0074],
      [largeNeck, 0.0236, 0.008],
    ].map(([y, width, thickness]) => bar(y, width, thickness, 0.0022)),
  );
  const lying = { turn: [90, 0, 0] }; // drawn in x-y, length along y; laid down so that the length is z
  return {
    name: "spanner",
    parts: [
      { name: "spanner_body", material: "steel", solids: [large, small, shank].map((s) => move(s, lying)) },
      { name: "spanner_sleeve", material: "rubber", solids: [move(ribbedSleeve(sleeve), lying)], crease: 50 },
    ],
    sockets: {
      grip: { at: [0, 0, 0] },
      jaw: { at: [0, 0, largeNeck + 0.035] },
    },
  };
}

/**
 * A head with its neck on y = 0, pointing to +y: a round outline that runs out into the shank, the slot tilted
 * as on real spanners.
 */
function jaw({ width, radius, tilt, neck }) {
  const half = width / 2;
  const centre = 1.18 * radius;
  const onHead = (degrees) => [
    radius * Math.sin(degrees * DEGREES),
    centre + radius * Math.cos(degrees * DEGREES),
  ];
  const arc = (from, to) => Array.from({ length: 12 }, (_, i) => onHead(from + ((to - from) * i) / 11));
  const inSlot = ([x, y]) => {
    const [c, s] = [Math.cos(tilt * DEGREES), Math.sin(tilt * DEGREES)];
    return [c * x + s * y, centre + c * y - s * x];
  };
  // Angles from +y towards +x; the outline runs clockwise from the neck's left corner.
  const flank = 132;
  const [flankX, flankY] = onHead(flank);
  const lip = Math.asin((half + 0.0016) / radius) / DEGREES;
  const mouth = radius * Math.cos(lip * DEGREES) - 0.0035;
  const fillet = [
    [neck + 0.22 * (flankX - neck), 0.45 * flankY],
    [neck + 0.06 * (flankX - neck), 0.2 * flankY],
    [neck, 0],
  ];
  // Down the slot: bevelled lips, parallel faces, and room for a nut's corner at the bottom.
  const slot = [
    [-half, mouth],
    [-half, -0.12 * width],
    [-half * 0.86, -0.3 * width],
    [-half * 0.5, -0.42 * width],
    [half * 0.5, -0.42 * width],
    [half * 0.86, -0.3 * width],
    [half, -0.12 * width],
    [half, mouth],
  ];
  const clockwise = [
    ...fillet.toReversed().map(([x, y]) => [-x, y]),
    ...arc(-flank, tilt - lip),
    ...slot.map(inSlot),
    ...arc(tilt + lip, flank),
    ...fillet,
  ];
  return extrude(clockwise.reverse(), 0.0104, 0.0012);
}

/** The outline of a flat bar with rounded edges, across y. */
function bar(y, width, thickness, round) {
  const [a, b] = [width / 2, thickness / 2];
  const points = [];
  for (const [sx, sz] of [
    [1, 1],
    [-1, 1],
    [-1, -1],
    [1, -1],
  ]) {
    for (let i = 0; i < 3; i++) {
      const angle = (sx * sz > 0 ? i / 2 : 1 - i / 2) * 90 * DEGREES;
      points.push([
        sx * (a - round + round * Math.cos(angle)),
        y,
        sz * (b - round + round * Math.sin(angle)),
      ]);
    }
  }
  return points;
}

/** A tube over the shank: along its outside, rib by rib, and back along the shank itself. */
function ribbedSleeve([from, to]) {
  const ribs = 7;
  const outer = [];
  const step = (to - from) / ribs;
  for (let rib = 0; rib < ribs; rib++) {
    const y = from + rib * step;
    outer.push(
      [y + 0.0004, 0.0048],
      [y + 0.0016, 0.0062],
      [y + step - 0.0016, 0.0062],
      [y + step - 0.0004, 0.0048],
    );
  }
  const rings = [
    ...outer.map(([y, wall]) => bar(y, SHANK[0] + wall, SHANK[1] + wall, 0.0022 + wall / 2)),
    bar(to, ...SHANK, 0.0022),
    bar(from, ...SHANK, 0.0022),
  ];
  return skin(rings, { closed: true });
}
