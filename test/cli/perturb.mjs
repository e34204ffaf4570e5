// Every function of Math that an engine may compute as it likes answers the next double away from zero instead of what this engine would.
// Loaded before anything else, with --import.

import { NAMES } from "./perturb-names.mjs";

const double = new Float64Array(1);
const bits = new BigInt64Array(double.buffer);

for (const name of NAMES) {
  const original = Math[name];
  Math[name] = (...args) => {
    double[0] = original(...args);
    if (double[0] !== 0 && Number.isFinite(double[0])) bits[0] += 1n;
    return double[0];
  };
}

process.stderr.write("perturbed\n");
