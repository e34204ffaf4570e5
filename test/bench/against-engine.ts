import { fly } from "../../src/flight/flight.js";
import { normalize, type Quat } from "../../src/math/quat.js";
import { ZERO } from "../../src/math/vec3.js";
import { Engine } from "./engine.js";
import { secondsEach } from "./measure.js";
import { solvedOrientation } from "./ode-solver.js";
import { duration, figure, type Section, tiny } from "./section.js";
import { TUMBLES } from "./tumbles.js";

const RATE = 240;

export const againstEngine: Section = {
  name: "engine",
  about: `Whole tumbles, the orientation kept 240 times a second: fly() against Rapier, a general rigid-body engine, at 240 steps a second.
Rapier computes in single precision and has no switch for the gyroscopic torque, but applies it: the body does turn over about its middle
axis. Errors at the end, of all three against a 60-digit Taylor series; the last column is fly's over the engine's.`,
  async run() {
    const engine = await Engine.load();
    const body = { centerOfMass: ZERO, axes: [0, 0, 0, 1], reach: 1 } as const;
    const rows: string[][] = [];
    for (const { name, launch, miss } of TUMBLES) {
      const flown = () => {
        const flight = fly(launch);
        const rotations = new Float64Array(4 * (launch.duration * RATE + 1));
        for (let i = 0; 4 * i < rotations.length; i++) flight.orientationInto(i / RATE, rotations, 4 * i);
        return lastOf(rotations);
      };
      const stepped = () => lastOf(engine.record(launch, body, RATE).rotations);
      const [ours, theirs] = await secondsEach([{ run: flown }, { run: stepped }]);
      const errors = [miss(stepped()), miss(flown())];
      rows.push([
        name,
        tiny(miss(solvedOrientation(launch, 1e-14))),
        errors[0].toPrecision(2),
        duration(theirs),
        tiny(errors[1]),
        duration(ours),
        figure(theirs / ours),
        tiny(errors[1] / errors[0]),
      ]);
    }
    return {
      head: ["flight", "odex rad", "engine rad", "engine", "fly rad", "fly", "times", "error ratio"],
      rows,
    };
  },
};

const lastOf = (rotations: Float32Array | Float64Array): Quat =>
  normalize(Array.from(rotations.slice(-4)) as unknown as Quat);
