import { EndFit, FITTED, fittedSample } from "./fit-end.js";
import type { GreatCircle } from "./great-circle.js";
import type { SampledMotion } from "./sampled-motion.js";

/**
 * Moves the end of a great circle, which starts in a given key and ends in the true rotation, to where the circle's greatest error is
 * least. The error is linear in the end's small displacement: at the share s of the angle φ, the part of it along the circle
 * moves a point by s, that across it by sin sφ / sin φ.
 */
export function rotationEndFitter(motion: SampledMotion) {
  const { rotations, time, sampleIndex } = motion;
  const fit = new EndFit();
  const axis = new Float64Array(3);
  const square = new Float64Array(3);
  // With the circle's `from` and `side` an orthonormal basis.
  const second = new Float64Array(4);
  const third = new Float64Array(4);

  /** Changes `end`; the samples `low` to `high` lie between the grid times `a` and `b`. */
  return (circle: GreatCircle, a: number, b: number, low: number, high: number, end: Float64Array): void => {
    const { from, side, angle, sine, cosine } = circle;
    if (sine === 0) return;
    basisInto(from, side, axis, square, second, third);
    const start = time(a);
    const duration = time(b) - start;
    let share = 0;
    let c = 1;
    let s = 0;
    for (let n = 0; n < FITTED; n++) {
      const sample = fittedSample(n, low, high);
      const here = (time(sampleIndex(sample)) - start) / duration;
      // Series are enough to fit with.
      const turn = (here - share) * angle;
      const turn2 = turn * turn;
      const sinTurn = turn * (1 - (turn2 / 6) * (1 - turn2 / 20));
      const cosTurn = 1 - (turn2 / 2) * (1 - (turn2 / 12) * (1 - turn2 / 30));
      const next = c * cosTurn - s * sinTurn;
      s = s * cosTurn + c * sinTurn;
      c = next;
      share = here;
      const k = 4 * sample;
      const x = rotations[k];
      const y = rotations[k + 1];
      const z = rotations[k + 2];
      const w = rotations[k + 3];
      const u = x * from[0] + y * from[1] + z * from[2] + w * from[3];
      const v = x * side[0] + y * side[1] + z * side[2] + w * side[3];
      fit.set(
        n,
        -(x * second[0] + y * second[1] + z * second[2] + w * second[3]),
        -(x * third[0] + y * third[1] + z * third[2] + w * third[3]),
        s * u - c * v,
        s / sine,
        share,
      );
    }
    // The end itself starts without an error.
    fit.set(FITTED, 0, 0, 0, 1, 1);
    fit.solve();
    const { shift } = fit;
    let length = 0;
    for (let i = 0; i < 4; i++) {
      end[i] += shift[0] * second[i] + shift[1] * third[i] + shift[2] * (cosine * side[i] - sine * from[i]);
      length += end[i] * end[i];
    }
    length = Math.sqrt(length);
    for (let i = 0; i < 4; i++) end[i] /= length;
  };
}

/** Two unit quaternions square to each other and to both of a circle: `side` is `from` ∘ n, they are `from` ∘ m with m square to n. */
function basisInto(
  from: Float64Array,
  side: Float64Array,
  n: Float64Array,
  m: Float64Array,
  second: Float64Array,
  third: Float64Array,
): void {
  const x = -from[0];
  const y = -from[1];
  const z = -from[2];
  const w = from[3];
  n[0] = w * side[0] + x * side[3] + y * side[2] - z * side[1];
  n[1] = w * side[1] + y * side[3] + z * side[0] - x * side[2];
  n[2] = w * side[2] + z * side[3] + x * side[1] - y * side[0];
  let least = Math.abs(n[0]) < Math.abs(n[1]) ? 0 : 1;
  if (Math.abs(n[2]) < Math.abs(n[least])) least = 2;
  const j = (least + 1) % 3;
  const k = (least + 2) % 3;
  const size = Math.sqrt(n[j] * n[j] + n[k] * n[k]);
  m[least] = 0;
  m[j] = n[k] / size;
  m[k] = -n[j] / size;
  turnedInto(from, m, second);
  const mj = m[j];
  const mk = m[k];
  m[least] = n[j] * mk - n[k] * mj;
  m[j] = -n[least] * mk;
  m[k] = n[least] * mj;
  turnedInto(from, m, third);
}

/** q ∘ v */
function turnedInto(q: Float64Array, v: Float64Array, out: Float64Array): void {
  out[0] = q[3] * v[0] + q[1] * v[2] - q[2] * v[1];
  out[1] = q[3] * v[1] + q[2] * v[0] - q[0] * v[2];
  out[2] = q[3] * v[2] + q[0] * v[1] - q[1] * v[0];
  out[3] = -q[0] * v[0] - q[1] * v[1] - q[2] * v[2];
}
