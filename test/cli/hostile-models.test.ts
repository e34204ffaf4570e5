import { mkdtempSync, readdirSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { basename, join } from "node:path";
import { fileURLToPath } from "node:url";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { glbOf } from "../gltf/models.js";
import { Program } from "./program.js";

let program: Program;
const folder = mkdtempSync(join(tmpdir(), "tossbake-hostile-"));
beforeAll(async () => {
  program = await Program.install();
});
afterAll(() => {
  program.remove();
  rmSync(folder, { recursive: true });
});

const bad = fileURLToPath(new URL("../data/props/bad/", import.meta.url));
/** Tells its greatest resident size, kB, when it ends. */
const TELL_PEAK = `--import=data:text/javascript,${encodeURIComponent(
  'process.on("exit", () => console.error("peak " + process.resourceUsage().maxRSS))',
)}`;

/** A few bytes of glTF around what a test is about. */
const written = (name: string, json: object): string => {
  const path = join(folder, `${name}.glb`);
  const all = { asset: { version: "2.0" }, scene: 0, scenes: [{ nodes: [0] }], ...json };
  writeFileSync(path, glbOf(all, new Uint8Array(64)));
  return path;
};
const zeros = (count: number, type = "VEC3", componentType = 5126) => ({ count, type, componentType });
const every = <T>(count: number, make: (i: number) => T): T[] =>
  Array.from({ length: count }, (_, i) => make(i));
const oneMesh = { nodes: [{ mesh: 0 }], meshes: [{ primitives: [{ attributes: { POSITION: 0 } }] }] };
const compressed = (count: number) => ({
  buffer: 1,
  byteLength: 12 * count,
  extensions: {
    EXT_meshopt_compression: { buffer: 0, byteLength: 64, byteStride: 12, count, mode: "ATTRIBUTES" },
  },
});
const fallback = (byteLength: number) => [
  { byteLength: 64 },
  { byteLength, extensions: { EXT_meshopt_compression: { fallback: true } } },
];

const HOSTILE: [string, object][] = [
  ["empty accessors", { ...oneMesh, accessors: [zeros(1_398_000)] }],
  [
    "many empty accessors",
    {
      nodes: [{ mesh: 0 }],
      meshes: [{ primitives: every(10, (i) => ({ attributes: { POSITION: i } })) }],
      accessors: every(10, () => zeros(1_398_000)),
    },
  ],
  [
    "a mesh shown by 100,000 nodes",
    {
      ...oneMesh,
      nodes: every(100_000, () => ({ mesh: 0 })),
      scenes: [{ nodes: every(100_000, (i) => i) }],
      accessors: [zeros(150)],
    },
  ],
  [
    "100,000 instances",
    {
      ...oneMesh,
      nodes: [{ mesh: 0, extensions: { EXT_mesh_gpu_instancing: { attributes: { TRANSLATION: 1 } } } }],
      accessors: [zeros(150), zeros(100_000)],
    },
  ],
  [
    "compressed vertices of 128 MB",
    {
      ...oneMesh,
      accessors: [{ ...zeros(3), bufferView: 0 }],
      bufferViews: [compressed(11_000_000)],
      buffers: fallback(132_000_000),
    },
  ],
  [
    "compressed vertices of noise",
    {
      ...oneMesh,
      accessors: [{ ...zeros(100_000), bufferView: 0 }],
      bufferViews: [compressed(100_000)],
      buffers: fallback(1_200_000),
    },
  ],
  [
    "a compressed mesh of noise",
    {
      nodes: [{ mesh: 0 }],
      meshes: [
        {
          primitives: [
            {
              attributes: { POSITION: 0 },
              extensions: { KHR_draco_mesh_compression: { bufferView: 0, attributes: { POSITION: 0 } } },
            },
          ],
        },
      ],
      accessors: [zeros(100)],
      bufferViews: [{ buffer: 0, byteLength: 64 }],
      buffers: [{ byteLength: 64 }],
    },
  ],
];

describe("a model that is damaged or means harm", () => {
  const files = [
    ...readdirSync(bad).map((name): [string, () => string] => [name, () => join(bad, name)]),
    ...HOSTILE.map(([name, json]): [string, () => string] => [name, () => written(name, json)]),
  ];
  it.each(files)("%s: one message with the file's name, exit code 2, under 512 MB", (_, path) => {
    const file = path();
    const { code, out, err } = program.run(["weigh", file], { node: [TELL_PEAK] });
    expect(code).toBe(2);
    expect(out).toBe("");
    const [message, peak, ...rest] = err.trimEnd().split("\n");
    expect(rest).toEqual([]);
    expect(message).toContain(basename(file));
    expect(message).toMatch(/; ./);
    expect(Number(/^peak (\d+)$/.exec(peak)![1])).toBeLessThan(512 * 1024);
  });
});
