// @ts-expect-error it comes without types
import { validateBytes } from "gltf-validator";
import { describe, expect, it } from "vitest";
import { modelRotation } from "../../src/bake/motion.js";
import { solveTake } from "../../src/bake/take.js";
import { rotate } from "../../src/math/quat.js";
import { add, distance, subtract } from "../../src/math/vec3.js";
import { babylon } from "./babylon.js";
import { bakeDemo } from "./demo.js";
import { outerPoints } from "./outer-points.js";
import { three } from "./three.js";

const demo = await bakeDemo();

/** Off any grid of keys or frames: multiples of the golden ratio, mod 1 (Weyl's equidistribution). */
const moments = Array.from({ length: 40 }, (_, i) => ((i + 0.5) * 0.6180339887498949) % 1);

describe("the validator", () => {
  it.each(demo.files.map((file) => [file.name, file.content] as const))(
    "finds nothing to say about %s",
    async (_, glb) => {
      const report = await validateBytes(new Uint8Array(glb));
      expect(report.issues.messages.filter(({ severity }: { severity: number }) => severity <= 1)).toEqual(
        [],
      );
    },
  );
});

describe.each([three, babylon])("$name", (player) => {
  it.each(demo.files.map((file) => [file.name.replace(".glb", ""), file.content] as const))(
    "shows every take of %s within its stated error of the true flight",
    async (throwName, glb) => {
      const entry = demo.file.throws.get(throwName)!;
      const { prop } = demo.props.get(entry.prop)!;
      const points = outerPoints(prop.extremes);
      const opened = await player.open(glb);
      for (const record of demo.record.clips.filter((clip) => clip.throw === throwName)) {
        const { flight } = solveTake(demo.file, entry, prop, record.take);
        const played = opened.play(record.name);
        let greatest = 0;
        let excess = Number.NEGATIVE_INFINITY;
        for (const moment of moments) {
          const t = moment * Math.fround(flight.duration) * (1 - 2 ** -20);
          const shown = played.seek(t);
          for (const point of points) {
            const arm = rotate(modelRotation(flight, prop, t), subtract(point, prop.centerOfMass));
            const place = add(flight.centerOfMass(t), arm);
            greatest = Math.max(greatest, ...place.map(Math.abs));
            excess = Math.max(excess, distance(shown(point), place) - record.error);
          }
        }
        played.end();
        // a player computes in float32: 2⁻²³ of the greatest coordinate (IEEE 754)
        expect(excess, record.name).toBeLessThanOrEqual(2 ** -23 * greatest);
      }
    },
  );
});
