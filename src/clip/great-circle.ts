import { atan2 } from "../math/elementary.js";

/**
 * The great circle from one unit quaternion to another, in the form that inner loops can step along:
 * q(φ) = cos φ · from + sin φ · side, φ from 0 to `angle` (half the angle in space). The same curve as glTF 2.0
 * Appendix C's slerp, without its division by a small sine.
 */
export class GreatCircle {
  readonly from = new Float64Array(4);
  /** Unit, square to `from`; zero where the ends are equal. */
  readonly side = new Float64Array(4);
  angle = 0;
  /** Of the angle. */
  sine = 0;
  cosine = 1;

  /** Leads from the quaternion in `a` at `aOffset` to the one in `b` at `bOffset`, whose dot product it returns. */
  set(a: Float64Array, aOffset: number, b: Float64Array, bOffset: number): number {
    const { from, side } = this;
    const x = a[aOffset];
    const y = a[aOffset + 1];
    const z = a[aOffset + 2];
    const w = a[aOffset + 3];
    const d = x * b[bOffset] + y * b[bOffset + 1] + z * b[bOffset + 2] + w * b[bOffset + 3];
    const sx = b[bOffset] - d * x;
    const sy = b[bOffset + 1] - d * y;
    const sz = b[bOffset + 2] - d * z;
    const sw = b[bOffset + 3] - d * w;
    const s = Math.sqrt(sx * sx + sy * sy + sz * sz + sw * sw);
    from[0] = x;
    from[1] = y;
    from[2] = z;
    from[3] = w;
    side[0] = s > 0 ? sx / s : 0;
    side[1] = s > 0 ? sy / s : 0;
    side[2] = s > 0 ? sz / s : 0;
    side[3] = s > 0 ? sw / s : 0;
    this.angle = atan2(s, d);
    this.sine = s;
    this.cosine = d;
    return d;
  }
}
