/** Form of `host`. */

import { shown } from "./errors.js";
import { fields } from "./fields.js";
import { type Form, list, word } from "./form.js";
import { number } from "./numbers.js";
import type { Host, HostAxis } from "./types.js";

const AXES = ["x", "y", "z", "-x", "-y", "-z"] as const;

const axes: Form<Host["axes"]> = (() => {
  const form = list(word(...AXES), 3, 3, "three directions such as [z, -x, y]");
  return {
    ...form,
    read(value, tell) {
      const read = form.read(value, tell);
      if (read === undefined) return undefined;
      const lines = read.map((axis) => axis.replace("-", ""));
      const twice = lines.find((line, i) => lines.indexOf(line) !== i);
      if (twice === undefined) return read as [HostAxis, HostAxis, HostAxis];
      tell(`${twice} stands twice (found ${shown(value)})`, "each of x, y and z once, perhaps with a -");
      return undefined;
    },
  };
})();

/** What is left out is glTF's own. */
export const host: Form<Host> = (() => {
  const form = fields({}, { axes, unit: number({ above: 0, unit: "m" }) });
  return {
    ...form,
    read(value, tell) {
      const read = form.read(value, tell);
      return read && { axes: read.axes ?? ["x", "y", "z"], unit: read.unit ?? 1 };
    },
  };
})();
