import { describe, expect, it } from "vitest";
import { carlsonF, carlsonJ } from "../../src/aim/carlson.js";

describe("Carlson's integrals", () => {
  // Carlson, Numerical Algorithms 10, 13, 1995, section 3: the checks printed there, to 14 digits
  it.each([
    [[1, 2, 0], 1.3110287771461],
    [[0.5, 1, 0], 1.8540746773014],
    [[2, 3, 4], 0.58408284167715],
  ])("R_F(%j) is %d", ([x, y, z], value) => {
    expect(Math.abs(carlsonF(x, y, z) / value - 1)).toBeLessThan(4e-14);
  });

  it.each([
    [[0, 1, 2, 3], 0.77688623778582],
    [[2, 3, 4, 5], 0.14297579667157],
  ])("R_J(%j) is %d", ([x, y, z, p], value) => {
    expect(Math.abs(carlsonJ(x, y, z, p) / value - 1)).toBeLessThan(6e-14);
  });

  it("are elementary where arguments coincide", () => {
    // R_F(x, x, x) = x^(-1/2), R_J(x, x, x, x) = x^(-3/2): DLMF 19.20.1 and 19.20.6
    expect(carlsonF(7, 7, 7)).toBeCloseTo(1 / Math.sqrt(7), 15);
    expect(carlsonJ(0.3, 0.3, 0.3, 0.3)).toBeCloseTo(0.3 ** -1.5, 13);
    // R_F(0, y, y) = π/(2√y): DLMF 19.20.1; R_J(0, y, y, y) = 3π/(4 y^(3/2)), from 19.20.8
    expect(carlsonF(0, 1e-6, 1e-6)).toBeCloseTo((Math.PI / 2) * 1e3, 9);
    expect(carlsonJ(0, 1, 1, 1)).toBeCloseTo((3 * Math.PI) / 4, 14);
  });

  it("keep their digits with arguments that differ by twelve powers of ten", () => {
    // (π/2)/agm(1, √y) = R_F(0, y, 1): DLMF 19.22.1, the arithmetic-geometric mean by its definition
    for (const y of [1e-12, 1e-6, 0.3]) {
      let [a, g] = [1, Math.sqrt(y)];
      for (let i = 0; i < 12; i++) [a, g] = [(a + g) / 2, Math.sqrt(a * g)];
      expect(Math.abs((carlsonF(0, y, 1) * 2 * a) / Math.PI - 1)).toBeLessThan(1e-15);
    }
    // Π(n, 0) = π/(2√(1−n)) for k = 0 (DLMF 19.6.3) by 19.25.14
    for (const n of [-1e6, -3, -1e-3]) {
      const complete = carlsonF(0, 1, 1) + (n / 3) * carlsonJ(0, 1, 1, 1 - n);
      expect(Math.abs(complete - Math.PI / 2 / Math.sqrt(1 - n))).toBeLessThan(1e-14);
    }
  });
});
