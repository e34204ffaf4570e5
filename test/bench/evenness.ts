import { compared, nearestFinder } from "../../src/bake/nearest.js";
import { loadProps } from "../../src/bake/props.js";
import { solveTake } from "../../src/bake/take.js";
import { drawDistance, type Features } from "../../src/draw/distance.js";
import { drawCandidate } from "../../src/draw/draw-throw.js";
import type { Prop } from "../../src/prop/prop.js";
import { parseThrowFile } from "../../src/throwfile/parse.js";
import type { ThrowEntry, ThrowFile } from "../../src/throwfile/types.js";
import { median } from "./measure.js";
import { figure, type Section } from "./section.js";

const SEEDS = 50;
const COUNTS = [8, 24, 64];

export const evenness: Section = {
  name: "even",
  about: `How far apart the two most alike of 8, 24 and 64 takes are, with one to four numbers of a throw spread: medians of ${SEEDS} seeds.
In draws, by their quantiles; in motion, by the greatest distance in cm between the same point of the prop at the same moment.`,
  async run() {
    const rows: string[][] = [];
    for (let spreads = 1; spreads <= 4; spreads++) {
      const even = await closestOfSeeds(throwFile(spreads, "even"));
      const chance = await closestOfSeeds(throwFile(spreads, "chance"));
      for (const [i, count] of COUNTS.entries()) {
        const draws = [median(chance.map((c) => c.draws[i])), median(even.map((c) => c.draws[i]))];
        const motion = [median(chance.map((c) => c.motion[i])), median(even.map((c) => c.motion[i]))];
        rows.push([
          i === 0 ? spreads.toString() : "",
          count.toString(),
          draws[0].toPrecision(2),
          draws[1].toPrecision(2),
          figure(draws[1] / draws[0]),
          (motion[0] * 100).toPrecision(2),
          (motion[1] * 100).toPrecision(2),
          figure(motion[1] / motion[0]),
        ]);
      }
    }
    return {
      head: ["spreads", "takes", "chance", "even", "times", "chance cm", "even cm", "times in motion"],
      rows,
    };
  },
};

/** A clean throw whose time, turns and place are spread, so many of them. */
function throwFile(spreads: number, vary: "even" | "chance"): ThrowFile {
  const spread = (n: number, range: string, fixed: string) => (spreads >= n ? range : fixed);
  return parseThrowFile(
    "evenness.throws.yaml",
    `
props: { board: { shape: { box: [0.05, 0.02, 0.3] } } }
throws:
  lob:
    prop: board
    vary: ${vary}
    release: { at: [0, 1.2, 0] }
    arrive:
      at: [${spread(3, "-0.2..0.2", "0")}, 1.2, ${spread(4, "3 ± 0.1", "3")}]
      after: 0.6..0.8
    spin: { axis: short, turns: ${spread(2, "1..2", "1.5")} }
`,
  );
}

interface Closest {
  /** For each of `COUNTS`. */
  draws: number[];
  motion: number[];
}

async function closestOfSeeds(file: ThrowFile): Promise<Closest[]> {
  const loaded = await loadProps(file, new Set(["board"]), () => Promise.reject());
  const prop = loaded.get("board")?.prop as Prop;
  const entry = file.throws.get("lob") as ThrowEntry;
  return Array.from({ length: SEEDS }, (_, i) => closest({ ...file, seed: `seed ${i}` }, { ...entry }, prop));
}

function closest(file: ThrowFile, entry: ThrowEntry, prop: Prop): Closest {
  const nearest = nearestFinder(prop.reach);
  const earlier: Features[] = [];
  const least = { draws: Number.POSITIVE_INFINITY, motion: Number.POSITIVE_INFINITY };
  const closest: Closest = { draws: [], motion: [] };
  for (let number = 1; number <= Math.max(...COUNTS); number++) {
    const { candidate, flight } = solveTake(file, entry, prop, number);
    const { course, samples } = compared(flight.duration, [{ start: 0, flight }]);
    const found = nearest(number, course, samples);
    least.motion = Math.min(least.motion, found?.distance ?? Number.POSITIVE_INFINITY);
    const { features } = drawCandidate(entry, {
      seed: file.seed,
      throwName: entry.name,
      take: number,
      candidate,
    });
    for (const other of earlier) least.draws = Math.min(least.draws, drawDistance(features, other));
    earlier.push(features);
    if (!COUNTS.includes(number)) continue;
    closest.draws.push(least.draws);
    closest.motion.push(least.motion);
  }
  return closest;
}
