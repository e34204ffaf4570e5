import { atan2, cos, sin } from "../math/elementary.js";
import { type Mat3, multiplyVector } from "../math/mat3.js";
import { quadraticRoots } from "../math/roots.js";
import { add, dot, normalize, scale, type Vec3 } from "../math/vec3.js";
import type { ReducedBody } from "./reduced-body.js";

/** A closed curve of unit vectors on which the momentum's direction at release is looked for; −m stands for m run backwards. */
export interface Curve {
  /** The unit vector at the angle, any real number. */
  at(angle: number): Vec3;
  /** Its period: 2π, or π where half a turn leads from m to −m. */
  period: number;
  /** Angles where it crosses the separatrix: the grid is drawn together there. */
  crossings: number[];
  /** Angles where it may come near the separatrix, or bends: points of the grid. */
  marks: number[];
}

/** The great circle through two unit vectors at right angles. */
export function greatCircle(body: ReducedBody, p: Vec3, q: Vec3): Curve {
  const form = separatrixForm(body);
  const crossings = quadraticRoots(form(q, q), 2 * form(p, q), form(p, p)).map((t) => atan2(t, 1));
  return {
    at: (angle) => normalize(add(scale(p, cos(angle)), scale(q, sin(angle)))),
    period: Math.PI,
    crossings,
    marks: [0, Math.PI / 2],
  };
}

/** The cone's nappe as a curve: where the momentum at release and in the end pose can lie on one polhode. */
export interface Cone {
  /** Rows of the quadratic form that is zero on it. */
  form: Mat3;
  /** Its axes as unit vectors: through the nappe, and the wider and the narrower way across. */
  through: Vec3;
  wide: Vec3;
  narrow: Vec3;
  /** Greatest components along the last two, of unit vectors on the cone, and what lacks in their squares to 1. */
  widest: number;
  narrowest: number;
  lackWide: number;
  lackNarrow: number;
}

/**
 * One nappe; the other is its mirror image −m. As the angle χ runs, the components along the wide and the narrow axis are
 * widest·sin χ and narrowest·cos χ, which stays even where the cone opens into two planes (bodies with a symmetry).
 */
export function coneCurve(body: ReducedBody, cone: Cone): Curve {
  const { through, wide, narrow, widest, narrowest } = cone;
  const angleOf = (m: Vec3): number => {
    const side = dot(m, through) < 0 ? -1 : 1;
    return atan2((side * dot(m, wide)) / widest, (side * dot(m, narrow)) / narrowest);
  };
  const crossings: number[] = [];
  const marks = [Math.PI / 2, -Math.PI / 2];
  const middle: Vec3 = [0, 1, 0];
  const on = (a: Vec3, b: Vec3): number => dot(a, multiplyVector(cone.form, b));
  // the separatrix is two planes through the middle axis, each of which cuts the cone in two lines at most
  for (const sign of [1, -1]) {
    const other = normalize([Math.sqrt(body.d23), 0, sign * Math.sqrt(body.d12)]);
    const [a, b, c] = [on(middle, middle), on(middle, other), on(other, other)];
    const roots = quadraticRoots(a, 2 * b, c);
    for (const t of roots) crossings.push(angleOf(add(scale(middle, t), other)));
    if (a === 0) crossings.push(angleOf(middle));
    else if (roots.length === 0) marks.push(angleOf(add(scale(middle, -b / a), other)));
  }
  return {
    at(angle) {
      const s = sin(angle);
      const c = cos(angle);
      const x = Math.sqrt(cone.lackWide * s * s + cone.lackNarrow * c * c);
      const m = add(add(scale(through, x), scale(wide, widest * s)), scale(narrow, narrowest * c));
      return normalize(m);
    },
    period: 2 * Math.PI,
    crossings,
    marks,
  };
}

/** The bilinear form whose quadratic form is 2E/L² − J₂: negative about the greatest moment's axis, positive about the least's. */
const separatrixForm =
  (body: ReducedBody) =>
  (a: Vec3, b: Vec3): number =>
    body.d12 * a[0] * b[0] - body.d23 * a[2] * b[2];
