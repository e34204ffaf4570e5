import { Quaternion } from "three";
import { expect, it } from "vitest";
import { GreatCircle } from "../../src/clip/great-circle.js";

it("the great circle from one rotation to another is three's slerp", () => {
  for (const angle of [0, 1e-9, 1e-4, 0.3, 1.5, 3]) {
    const a = new Quaternion(0.1, -0.5, 0.3, 0.8).normalize();
    const b = a
      .clone()
      .multiply(new Quaternion(0.6 * Math.sin(angle / 2), 0, 0.8 * Math.sin(angle / 2), Math.cos(angle / 2)));
    const circle = new GreatCircle();
    const d = circle.set(Float64Array.from(a.toArray()), 0, Float64Array.from(b.toArray()), 0);
    expect(d).toBeCloseTo(Math.cos(angle / 2), 14);
    expect(Math.abs(circle.angle - angle / 2)).toBeLessThan(1e-15 + 1e-15 * angle);
    for (const share of [0, 0.2, 0.5, 1]) {
      const expected = a.clone().slerp(b, share).toArray();
      const phi = share * circle.angle;
      for (let i = 0; i < 4; i++) {
        const component = Math.cos(phi) * circle.from[i] + Math.sin(phi) * circle.side[i];
        expect(Math.abs(component - expected[i])).toBeLessThan(1e-14);
      }
    }
  }
});
