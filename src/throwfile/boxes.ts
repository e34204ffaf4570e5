/** Form of `limits.clear`. */

import { fields } from "./fields.js";
import { type Form, list } from "./form.js";
import { number, vector } from "./numbers.js";

const box = fields(
  {
    box: list(vector({ unit: "m" }), 2, 2, "two corners [[x, y, z], [x, y, z]]") as unknown as Form<
      [[number, number, number], [number, number, number]]
    >,
  },
  { turn: number({ unit: "degrees" }) },
  ({ box: [low, high] }, tell) => {
    for (const i of [0, 1, 2])
      if (low[i] >= high[i])
        tell(
          `the first corner is not below the second in ${"xyz"[i]} (found ${low[i]} and ${high[i]})`,
          "the smaller number in the first corner",
          "box",
        );
  },
);
/** Boxes with a turn each, 0 where none is written. */
export const boxes: Form<{ box: [[number, number, number], [number, number, number]]; turn: number }[]> =
  (() => {
    const form = list(
      box,
      0,
      Number.POSITIVE_INFINITY,
      "a list of boxes {box: [[x, y, z], [x, y, z]], turn}",
    );
    return { ...form, read: (value, tell) => form.read(value, tell)?.map((b) => ({ turn: 0, ...b })) };
  })();
