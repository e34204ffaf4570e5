import { exponent, timesPowerOfTwo } from "./elementary/exact.js";
import { type Mat3, map } from "./mat3.js";
import { cross, normalize, type Vec3 } from "./vec3.js";

/**
 * Eigenvalues of a symmetric 3×3 matrix, ascending, and unit eigenvectors as rows that form a right-handed frame; any one
 * frame where values coincide, but always the same for the same matrix, and exact for a diagonal one. Only the diagonal
 * and the entries above it are read; all must be finite.
 *
 * Cyclic Jacobi rotations (Golub & Van Loan, Matrix Computations, 4th ed., 8.5), stopped by a criterion relative to each
 * pair of diagonal entries, so that small values of a positive definite matrix keep their digits (Demmel & Veselić,
 * SIAM J. Matrix Anal. Appl. 13, 1204, 1992).
 */
export function eigenSymmetric(m: Mat3): { values: Vec3; vectors: Mat3 } {
  const entries = [m[0][0], m[1][1], m[2][2], m[0][1], m[0][2], m[1][2]];
  const greatest = Math.max(...entries.map(Math.abs));
  // A power of two costs no digit and keeps squares within a double's range.
  const k = greatest === 0 ? 0 : exponent(greatest);
  const a = map(m, (_, i, j) => timesPowerOfTwo(m[Math.min(i, j)][Math.max(i, j)], -k)).map((row) => [
    ...row,
  ]);
  const v = [
    [1, 0, 0],
    [0, 1, 0],
    [0, 0, 1],
  ];
  let turned = true;
  for (let sweep = 0; turned && sweep < 50; sweep++) {
    turned = false;
    for (const [p, q] of PAIRS) if (rotateAway(a, v, p, q)) turned = true;
  }
  const order = [0, 1, 2].sort((i, j) => a[i][i] - a[j][j]);
  const value = (i: number): number => timesPowerOfTwo(a[order[i]][order[i]], k);
  return { values: [value(0), value(1), value(2)], vectors: frame(v[order[0]], v[order[1]]) };
}

const PAIRS = [
  [0, 1],
  [0, 2],
  [1, 2],
] as const;

const NEGLIGIBLE = 8.673617379884035e-19; // 2^-60 of either diagonal entry

/** Makes a[p][q] zero by a rotation of rows and columns p and q, gathered in the rows of `v`; false if it was zero already. */
function rotateAway(a: number[][], v: number[][], p: number, q: number): boolean {
  const off = a[p][q];
  if (off === 0) return false;
  if (Math.abs(off) <= NEGLIGIBLE * Math.min(Math.abs(a[p][p]), Math.abs(a[q][q]))) {
    a[p][q] = 0;
    a[q][p] = 0;
    return false;
  }
  const cotangent = (a[q][q] - a[p][p]) / (2 * off);
  const t = (cotangent < 0 ? -1 : 1) / (Math.abs(cotangent) + Math.sqrt(cotangent * cotangent + 1));
  const c = 1 / Math.sqrt(t * t + 1);
  const s = t * c;
  a[p][p] -= t * off;
  a[q][q] += t * off;
  a[p][q] = 0;
  a[q][p] = 0;
  const r = 3 - p - q;
  const rp = a[r][p];
  const rq = a[r][q];
  a[r][p] = c * rp - s * rq;
  a[p][r] = a[r][p];
  a[r][q] = s * rp + c * rq;
  a[q][r] = a[r][q];
  for (let i = 0; i < 3; i++) {
    const x = v[p][i];
    const y = v[q][i];
    v[p][i] = c * x - s * y;
    v[q][i] = s * x + c * y;
  }
  return true;
}

/** The first two rows at unit length again, after many rotations, and the third that makes them right-handed. */
function frame(first: number[], second: number[]): Mat3 {
  const x = normalize([first[0], first[1], first[2]]);
  const y = normalize([second[0], second[1], second[2]]);
  return [x, y, normalize(cross(x, y))];
}
