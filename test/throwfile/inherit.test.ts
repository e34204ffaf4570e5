// Expected values follow from the grammar of the throw file (the design of this program, no outside source).
import { describe, expect, test } from "vitest";
import { parseThrowFile } from "../../src/throwfile/parse.js";
import { faultsOf, marked } from "./faults-of.js";

const HEAD = `props: { ball: { shape: { sphere: 0.1 } }, crate: { shape: { box: [1, 1, 1] }, points: { grip: [0, 0, 1] } } }
throws:
  base: { prop: crate, takes: 4, release: { at: [0, 1, 0], point: grip }, arrive: { at: [1, 1, 1], after: 1 } }
`;
const child = (keys: string, name = "child") =>
  parseThrowFile("quay.throws.yaml", `${HEAD}  ${keys}`).throws.get(name)!;

describe("a throw like another", () => {
  test("takes its keys, merged at any depth", () => {
    expect(child("child: { like: base, release: { at: [0, 2, 0] }, takes: 2 }")).toMatchObject({
      prop: "crate",
      takes: 2,
      release: { at: [0, 2, 0], point: "grip" },
      arrive: { at: [1, 1, 1], after: 1 },
    });
  });

  test("has no key that null takes away", () => {
    const { arrive, arc } = child("child: { like: base, arrive: { after: null }, arc: { apex: 1 } }");
    expect(arrive).toEqual({ at: [1, 1, 1] });
    expect(arc).toEqual({ apex: 1, branch: "low" });
  });

  test("has no section that null takes away", () => {
    const { release } = child("child: { like: base, release: null }");
    expect(release).toEqual({ point: "centerOfMass" });
  });

  test("passes on what it took, in whatever order they stand", () => {
    const first = child(
      "grand: { like: child, takes: 9 }\n  child: { like: base, release: { at: [5, 5, 5] } }",
      "grand",
    );
    expect(first).toMatchObject({ takes: 9, release: { at: [5, 5, 5], point: "grip" } });
  });

  test("replaces a spread whole", () => {
    const text =
      "wide: { like: base, arrive: { after: { pick: [1, 2] } } }\n  child: { like: wide, arrive: { after: { each: [3, 4] } } }";
    expect(child(text).arrive.after).toEqual({ each: [3, 4] });
  });

  test("merges the parts of an orientation", () => {
    const text =
      "turned: { like: base, release: { facing: { point: grip, rotation: [0, 0, 0, 1] } } }\n  child: { like: turned, release: { facing: { point: null } } }";
    expect(child(text).release.facing).toEqual({ rotation: [0, 0, 0, 1] });
  });

  test("goes on through a thousand throws", () => {
    const many = Array.from({ length: 1000 }, (_, i) => `t${i + 1}: { like: ${i === 0 ? "base" : `t${i}`} }`);
    expect(child(many.reverse().join("\n  "), "t1000").takes).toBe(4);
  });
});

describe("faults of what is inherited", () => {
  test("stand where the key is written, told once", () => {
    const { text, line, column } = marked(
      `${HEAD.replace("after: 1", "»after: -1")}  one: { like: base }\n  two: { like: one }\n`,
    );
    expect(faultsOf(text)).toMatchObject([{ line, column, path: ["throws", "base", "arrive", "after"] }]);
  });

  test("name the heir where only it is wrong", () => {
    // the ball has no grip
    const { text, line, column } = marked(
      `${HEAD.replace("point: grip", "»point: grip")}  child: { like: base, prop: ball }\n`,
    );
    expect(faultsOf(text)).toMatchObject([{ line, column, path: ["throws", "child", "release", "point"] }]);
  });

  test("stand at the heir's own key where keys exclude each other", () => {
    const { text, line, column } = marked(`${HEAD}  child: { like: base, arc: { »apex: 1 } }\n`);
    expect(faultsOf(text)).toMatchObject([{ line, column, path: ["throws", "child", "arc", "apex"] }]);
  });

  test("a circle is told once, and nothing follows from it", () => {
    const { text, line, column } = marked(`${HEAD}  a: { »like: b }\n  b: { like: c }\n  c: { like: a }\n`);
    const faults = faultsOf(text);
    expect(faults).toMatchObject([{ line, column, path: ["throws", "a", "like"] }]);
    expect(faults[0].fault).toContain("a like b like c like a");
  });

  test("null for an unknown key is still an unknown key", () => {
    const { text, line, column } = marked(`${HEAD}  child: { like: base, »spni: null }\n`);
    expect(faultsOf(text)).toMatchObject([{ line, column, fault: "unknown key" }]);
  });

  test("a wrong value of a throw whose like is wrong is told too", () => {
    expect(faultsOf(`${HEAD}  child: { like: bse, takes: 0 }\n`).map((f) => f.path.at(-1))).toEqual([
      "like",
      "takes",
    ]);
  });
});

test("anchors and merge keys work, with faults at what was written", () => {
  const anchored = `${HEAD.replace("base: {", "base: &b {")}  child: { <<: *b, takes: 7 }\n`;
  const file = parseThrowFile("quay.throws.yaml", anchored);
  expect(file.throws.get("child")).toMatchObject({ prop: "crate", takes: 7 });
  expect(file.locate(["throws", "child", "release", "at"])).toEqual(
    file.locate(["throws", "base", "release", "at"]),
  );
});
