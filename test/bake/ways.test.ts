import { readFileSync } from "node:fs";
import { expect, it } from "vitest";
import { bake } from "../../src/bake/bake.js";
import type { ModelSource } from "../../src/bake/props.js";
import { type ListedWay, type TakeWays, throwWays } from "../../src/bake/ways.js";
import type { WrittenSpin } from "../../src/bake/written-spin.js";
import { readModel } from "../../src/gltf/read.js";
import { distance, length, type Vec3 } from "../../src/math/vec3.js";
import { parseThrowFile } from "../../src/throwfile/parse.js";
import { assets } from "../cli/folder.js";

const SPANNER = new Uint8Array(readFileSync(assets("props/spanner.glb")));
const source: ModelSource = async (path) => ({ model: await readModel(path, SPANNER), sha256: "" });

const throwFile = (release: string, arrive: string, more: string) =>
  parseThrowFile(
    "test.throws.yaml",
    `
seed: ways
props:
  spanner:
    model: spanner.glb
    density: { steel: 7850, rubber: 1100 }
    points: { grip: { node: socket_grip }, jaw: { node: socket_jaw } }
  ball: { shape: { sphere: 0.1 } }
throws:
  lob:
    prop: spanner
    takes: 2
    release: ${release}
    arrive: ${arrive}
${more}
`,
  );

const GRIP = "{ at: [0, 1.4, 0], point: grip, facing: [[grip, back], [short, up]], scatter: 0..5 }";
const POSE = "{ at: [0.4, 1, 3.2], after: 0.8..0.9, facing: [[grip, ahead], [short, [1, 0.5, 0]]] }";

const spinLine = ({ axis, turns, rate }: WrittenSpin) =>
  Object.entries({ axis: typeof axis === "object" ? `[${axis}]` : axis, turns, rate })
    .filter(([, value]) => value !== undefined)
    .map(([key, value]) => `${key}: ${value}`)
    .join(", ");

/** What the throw file gets with this spin. */
async function angularVelocity(
  release: string,
  arrive: string,
  spin: WrittenSpin,
  take: number,
): Promise<Vec3> {
  const line = spinLine(spin);
  const file = throwFile(release, arrive, line && `    spin: { ${line} }`);
  const { throws } = await bake(file, source, { takes: [take, take] });
  return throws[0].takes[0].release.angularVelocity;
}

/** Every way whose spin is written into the throw file comes out of it; their number. */
async function expectEachGets(release: string, arrive: string, { ways, take }: TakeWays): Promise<number> {
  const written = ways.filter((way): way is ListedWay & { spin: WrittenSpin } => way.spin !== null);
  for (const { angularVelocity: listed, spin } of written) {
    const made = await angularVelocity(release, arrive, spin, take);
    expect(distance(made, listed), spinLine(spin)).toBeLessThan(1e-6 * Math.max(1, length(listed)));
  }
  return written.length;
}

it("each way of a pose is got by the spin beside it, and the one taken is marked", async () => {
  const file = throwFile(GRIP, POSE, "    spin: { axis: middle, turns: 1.5 }");
  const [list] = await throwWays(file, source, "lob", { takes: [2, 2] });
  expect(list).toMatchObject({ take: 2, isEvery: true, leastTurns: 0, mostTurns: 4 });
  const count = await expectEachGets(GRIP, POSE, list);
  // those that whirl fast about the length are hidden behind plainer ones
  expect(count).toBeGreaterThan(10);
  const taken = list.ways.filter((way) => way.taken);
  expect(taken.map(({ spin }) => spin)).toEqual([{ axis: "middle", turns: 1.5 }]);
  const { throws } = await bake(file, source, { takes: [2, 2] });
  expect(taken[0].angularVelocity).toEqual(throws[0].takes[0].release.angularVelocity);
}, 60_000);

it("ways are listed by their turns, within two of the wish, all ending in the pose", async () => {
  const file = throwFile(GRIP, POSE, "    spin: { turns: 3 }");
  const [{ ways }] = await throwWays(file, source, "lob", { takes: [1, 1] });
  const turns = ways.map((way) => way.turns);
  expect(turns).toEqual([...turns].sort((a, b) => a - b));
  expect(turns[0]).toBeGreaterThanOrEqual(1);
  expect(turns.at(-1)).toBeLessThanOrEqual(5);
  // near the middle axis rounding takes its share; a take may miss by 0.01 degrees
  for (const way of ways) expect(way.miss).toBeLessThan((0.01 * Math.PI) / 180);
}, 60_000);

it("a hand whose own velocity is stated leaves each way a speed of its own", async () => {
  const hand = "{ velocity: [0, 3, 4], point: grip }";
  const arrive = "{ after: 0.7, facing: [[grip, ahead], [short, left]] }";
  const file = throwFile(hand, arrive, "    spin: { axis: short, turns: 1 }");
  const [list] = await throwWays(file, source, "lob", { takes: [1, 1] });
  expect(new Set(list.ways.map(({ speed }) => speed.toFixed(3))).size).toBeGreaterThan(3);
  expect(await expectEachGets(hand, arrive, list)).toBeGreaterThan(5);
}, 60_000);

it("of one direction there are ways near the wish, each with its spin", async () => {
  const arrive = "{ at: [0.4, 1, 3.2], after: 0.8..0.9, point: jaw, facing: [[jaw, flight]] }";
  const file = throwFile(GRIP, arrive, "    spin: { axis: middle, turns: 1.5 }");
  const [list] = await throwWays(file, source, "lob", { takes: [1, 1] });
  expect(list.isEvery).toBe(false);
  expect(await expectEachGets(GRIP, arrive, list)).toBeGreaterThanOrEqual(3);
  expect(list.ways.filter((way) => way.taken).length).toBe(1);
  // the same number of turns the other way round is among them
  expect(new Set(list.ways.map(({ angularVelocity: [x] }) => Math.sign(x))).size).toBe(2);
}, 60_000);

it("a sphere's ways are turns about one axis, whole turns apart", async () => {
  const file = throwFile(
    "{ at: [0, 1, 0] }",
    "{ at: [0, 1, 3], after: 0.8, facing: { rotation: [0, 0, 1, 1] } }",
    "    spin: { turns: 1 }",
  );
  const entry = { ...file.throws.get("lob")!, prop: "ball" };
  const [{ ways }] = await throwWays({ ...file, throws: new Map([["lob", entry]]) }, source, "lob", {
    takes: [1, 1],
  });
  // a quarter turn one way is three quarters the other: plain kinematics
  const expected = [0.25, 0.75, 1.25, 1.75, 2.25, 2.75];
  expect(ways.length).toBe(expected.length);
  ways.forEach(({ turns }, i) => {
    expect(turns).toBeCloseTo(expected[i], 9);
  });
});

it("limits that no take holds are told with the ways of the take there would be", async () => {
  const file = throwFile(GRIP, POSE, "    spin: { axis: middle, turns: 1.5 }\n    limits: { speed: 0.1 }");
  const [{ unheld, ways }] = await throwWays(file, source, "lob", { takes: [1, 1] });
  expect(unheld?.message).toMatch(/limits\.speed/);
  expect(ways.some(({ taken }) => taken)).toBe(true);
}, 120_000);

it("a throw without a pose to get to is refused where it says how it arrives", async () => {
  const file = throwFile(GRIP, "{ at: [0, 1, 3], after: 0.8 }", "    spin: { axis: short, turns: 1 }");
  await expect(throwWays(file, source, "lob")).rejects.toThrow(
    /test\.throws\.yaml:14:\d+ throws\.lob\.arrive: .*found no arrive\.facing.*; add arrive\.facing/,
  );
});
