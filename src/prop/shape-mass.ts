import { type Vec3, ZERO } from "../math/vec3.js";
import type { MassProperties } from "./mass.js";
import type { Shape } from "./shape-kind.js";

/**
 * Mass properties of a shape of the given density (kg/m³), in closed form, about the centre of mass, axes of the shape.
 *
 * Formulas: Meriam & Kraige, Engineering Mechanics: Dynamics, appendix D, table D/4; Beer & Johnston, Vector Mechanics for
 * Engineers, back matter.
 */
export function shapeMass(shape: Shape, density: number): MassProperties {
  if ("box" in shape) {
    const [x, y, z] = shape.box;
    // m (b² + c²) / 12
    return body(density, x * y * z, (m) => sumsOfTwo(m / 12, [x * x, y * y, z * z]));
  }
  if ("sphere" in shape) return ellipsoid(density, [shape.sphere, shape.sphere, shape.sphere]);
  if ("ellipsoid" in shape) return ellipsoid(density, shape.ellipsoid);
  if ("cylinder" in shape) return tube(density, shape.cylinder.radius, 0, shape.cylinder.length);
  if ("disc" in shape) return tube(density, shape.disc.radius, 0, shape.disc.thickness);
  if ("tube" in shape) return tube(density, shape.tube.outer, shape.tube.inner, shape.tube.length);
  if ("cone" in shape) return cone(density, shape.cone.radius, shape.cone.length);
  if ("capsule" in shape) return capsule(density, shape.capsule.radius, shape.capsule.length);
  return torus(density, shape.ring.radius, shape.ring.thickness / 2);
}

/** Moments m (b² + c²) / 5. */
const ellipsoid = (density: number, [a, b, c]: Vec3) =>
  body(density, (4 / 3) * Math.PI * a * b * c, (m) => sumsOfTwo(m / 5, [a * a, b * b, c * c]));

/** About the axis m (R² + r²) / 2, across it m (3 (R² + r²) + l²) / 12. */
function tube(density: number, outer: number, inner: number, l: number): MassProperties {
  const squares = outer * outer + inner * inner;
  const volume = Math.PI * (outer - inner) * (outer + inner) * l;
  return body(density, volume, (m) => round(m * (squares / 4 + (l * l) / 12), (m * squares) / 2));
}

/** Centre of mass a quarter of the height above the base; 3 m r² / 10; across 3 m (r² / 20 + h² / 80). */
function cone(density: number, r: number, h: number): MassProperties {
  const volume = (Math.PI * r * r * h) / 3;
  const across = (m: number) => 3 * m * ((r * r) / 20 + (h * h) / 80);
  return { ...body(density, volume, (m) => round(across(m), 0.3 * m * r * r)), centerOfMass: [0, -h / 4, 0] };
}

/**
 * A cylinder with a half ball on either end: a half ball has its centre of mass 3r/8 from its flat face and, about an axis
 * across through it, 83 m r² / 320.
 */
function capsule(density: number, r: number, length: number): MassProperties {
  const h = length - 2 * r;
  const barrel = Math.PI * r * r * h;
  const ends = (4 / 3) * Math.PI * r * r * r;
  const arm = h / 2 + (3 * r) / 8;
  return body(density, barrel + ends, (m) => {
    const barrelMass = (m * barrel) / (barrel + ends);
    const endsMass = (m * ends) / (barrel + ends);
    return round(
      barrelMass * ((r * r) / 4 + (h * h) / 12) + endsMass * ((83 / 320) * r * r + arm * arm),
      (barrelMass * r * r) / 2 + 0.4 * endsMass * r * r,
    );
  });
}

/** Volume 2π² R a²; about the axis m (R² + 3a²/4), across it m (R²/2 + 5a²/8). */
const torus = (density: number, R: number, a: number) =>
  body(density, 2 * Math.PI * Math.PI * R * a * a, (m) =>
    round(m * ((R * R) / 2 + (5 / 8) * a * a), m * (R * R + (3 / 4) * a * a)),
  );

function body(density: number, volume: number, moments: (mass: number) => Vec3): MassProperties {
  const mass = density * volume;
  const [x, y, z] = moments(mass);
  return {
    mass,
    volume,
    centerOfMass: ZERO,
    inertia: [
      [x, 0, 0],
      [0, y, 0],
      [0, 0, z],
    ],
  };
}

/** Moments of a body round about y. */
const round = (across: number, about: number): Vec3 => [across, about, across];

/** factor · (b + c, c + a, a + b) */
const sumsOfTwo = (factor: number, [a, b, c]: Vec3): Vec3 => [
  factor * (b + c),
  factor * (c + a),
  factor * (a + b),
];
