import { eigenSymmetric } from "../math/eigen.js";
import type { Mat3 } from "../math/mat3.js";
import { RequestError } from "../math/request-error.js";

/** How far a moment may pass the sum of the other two (a flat body's just reaches it), relative: rounding of the input. */
const ROUNDING = 1e-6;

/**
 * The tensor whose entries are stated, kg m²: [xx, yy, zz] or [xx, yy, zz, xy, xz, yz].
 *
 * @throws RequestError at ["inertia"] for one that no body has: the principal moments must be positive, and none may be
 *   more than the other two together (Goldstein, Classical Mechanics, §5.4: I_z = ∫(x² + y²) ≤ I_x + I_y)
 */
export function statedInertia(entries: readonly number[]): Mat3 {
  if ((entries.length !== 3 && entries.length !== 6) || !entries.every(Number.isFinite))
    throw new RequestError(
      ["inertia"],
      `is [${entries.join(", ")}]`,
      "needs three numbers [xx, yy, zz] or six [xx, yy, zz, xy, xz, yz] in kg m²",
    );
  const [xx, yy, zz, xy = 0, xz = 0, yz = 0] = entries;
  const tensor: Mat3 = [
    [xx, xy, xz],
    [xy, yy, yz],
    [xz, yz, zz],
  ];
  const [least, middle, most] = eigenSymmetric(tensor).values;
  if (!(least > 0))
    throw new RequestError(
      ["inertia"],
      `no body has it: its least principal moment is ${short(least)} kg m²`,
      entries.length === 3
        ? "all three must be above 0"
        : "all three principal moments must be above 0: smaller products xy, xz, yz, or larger xx, yy, zz",
    );
  if (most > (least + middle) * (1 + ROUNDING))
    throw new RequestError(
      ["inertia"],
      `no body has it: its greatest principal moment, ${short(most)} kg m², is more than the other two together, ${short(least)} + ${short(middle)}`,
      `the greatest can be at most ${short(least + middle)} kg m² beside these two`,
    );
  return tensor;
}

const short = (value: number) => String(Number(value.toPrecision(6)));
