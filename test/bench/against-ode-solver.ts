import { fly } from "../../src/flight/flight.js";
import { secondsEach } from "./measure.js";
import { solvedOrientation } from "./ode-solver.js";
import { duration, figure, type Section, tiny } from "./section.js";
import { TUMBLES, type Tumble } from "./tumbles.js";

export const againstOdeSolver: Section = {
  name: "ode",
  about: `The orientation at the end of a flight: fly() against odex, a general ODE solver, at the loosest of its tolerances
(halves of a decade) that gets the error asked for, or comes nearest to it. "times" is its time over fly's, whose error is smaller
still.`,
  async run() {
    const rows: string[][] = [];
    for (const tumble of TUMBLES) {
      const { name, launch, miss } = tumble;
      const flown = () => fly(launch).orientation(launch.duration);
      for (const wanted of [1e-9, 1e-12]) {
        const tolerance = loosest(tumble, wanted);
        const solved = () => solvedOrientation(launch, tolerance);
        const [ours, theirs] = await secondsEach([{ run: flown }, { run: solved }]);
        rows.push([
          name,
          tiny(wanted),
          tiny(miss(solved())),
          duration(theirs),
          tiny(miss(flown())),
          duration(ours),
          figure(theirs / ours),
        ]);
      }
    }
    return { head: ["flight", "asked rad", "odex rad", "odex", "fly rad", "fly", "times"], rows };
  },
};

/** Of the tolerances in halves of a decade the loosest that errs so little, or where rounding lets none, the one that errs least. */
function loosest({ launch, miss }: Tumble, wanted: number): number {
  const tolerances = Array.from({ length: 21 }, (_, i) => 10 ** -(6 + i / 2));
  const errors = tolerances.map((tolerance) => miss(solvedOrientation(launch, tolerance)));
  const enough = errors.findIndex((error) => error <= wanted);
  return tolerances[enough < 0 ? errors.indexOf(Math.min(...errors)) : enough];
}
