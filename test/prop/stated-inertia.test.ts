import { describe, expect, test } from "vitest";
import { statedInertia } from "../../src/prop/stated-inertia.js";

// Which tensors bodies have: Goldstein, Classical Mechanics, §5.4 (all moments positive, none above the other two together).
describe("a stated inertia", () => {
  test("is three moments, or six entries of the tensor in the order xx, yy, zz, xy, xz, yz", () => {
    expect(statedInertia([1, 2, 3])[0]).toEqual([1, 0, 0]);
    expect(statedInertia([4, 5, 6, 0.1, 0.2, 0.3])).toEqual([
      [4, 0.1, 0.2],
      [0.1, 5, 0.3],
      [0.2, 0.3, 6],
    ]);
  });

  test("of a flat body is one", () => {
    expect(() => statedInertia([0.1, 0.2, 0.3])).not.toThrow();
    expect(() => statedInertia([0.333333, 0.333333, 0.666667])).toThrow();
    expect(() => statedInertia([0.3333333, 0.3333333, 0.6666667])).not.toThrow();
  });

  test("that no body can have is refused with what would be right", () => {
    expect(() => statedInertia([1, 2, 4])).toThrow(
      "inertia: no body has it: its greatest principal moment, 4 kg m², is more than the other two together, 1 + 2; the greatest can be at most 3 kg m² beside these two",
    );
    expect(() => statedInertia([1, -2, 1])).toThrow(
      "its least principal moment is -2 kg m²; all three must be above 0",
    );
    expect(() => statedInertia([1, 1, 1, 2, 0, 0])).toThrow(
      /least principal moment is -1 kg m².*smaller products/,
    );
    // Each of xx, yy, zz is within the other two, but not the principal moments 2.5, 0.5, 1.9.
    expect(() => statedInertia([1.5, 1.5, 1.9, 1, 0, 0])).toThrow(
      /greatest principal moment, 2\.5 kg m².*1\.9.*at most 2\.4/,
    );
    expect(() => statedInertia([1, 1])).toThrow("inertia: is [1, 1]; needs three numbers");
    expect(() => statedInertia([1, 1, Number.NaN])).toThrow("needs three numbers");
  });
});
