import { bake } from "../../src/bake/bake.js";
import { openDemo, withThrow } from "./demo.js";
import { secondsEach } from "./measure.js";
import { figure, type Section } from "./section.js";

const TAKES = 100;
const THROWS = ["oar-blade-rolls", "token-flip", "spanner-tumble", "spanner-hand-to-hand", "token-scatter"];

export const vary: Section = {
  name: "vary",
  about: `Whole bakes of ${TAKES} takes in memory, with "vary: even" (the default) and "vary: chance": even compares 32 candidates a take.`,
  async run() {
    const { file, models, throwOf } = await openDemo();
    const rows: string[][] = [];
    for (const name of THROWS) {
      const { entry } = throwOf(name);
      const contestant = (vary: "even" | "chance") => ({
        run: () => bake(withThrow(file, entry, { takes: TAKES, vary }), models),
      });
      const [even, chance] = await secondsEach([contestant("even"), contestant("chance")]);
      rows.push([name, figure(TAKES / chance), figure(TAKES / even), figure(even / chance)]);
    }
    return { head: ["throw", "chance takes/s", "even takes/s", "even costs"], rows };
  },
};
