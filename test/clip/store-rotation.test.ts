import fc from "fast-check";
import { expect, it } from "vitest";
import { int16Store } from "../../src/clip/store-rotation.js";
import { angleBetween, normalize, type Quat } from "../../src/math/quat.js";

const component = fc.integer({ min: -1000, max: 1000 });

it("a rotation of 16-bit numbers stays within their rounding, its length within 2e-5 of 1", () => {
  fc.assert(
    fc.property(fc.tuple(component, component, component, component), (q) => {
      fc.pre(Math.hypot(...q) > 0);
      const unit = normalize(q as unknown as Quat);
      const stored = new Float64Array(4);
      const played = new Float64Array(4);
      int16Store.store(Float64Array.from(unit), 0, stored, played);
      for (const c of stored) expect(Math.abs(c)).toBeLessThanOrEqual(32767);
      // glTF 2.0, 3.6.2.2: a normalised short c stands for c/32767.
      expect(Math.abs(Math.hypot(...stored) / 32767 - 1)).toBeLessThanOrEqual(2e-5);
      // Each component is one of its two neighbours, so less than 1/32767 off: four make 2/32767, the angle twice that.
      expect(angleBetween(normalize([...played] as unknown as Quat), unit)).toBeLessThan(4 / 32767);
    }),
    { seed: 2, numRuns: 3000 },
  );
});
