// @ts-expect-error it comes without types
import { validateBytes } from "gltf-validator";
import { describe, expect, it } from "vitest";
import { clipFiles } from "../../src/bake/files.js";
import { modelRotation } from "../../src/bake/motion.js";
import { cutTake, solveTake } from "../../src/bake/take.js";
import type { NamedFile } from "../../src/gltf/splice.js";
import { bytesDataUri } from "../../src/gltf/uri.js";
import { rotate } from "../../src/math/quat.js";
import { add, distance, subtract, type Vec3 } from "../../src/math/vec3.js";
import { type BakeSettings, type ThrowFile, takeNumbers } from "../../src/throwfile/types.js";
import { babylon } from "./babylon.js";
import { momentOf, openDemo } from "./demo.js";
import { outerPoints } from "./outer-points.js";
import { three } from "./three.js";

const demo = await openDemo();
const solved = [...demo.file.throws.values()].flatMap((entry) => {
  const loaded = demo.props.get(entry.prop)!;
  return takeNumbers(entry.takes).map((number) => ({
    name: `${entry.name}_${number}`,
    throwName: entry.name,
    prop: loaded,
    take: solveTake(demo.file, entry, loaded.prop, number),
  }));
});
const points = new Map([...demo.props].map(([name, { prop }]) => [name, outerPoints(prop.extremes)]));

/** Off any grid of keys or frames: multiples of the golden ratio, mod 1 (Weyl's equidistribution). */
const moments = Array.from({ length: 12 }, (_, i) => ((i + 0.5) * 0.6180339887498949) % 1);

const styles = (["one-node", "two-node"] as const).flatMap((layout) =>
  (["linear", "cubic", "smallest", "frames"] as const).flatMap((keys) =>
    (["float", "int16"] as const).flatMap((pack) =>
      keys === "cubic" && pack === "int16"
        ? []
        : (["glb", "gltf"] as const).map((container) => ({ layout, keys, pack, container })),
    ),
  ),
);

describe.each(styles)("$layout, $keys, $pack, $container", (style) => {
  const file: ThrowFile = { ...demo.file, bake: { ...demo.file.bake, ...style } as BakeSettings };
  const clips = solved.map((clip) => ({
    ...clip,
    extras: {},
    track: cutTake(file, clip.prop.prop, clip.take),
  }));
  const files = clipFiles(file, clips);

  it("is valid", async () => {
    for (const { name, content } of files) {
      if (name.endsWith(".bin")) continue;
      const report = await validateBytes(new Uint8Array(content), {
        externalResourceFunction: async (uri: string) => files.find((other) => other.name === uri)!.content,
      });
      expect(report.issues.messages.filter(({ severity }: { severity: number }) => severity <= 1)).toEqual(
        [],
      );
    }
  });

  it.each([three, babylon])(
    "$name shows every take of the demo within its stated error of the true flight, over and over and once",
    async (player) => {
      for (const content of playable(files)) {
        const opened = await player.open(content);
        for (const [i, name] of opened.clips.entries()) {
          const { take, track, prop } = clips.find((clip) => clip.name === name)!;
          const { flight } = take;
          const momentAt = momentOf([{ flight, start: take.drawn.hold.before }]);
          // Of one node a player may have changed the name, the model's own being called the same; it is the only root.
          const node = style.layout === "one-node" ? undefined : `${prop.prop.name}-centred`;
          const played = opened.play(name, node, i % 2 === 0);
          let greatest = 0;
          let excess = Number.NEGATIVE_INFINITY;
          for (const moment of moments) {
            const t = moment * track.duration * (1 - 2 ** -20);
            const { time } = momentAt(t);
            const shown = played.seek(t);
            for (const point of points.get(prop.prop.name)!) {
              const arm = rotate(
                modelRotation(flight, prop.prop, time),
                subtract(point, prop.prop.centerOfMass),
              );
              const place = add(flight.centerOfMass(time), arm);
              greatest = Math.max(greatest, ...place.map(Math.abs));
              excess = Math.max(excess, distance(shown(point as Vec3), place) - track.error);
            }
          }
          played.end();
          // a player computes in float32: 2⁻²³ of the greatest coordinate (IEEE 754)
          expect(excess, name).toBeLessThanOrEqual(2 ** -23 * greatest);
        }
      }
    },
  );
});

/** Files as they are, and a .gltf with its .bin inside. */
function playable(files: NamedFile[]): Uint8Array[] {
  return files.flatMap(({ name, content }) => {
    if (name.endsWith(".bin")) return [];
    if (name.endsWith(".glb")) return [content];
    const json = JSON.parse(new TextDecoder().decode(content));
    const { uri } = json.buffers[0];
    json.buffers[0].uri = bytesDataUri(files.find((other) => other.name === uri)!.content);
    return [new TextEncoder().encode(JSON.stringify(json))];
  });
}
