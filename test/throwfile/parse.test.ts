// Expected values follow from the grammar of the throw file (the design of this program, no outside source).
import { describe, expect, test } from "vitest";
import { parseThrowFile } from "../../src/throwfile/parse.js";
import { faultsOf } from "./faults-of.js";
import { EVERY_KEY, QUAY } from "./quay.js";

const PROPS = "props: { ball: { shape: { sphere: 0.1 }, points: { grip: [0, 0, 0.1] } } }\n";
const parse = (text: string) => parseThrowFile("quay.throws.yaml", text);
const one = (keys: string, more = "") =>
  parse(
    `${more}${PROPS}throws: { lob: { prop: ball, arrive: { at: [1, 1, 1], after: 1 }, ${keys} } }`,
  ).throws.get("lob")!;
const timeOf = (time: string, more = "") =>
  parse(
    `${more}${PROPS}throws: { lob: { prop: ball, arrive: { at: [1, 1, 1], after: ${time} } } }`,
  ).throws.get("lob")!.arrive.after;

describe("how a prop is weighed", () => {
  test("a density of 0 leaves a material out; what is solid and how thick walls are can be chosen", () => {
    const { props } = parse(
      "props: { oar: { model: oar.glb, density: { rope: 0, default: 680 }, solid: surface, wall: 0.003 } }",
    );
    expect(props.get("oar")).toMatchObject({
      density: { rope: 0, default: 680 },
      solid: "surface",
      wall: 0.003,
    });
  });
});

describe("the grammar's example", () => {
  test("is read as it is written", () => {
    const file = parse(QUAY);
    expect(file).toMatchObject({ seed: "lantern-quay", gravity: 9.80665, frameRate: 30 });
    expect([...file.props]).toEqual([
      [
        "spanner",
        {
          name: "spanner",
          model: "props/spanner.glb",
          scale: 1,
          density: { steel: 7850, rubber: 1100, default: 1000 },
          solid: "auto",
          weights: [],
          points: { grip: [0, 0, -0.11] },
        },
      ],
    ]);
    expect([...file.throws.values()]).toEqual([
      {
        name: "lob-to-bench",
        prop: "spanner",
        takes: 24,
        release: {
          at: [0, 1.4, 0],
          point: "grip",
          facing: [
            ["grip", "back"],
            ["short", "up"],
          ],
          scatter: { range: [0, 5] },
        },
        arrive: { at: [3.2, 1, 0.4], after: { range: [0.9, 1] } },
        arc: { branch: "low" },
        spin: { axis: "middle", turns: 1.5 },
        vary: "even",
        hold: { before: 0, after: 0 },
      },
    ]);
    expect(file.bake).toEqual({
      keys: "linear",
      layout: "one-node",
      files: "per-throw",
      container: "glb",
      mesh: true,
      pack: "float",
    });
  });

  test("may say where its schema is, in text", () => {
    const pointed = parse(`$schema: throws.schema.json\n${QUAY}`);
    expect([...pointed.throws]).toEqual([...parse(QUAY).throws]);
    expect(faultsOf(`$schema: 7\n${QUAY}`)).toMatchObject([{ line: 1, column: 1, path: ["$schema"] }]);
  });

  test("is the same with Windows line ends, a byte order mark, or as JSON", () => {
    const plain = (text: string) => {
      const { props, throws, ...rest } = parse(text);
      return { ...rest, locate: undefined, props: [...props], throws: [...throws] };
    };
    const expected = plain(QUAY);
    expect(plain(`\uFEFF${QUAY.replaceAll("\n", "\r\n")}`)).toEqual(expected);
    const json = {
      seed: "lantern-quay",
      props: {
        spanner: {
          model: "props/spanner.glb",
          density: { steel: 7850, rubber: 1100, default: 1000 },
          points: { grip: [0, 0, -0.11] },
        },
      },
      throws: {
        "lob-to-bench": {
          prop: "spanner",
          takes: 24,
          release: {
            at: [0, 1.4, 0],
            point: "grip",
            facing: [
              ["grip", "back"],
              ["short", "up"],
            ],
            scatter: "0..5",
          },
          arrive: { at: [3.2, 1.0, 0.4], after: "0.9..1.0" },
          spin: { axis: "middle", turns: 1.5 },
        },
      },
    };
    expect(plain(JSON.stringify(json))).toEqual(expected);
    expect(plain(JSON.stringify(json, null, "\t"))).toEqual(expected);
  });

  test("knows where each key stands", () => {
    const { locate } = parse(QUAY);
    expect(locate(["throws", "lob-to-bench", "spin", "turns"])).toEqual({ line: 13, column: 30 });
    expect(locate(["throws", "lob-to-bench", "arrive", "at", 1])).toEqual({ line: 12, column: 26 });
    // what is not written: the nearest key around it
    expect(locate(["throws", "lob-to-bench", "arc", "speed"])).toEqual({ line: 8, column: 3 });
  });
});

test("a file with every key has no other fault than that some are not there yet", () => {
  expect(faultsOf(EVERY_KEY)).toEqual([]);
});

describe("spreads", () => {
  test.each([
    ["0.9", 0.9],
    ["1.5..2.5", { range: [1.5, 2.5] }],
    ["1 .. 2", { range: [1, 2] }],
    ["1e-3..2e-3", { range: [0.001, 0.002] }],
    [".5..1", { range: [0.5, 1] }],
    ["2 ± 0.2", { normal: [2, 0.2] }],
    ["2 +- 0.2", { normal: [2, 0.2] }],
    ["2±0.2", { normal: [2, 0.2] }],
    ["{ pick: [1, 2] }", { pick: [1, 2] }],
    ["{ each: [1, 15f] }", { each: [1, 0.5] }],
    ["27f", 0.9],
    ["30f..45f", { range: [1, 1.5], frames: 30 }],
  ])("of a time: %s", (written, expected) => {
    expect(timeOf(written)).toEqual(expected);
  });

  test.each([
    ["-5..5", { range: [-5, 5] }],
    ["-3..-1", { range: [-3, -1] }],
    ["-3 ± 1", { normal: [-3, 1] }],
    ["+1..+2", { range: [1, 2] }],
  ])("of a number that may be negative: %s", (written, expected) => {
    expect(one(`spin: { axis: x, turns: ${written} }`).spin?.turns).toEqual(expected);
  });

  test("frames count by the file's frame rate", () => {
    expect(timeOf("27f", "frameRate: 60\n")).toBe(0.45);
    expect(timeOf("24f..48f", "frameRate: 24\n")).toEqual({ range: [1, 2], frames: 24 });
  });

  test("stand within vectors, among words and among lists", () => {
    const { release, spin } = one(
      "release: { at: [0..1, { pick: [1, 2] }, 0], point: { each: [grip, centerOfMass] }, facing: { pick: [any, [[grip, up]]] } }, spin: { axis: { pick: [long, -long] }, rate: 1 }",
    );
    expect(release.at).toEqual([{ range: [0, 1] }, { pick: [1, 2] }, 0]);
    expect(release.point).toEqual({ each: ["grip", "centerOfMass"] });
    expect(release.facing).toEqual({ pick: ["any", [["grip", "up"]]] });
    expect(spin?.axis).toEqual({ pick: ["long", "-long"] });
  });
});

describe("values", () => {
  test("takes that are listed come out in order", () => {
    expect(one("takes: [19, 3, 7]").takes).toEqual([3, 7, 19]);
  });

  test("y, no and on are words, as in YAML 1.2", () => {
    expect(one("spin: { axis: y, rate: 1 }").spin?.axis).toBe("y");
    expect([
      ...parse(`${PROPS}throws: { no: { prop: ball, arrive: { at: [1, 1, 1], after: 1 } } }`).throws.keys(),
    ]).toEqual(["no"]);
  });

  test("names that look like numbers stay as written", () => {
    const file = parse(`${PROPS}throws: { 007: { prop: ball, arrive: { at: [1, 1, 1], after: 1 } } }`);
    expect([...file.throws.keys()]).toEqual(["007"]);
  });

  test("a number and its digits are the same seed", () => {
    expect(parse(`seed: 7\n${PROPS}`).seed).toBe(parse(`seed: "7"\n${PROPS}`).seed);
  });

  test("what a host leaves out is glTF's own", () => {
    expect(parse(`host: { unit: 0.01 }\n${PROPS}`).host).toEqual({ axes: ["x", "y", "z"], unit: 0.01 });
  });

  test("a point may be called like an object's own property", () => {
    const point = "points: { constructor: [0, 0, 1] }";
    expect(parse(`props: { ball: { shape: { sphere: 1 }, ${point} } }`).props.get("ball")?.points).toEqual({
      constructor: [0, 0, 1],
    });
    expect(
      faultsOf(
        `${PROPS}throws: { lob: { prop: ball, release: { point: constructor }, arrive: { at: [1, 1, 1], after: 1 } } }`,
      ),
    ).toHaveLength(1);
  });

  test("a file of props alone can be weighed", () => {
    expect([...parse(PROPS).throws]).toEqual([]);
  });

  test("a turn-only bake needs a flight time alone", () => {
    expect(
      faultsOf(`bake: { layout: turn-only }\n${PROPS}throws: { lob: { prop: ball, arrive: { after: 1 } } }`),
    ).toEqual([]);
  });
});

describe("what fixes a flight", () => {
  const flight = (keys: string) => faultsOf(`${PROPS}throws: { lob: { prop: ball, ${keys} } }`);
  test.each([
    "arrive: { at: [1, 1, 1], after: 1 }",
    "arrive: { at: [1, 1, 1] }, arc: { apex: 1 }",
    "arrive: { at: [1, 1, 1] }, arc: { through: [1, 2, 1] }",
    "arrive: { at: [1, 1, 1] }, arc: { speed: 9 }",
    "arrive: { at: [1, 1, 1] }, arc: { elevation: 45 }",
    "gravity: free, arrive: { at: [1, 1, 1], after: 1 }, arc: { apex: 1 }",
    "gravity: free, arrive: { at: [1, 1, 1] }, arc: { speed: 9, elevation: 45 }",
    "release: { velocity: [1, 2, 3] }, arrive: { after: 1 }",
    "release: { velocity: [1, 2, 3] }, arrive: { floor: 0 }",
    "gravity: free, release: { velocity: [1, 2, 3] }, arrive: { floor: 0 }, arc: { through: [1, 2, 1] }",
    "arc: { heading: 3, speed: 9, elevation: 45 }, arrive: { after: 1 }",
    "arc: { heading: 3, apex: 1, through: [1, 2, 1] }, arrive: { floor: 0 }",
    "gravity: free, arc: { heading: 3, speed: 9, apex: 1, through: [1, 2, 1] }, arrive: { after: 1 }",
  ])("%s", (keys) => {
    expect(flight(keys)).toEqual([]);
  });
});
