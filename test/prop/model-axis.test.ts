import { expect, test } from "vitest";
import { nearestModelAxis } from "../../src/prop/model-axis.js";

test("a direction is named by the model's axis nearest to it, and how far off that is", () => {
  expect(nearestModelAxis([0, 0, 1])).toEqual({ axis: "z", degrees: 0 });
  // tan 1° = 0.017455…: any table
  expect(nearestModelAxis([0, -1, 0.017455064928217585])).toEqual({
    axis: "-y",
    degrees: expect.closeTo(1, 12),
  });
  expect(nearestModelAxis([-0.6, 0.8, 0]).axis).toBe("y");
});
