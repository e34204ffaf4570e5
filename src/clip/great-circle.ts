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
    let d = 0;
    for (let i = 0; i < 4; i++) {
      from[i] = a[aOffset + i];
      d += from[i] * b[bOffset + i];
    }
    let square = 0;
    for (let i = 0; i < 4; i++) {
      side[i] = b[bOffset + i] - d * from[i];
      square += side[i] * side[i];
    }
    const s = Math.sqrt(square);
    this.angle = atan2(s, d);
    this.sine = s;
    this.cosine = d;
    for (let i = 0; i < 4; i++) side[i] = s > 0 ? side[i] / s : 0;
    return d;
  }
}
