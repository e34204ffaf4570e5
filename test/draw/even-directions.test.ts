import { describe, expect, it } from "vitest";
import { evenDirection, evenOrientation } from "../../src/draw/even-directions.js";
import { stream } from "../../src/draw/stream.js";
import { rotate } from "../../src/math/quat.js";
import { length, type Vec3 } from "../../src/math/vec3.js";
import { CHI_SQUARE_16_CELLS, chiSquare } from "./statistics.js";

const N = 6000;
const next = (path: string) =>
  stream({ seed: "evenness", throwName: "t", take: 1, candidate: 1, path: [path] });

/** Even over the sphere is even in every coordinate (Archimedes' hat-box theorem), and in the angle about every axis. */
function expectEvenOverSphere(directions: Vec3[]): void {
  for (const i of [0, 1, 2] as const) {
    const [a, b] = [(i + 1) % 3, (i + 2) % 3];
    expect(
      chiSquare(
        directions.map((d) => (d[i] + 1) / 2),
        16,
      ),
    ).toBeLessThan(CHI_SQUARE_16_CELLS);
    const turns = directions.map((d) => Math.atan2(d[a], d[b]) / (2 * Math.PI) + 0.5);
    expect(chiSquare(turns, 16)).toBeLessThan(CHI_SQUARE_16_CELLS);
  }
}

describe("even draws", () => {
  it("of a direction are unit vectors, even over the sphere", () => {
    const source = next("direction");
    const directions = Array.from({ length: N }, () => evenDirection(source));
    for (const d of directions) expect(Math.abs(length(d) - 1)).toBeLessThan(1e-14);
    expectEvenOverSphere(directions);
  });

  it("of an orientation take every direction evenly over the sphere", () => {
    const source = next("orientation");
    const orientations = Array.from({ length: N }, () => evenOrientation(source));
    for (const own of [
      [1, 0, 0],
      [0, 0.6, 0.8],
    ] as Vec3[])
      expectEvenOverSphere(orientations.map((q) => rotate(q, own)));
  });

  it("of an orientation turn by θ with the density (1 − cos θ)/π (Miles, Biometrika 52, 636, 1965)", () => {
    const source = next("angle");
    const shares = Array.from({ length: N }, () => {
      const q = evenOrientation(source);
      const angle = 2 * Math.acos(Math.min(1, Math.abs(q[3])));
      return (angle - Math.sin(angle)) / Math.PI;
    });
    expect(chiSquare(shares, 16)).toBeLessThan(CHI_SQUARE_16_CELLS);
  });
});
