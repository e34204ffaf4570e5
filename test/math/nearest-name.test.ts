import { expect, test } from "vitest";
import { nearestName } from "../../src/math/nearest-name.js";

test("the nearest name has the fewest letters to change, the first of equals", () => {
  expect(nearestName("rate", ["turns", "rat", "date"])).toBe("rat");
  expect(nearestName("Gravty", ["seed", "gravity", "frameRate"])).toBe("gravity");
  expect(nearestName("x", [])).toBeUndefined();
  // kitten → sitting takes three (Wagner & Fischer's distance; the common example), sittinggg five
  expect(nearestName("kitten", ["sittinggg", "sitting"])).toBe("sitting");
});
