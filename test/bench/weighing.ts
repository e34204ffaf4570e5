import { execFile } from "node:child_process";
import { mkdtemp, rm, writeFile } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { promisify } from "node:util";
import { NodeIO, WebIO } from "@gltf-transform/core";
import { readModel } from "../../src/gltf/read.js";
import { readSurfaces } from "../../src/gltf/surfaces.js";
import { readModelFile } from "../../src/node/model-files.js";
import { weigh } from "../../src/prop/prop.js";
import { bytesOf, glbOf } from "../gltf/models.js";
import { secondsEach } from "./measure.js";
import { duration, figure, type Section } from "./section.js";

/** Rings, and segments of each: 2·500·499 triangles. */
const RINGS = 500;

export const weighing: Section = {
  name: "weighing",
  about: `A dented ball of ${2 * RINGS * (RINGS - 1)} triangles with normals and texture coordinates, from a warm .glb file and from memory. Ratios are
to @gltf-transform/core's read of the same, which copies its arrays and looks at none of their numbers. Memory is the peak of a process of
its own that weighs the ball once, above what it had before.`,
  run: () =>
    withFile(ball(), async (path, glb) => {
      const [nodeIO, webIO] = [new NodeIO(), new WebIO()];
      const [fromFile, weighedFile, fromMemory, read, weighed] = await secondsEach(
        [
          { run: () => nodeIO.read(path) },
          { run: async () => weigh("ball", (await readModelFile(path, "ball.glb")).model) },
          { run: () => webIO.readBinary(glb as Uint8Array<ArrayBuffer>) },
          { run: async () => readSurfaces(await readModel("ball", glb)) },
          { run: async () => weigh("ball", await readModel("ball", glb)) },
        ],
        8,
      );
      const used = await megabytesUsed(path);
      return {
        head: ["", "time", "ratio", "MB above idle", "of the file"],
        rows: [
          ["file read by @gltf-transform/core", duration(fromFile), "1", "", ""],
          [
            "file read and weighed",
            duration(weighedFile),
            figure(weighedFile / fromFile),
            figure(used),
            figure(used / (glb.length / 1e6)),
          ],
          ["read from memory by @gltf-transform/core", duration(fromMemory), "1", "", ""],
          ["from memory, triangles in the scene's frame", duration(read), figure(read / fromMemory), "", ""],
          ["from memory, weighed", duration(weighed), figure(weighed / fromMemory), "", ""],
        ],
      };
    }),
};

async function withFile<T>(glb: Uint8Array, use: (path: string, glb: Uint8Array) => Promise<T>): Promise<T> {
  const folder = await mkdtemp(join(tmpdir(), "tossbake-bench-"));
  try {
    const path = join(folder, "ball.glb");
    await writeFile(path, glb);
    return await use(path, glb);
  } finally {
    await rm(folder, { recursive: true });
  }
}

async function megabytesUsed(path: string): Promise<number> {
  const { stdout } = await promisify(execFile)(process.execPath, [process.argv[1], "--weigh", path]);
  return Number(stdout);
}

/** What that process does: prints MB. */
export async function weighForTable(path: string): Promise<void> {
  const peak = () => (process.resourceUsage().maxRSS * 1024) / 1e6;
  const idle = peak();
  const { model } = await readModelFile(path, "ball.glb");
  await weigh("ball", model);
  process.stdout.write(String(peak() - idle));
}

export function ball(): Uint8Array {
  const count = RINGS * (RINGS - 1) + 2;
  const positions = new Float32Array(3 * count);
  for (let vertex = 0; vertex < count; vertex++) {
    const ring = vertex === 0 ? 0 : vertex === count - 1 ? RINGS : Math.floor((vertex - 1) / RINGS) + 1;
    const polar = (Math.PI * ring) / RINGS;
    const round = (2 * Math.PI * ((vertex + RINGS - 1) % RINGS)) / RINGS;
    const radius = 0.1 * (1 + 0.1 * Math.sin(5 * polar) * Math.sin(3 * round));
    const place = [Math.sin(polar) * Math.cos(round), Math.cos(polar), -Math.sin(polar) * Math.sin(round)];
    positions.set(
      place.map((value) => radius * value),
      3 * vertex,
    );
  }
  const at = (ring: number, segment: number): number =>
    ring === 0 ? 0 : ring === RINGS ? count - 1 : 1 + (ring - 1) * RINGS + (segment % RINGS);
  const triangles: number[] = [];
  for (let ring = 0; ring < RINGS; ring++)
    for (let segment = 0; segment < RINGS; segment++) {
      const [a, b] = [at(ring, segment), at(ring, segment + 1)];
      const [c, d] = [at(ring + 1, segment), at(ring + 1, segment + 1)];
      if (ring > 0) triangles.push(a, d, b);
      if (ring < RINGS - 1) triangles.push(a, c, d);
    }
  const arrays = [positions, positions, new Float32Array(2 * count), Uint32Array.from(triangles)];
  let byteOffset = 0;
  const bufferViews = arrays.map(({ byteLength }) => {
    byteOffset += byteLength;
    return { buffer: 0, byteOffset: byteOffset - byteLength, byteLength };
  });
  const accessor = (bufferView: number, type: string, size: number, componentType: number) => ({
    bufferView,
    type,
    componentType,
    count: arrays[bufferView].length / size,
  });
  const json = {
    asset: { version: "2.0" },
    scenes: [{ nodes: [0] }],
    nodes: [{ name: "ball", mesh: 0 }],
    meshes: [{ primitives: [{ attributes: { POSITION: 0, NORMAL: 1, TEXCOORD_0: 2 }, indices: 3 }] }],
    accessors: [
      accessor(0, "VEC3", 3, 5126),
      accessor(1, "VEC3", 3, 5126),
      accessor(2, "VEC2", 2, 5126),
      accessor(3, "SCALAR", 1, 5125),
    ],
    bufferViews,
    buffers: [{ byteLength: byteOffset }],
  };
  return glbOf(json, bytesOf(...arrays));
}
