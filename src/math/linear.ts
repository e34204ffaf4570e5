/**
 * Solves the n×n system a·x = b by Gaussian elimination with row pivoting (Golub & Van Loan, Matrix Computations, §3.4).
 *
 * @returns x, or undefined where the matrix is singular to rounding
 */
export function solveLinear(a: readonly (readonly number[])[], b: readonly number[]): number[] | undefined {
  const n = b.length;
  const rows = a.map((row, i) => [...row, b[i]]);
  for (let column = 0; column < n; column++) {
    let pivot = column;
    for (let row = column + 1; row < n; row++)
      if (Math.abs(rows[row][column]) > Math.abs(rows[pivot][column])) pivot = row;
    const divisor = rows[pivot][column];
    if (!(Math.abs(divisor) > 0) || !Number.isFinite(divisor)) return undefined;
    [rows[column], rows[pivot]] = [rows[pivot], rows[column]];
    for (let row = column + 1; row < n; row++) {
      const factor = rows[row][column] / divisor;
      for (let k = column; k <= n; k++) rows[row][k] -= factor * rows[column][k];
    }
  }
  const x = new Array<number>(n).fill(0);
  for (let row = n - 1; row >= 0; row--) {
    let sum = rows[row][n];
    for (let k = row + 1; k < n; k++) sum -= rows[row][k] * x[k];
    x[row] = sum / rows[row][row];
  }
  return x;
}
