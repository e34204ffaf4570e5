import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { errorOf } from "./faults-of.js";
import { EVERY_KEY, QUAY } from "./quay.js";

const FIXED = { seed: 20, numRuns: 400 };

describe("whatever the text, nothing but a ThrowFileError comes of it", () => {
  test("pieces cut out, doubled, swapped or replaced", () => {
    const noise = fc.oneof(
      fc.constantFrom(
        "{",
        "}",
        "[",
        "]",
        ":",
        ": ",
        "- ",
        "? ",
        "\n",
        "\t",
        "&a ",
        "*a",
        "<<: ",
        "!",
        "|",
        ">",
        "#",
        "'",
        '"',
        "~",
        "..",
        "±",
        "f",
        "-",
        ".inf",
        "null",
        "__proto__",
        "%",
      ),
      fc.string({ maxLength: 5 }),
      fc.integer().map(String),
      fc.double().map(String),
    );
    const edit = fc.tuple(fc.nat(), fc.nat({ max: 12 }), noise);
    fc.assert(
      fc.property(
        fc.constantFrom(QUAY, EVERY_KEY),
        fc.array(edit, { minLength: 1, maxLength: 4 }),
        (source, edits) => {
          let text = source;
          for (const [where, cut, put] of edits) {
            const at = where % (text.length + 1);
            text = text.slice(0, at) + put + text.slice(at + cut);
          }
          errorOf(text); // throws what is no ThrowFileError
        },
      ),
      FIXED,
    );
  });

  test("any value in place of any key's", () => {
    const { parse } = JSON;
    const file = {
      seed: 1,
      gravity: 1,
      frameRate: 30,
      host: { axes: ["x", "y", "z"], unit: 1 },
      bake: {
        tolerance: 1,
        keys: "linear",
        layout: "one-node",
        files: "per-throw",
        container: "glb",
        mesh: true,
        pack: "float",
      },
      props: {
        a: {
          shape: { sphere: 1 },
          scale: 1,
          density: 1,
          mass: 1,
          solid: "auto",
          wall: 1,
          weights: [],
          centerOfMass: [0, 0, 0],
          inertia: [1, 1, 1],
          points: { g: [0, 0, 1] },
        },
      },
      throws: {
        t: {
          prop: "a",
          takes: 2,
          gravity: 1,
          release: {
            at: [0, 0, 0],
            point: "g",
            facing: [["g", "up"]],
            scatter: 1,
            velocity: [0, 0, 1],
            angularVelocity: [0, 0, 1],
          },
          arrive: { at: [0, 0, 0], point: "g", after: 1, facing: "any", scatter: 1, floor: 0 },
          arc: { apex: 1, through: [0, 0, 0], speed: 1, elevation: 1, heading: 1, branch: "low" },
          spin: { axis: "x", turns: 1, rate: 1, wobble: 1, phase: 1 },
          limits: { minHeight: 0, maxHeight: 1, clear: [], speed: 1, rate: 1, turns: "1..2", share: 1 },
          vary: "even",
          hold: { before: 1, after: 1 },
        },
        u: { like: "t" },
      },
      chains: { c: { throws: ["t", "u"], loop: false } },
    };
    const paths: string[][] = [];
    const walk = (value: unknown, path: string[]) => {
      if (path.length > 0) paths.push(path);
      if (typeof value === "object" && value !== null)
        for (const [key, inner] of Object.entries(value)) walk(inner, [...path, key]);
    };
    walk(file, []);
    const value = fc.oneof(
      fc.jsonValue({ maxDepth: 3 }),
      fc.constantFrom(
        "1..2",
        "2..1",
        "1 ± 3",
        "5f",
        "5f..9f",
        "any",
        "rest",
        "free",
        "-g",
        "t",
        "u",
        "c",
        "x",
        null,
        [],
        {},
        { pick: [] },
        { each: ["g", "up"] },
        { pick: [1, [1, 2, 3]] },
        { point: "g" },
        [
          ["g", "up"],
          ["g", "up"],
        ],
        { box: [1, 1, 1] },
      ),
    );
    fc.assert(
      fc.property(
        fc.array(fc.tuple(fc.constantFrom(...paths), value), { minLength: 1, maxLength: 4 }),
        (edits) => {
          const copy = parse(JSON.stringify(file));
          for (const [path, put] of edits) {
            let node = copy;
            for (const key of path.slice(0, -1))
              node = typeof node?.[key] === "object" && node[key] !== null ? node[key] : {};
            node[path[path.length - 1]] = put;
          }
          const error = errorOf(JSON.stringify(copy));
          for (const { line, column, fault, remedy } of error?.faults ?? []) {
            expect(line).toBe(1);
            expect(column).toBeGreaterThan(0);
            expect(fault + remedy).not.toMatch(/undefined|\[object|NaN/);
          }
        },
      ),
      FIXED,
    );
  });
});

describe("a text made to exhaust the machine is refused", () => {
  const deep = 100_000;
  test.each([
    ["brackets in brackets", `seed: ${"[".repeat(deep)}`],
    ["braces in braces", `{a: `.repeat(deep)],
    ["lists in lists", "- ".repeat(deep)],
    ["keys of keys", "? ".repeat(deep)],
    ["anchors before lists", "&a - ".repeat(deep)],
    ["ever further in", Array.from({ length: 1000 }, (_, i) => `${" ".repeat(i)}a:`).join("\n")],
    ["ever further in, lists", Array.from({ length: 1000 }, (_, i) => `${" ".repeat(i)}- a:`).join("\n")],
    [
      "aliases of aliases",
      Array.from(
        { length: 40 },
        (_, i) => `k${i}: &a${i} ${i === 0 ? "[1, 1]" : `[*a${i - 1}, *a${i - 1}, *a${i - 1}]`}`,
      ).join("\n"),
    ],
    [
      "merges of merges",
      Array.from(
        { length: 40 },
        (_, i) =>
          `k${i}: &a${i} ${i === 0 ? "{ x: 1 }" : `{ <<: *a${i - 1}, l: *a${i - 1}, r: *a${i - 1} }`}`,
      ).join("\n"),
    ],
    ["too long a file", `seed: ${"x".repeat(4_000_001)}`],
    ["a hundred thousand unknown keys", Array.from({ length: deep }, (_, i) => `k${i}: 1`).join("\n")],
    [
      "a hundred thousand unknown names",
      `props: { p: { shape: { sphere: 1 } } }\nthrows:\n${Array.from({ length: 20_000 }, (_, i) => `  t${i}: { like: x${i} }`).join("\n")}`,
    ],
    ["a hundred thousand faults of syntax", `a: [${"@b, ".repeat(deep)}]`],
    ["anchors upon anchors", "&a ".repeat(deep)],
    ["a long key", `${"k".repeat(1_000_000)}: 1`],
  ])("%s", (_, text) => {
    expect(errorOf(text)).toBeDefined();
  });

  test("nesting is told at its place", () => {
    expect(errorOf(`seed: 1\nprops: ${"[".repeat(100)}`)?.message).toMatch(
      /^quay\.throws\.yaml:2:\d+: nested too deeply/,
    );
  });
});
