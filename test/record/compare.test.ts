import { describe, expect, it } from "vitest";
import type { Drift } from "../../src/record/compare.js";
import { driftLines } from "../../src/record/compare-report.js";
import { drift, LOB } from "./lob.js";

const changed = (from: string, to: string, text = LOB) => {
  expect(text).toContain(from);
  return text.replace(from, to);
};

/** The rows but the one that says that the throw file changed, which all have. */
async function rows(before: string, now: string) {
  const [first, ...others] = await drift(before, now);
  expect(first.kind).toBe("throwFile");
  return others;
}

const words = async (from: string, to: string) =>
  (await rows(LOB, changed(from, to))).map(({ text }) => text);

// Where nothing else is named, what is expected is what was written into the throw file.
describe("a take that drifted is told in words of the motion", () => {
  it("arrives further along the throw, and leaves as much faster as that takes", async () => {
    // level speed 3 m/s to 3.4 m/s in 1 s; upwards gT/2 = 4.903 m/s (textbook): 5.748 and 5.966 m/s, 58.54° and 55.26°
    expect(await words("[0, 1, 3]", "[0, 1, 3.4]")).toEqual(
      ["lob_01", "lob_02", "lob_03"].map(
        (name) =>
          `${name} arrives 400 mm further and 0.22 m/s faster, leaves 0.22 m/s faster and 3.3° flatter`,
      ),
    );
  });

  it("knows left from right and up from down, whichever way it is thrown", async () => {
    // facing +z with +y up, +x is on the left (right-handed axes)
    expect((await words("[0, 1, 3]", "[0.2, 1, 3]"))[0]).toMatch(/^lob_01 arrives 200 mm to the left[, ]/);
    expect((await words("[0, 1, 3]", "[-0.2, 1.3, 3]"))[0]).toMatch(
      /^lob_01 arrives 200 mm to the right, 300 mm higher /,
    );
    const towardsX = changed("[0, 1, 3]", "[3, 1, 0]");
    const moved = await rows(towardsX, changed("[3, 1, 0]", "[2.9, 0.9, -0.2]", towardsX));
    // facing +x, +z is on the right, so that -z is on the left
    expect(moved[0].text).toMatch(/^lob_01 arrives 100 mm shorter, 200 mm to the left, 100 mm lower /);
  });

  it("turns more or less, and lies otherwise where it arrives", async () => {
    // 0.2 turns in 1 s are 72 degrees
    expect(await words("turns: 1.5", "turns: 1.7")).toEqual(
      [1, 2, 3].map((n) =>
        expect.stringMatching(
          `^lob_0${n} arrives turned 72° differently, turns 0.2 more, spins 0.2 turns/s faster`,
        ),
      ),
    );
    expect((await words("turns: 1.5", "turns: 1.25"))[0]).toMatch("turned 90° differently, turns 0.25 less,");
  });

  it("arrives later, and rises higher for it", async () => {
    // rise gT²/8 (textbook): 1.2258 m in 1 s, 1.4833 m in 1.1 s
    const [first] = await words("after: 1 }", "after: 1.1 }");
    expect(first).toMatch(/^lob_01 arrives 100 ms later/);
    expect(first).toMatch(/rises 257 mm higher/);
  });

  it("falls under another gravity", async () => {
    // 1.62 m/s²: the Moon's, from memory
    expect((await words("seed: 1", "seed: 1\ngravity: 1.62"))[0]).toMatch("falls at 1.6 m/s² instead of 9.8");
  });

  it("says that it was drawn anew, and which way it then lies", async () => {
    for (const text of await words("seed: 1", "seed: 2"))
      expect(text).toMatch(/turned .*° differently.*; drawn anew$/);
  });

  it("names the values where the change is too small for words", async () => {
    const [first] = await words("[0, 1, 3]", "[0, 1, 3.000001]");
    expect(first).toMatch(/^lob_01 differs slightly in .*release\.velocity/);
  });

  it("counts the keys that another tolerance takes, and no motion", async () => {
    const found = await rows(LOB, changed("throws:", "bake: { tolerance: 0.0001 }\nthrows:"));
    expect(found).toHaveLength(3);
    for (const row of found) {
      expect(row.text).toMatch(/^lob_0\d is cut to 0.1 mm instead of .* mm, is cut into \d+ keys more$/);
      expect(row.displacement).toBe(0);
    }
  });

  it("says for machines which values changed, from what to what", async () => {
    const [first] = await rows(LOB, changed("turns: 1.5", "turns: 1.7"));
    expect(first).toMatchObject({ kind: "take", what: "changed", name: "lob_01", throw: "lob", takes: [1] });
    expect(first.changes).toContainEqual({ key: "turns", before: 1.5, now: 1.7 });
    // a half-length of 0.15 m and less than the half-diagonal, turned by 72°: at most twice that times sin 36°
    const reach = Math.hypot(0.01, 0.025, 0.15);
    expect(first.displacement).toBeCloseTo(2 * reach * Math.sin(Math.PI / 5), 9);
  });
});

describe("what is no motion", () => {
  it("is a comment in the throw file: one row, and no take", async () => {
    const found = await drift(LOB, `${LOB}# thrown at dusk\n`);
    expect(found.map(({ text }) => text)).toEqual([
      "lob.throws.yaml changed, but no motion: every take is as recorded; bake again to record that",
    ]);
  });

  it("is a denser prop: it flies alike, and the prop is told to weigh more", async () => {
    // 0.02 × 0.05 × 0.3 m³ of 700 kg/m³ are 210 g; twice that, so that nothing is rounded otherwise
    expect(await words("density: 700", "density: 1400")).toEqual(["pin weighs 210 g more (100 %)"]);
  });

  it("is nothing at all where nothing changed", async () => {
    expect(await drift(LOB, LOB)).toEqual([]);
  });
});

describe("a prop that drifted", () => {
  it("balances elsewhere and is harder to turn", async () => {
    const found = await words(
      "density: 700 }",
      "density: 700, weights: [{ at: [0, 0, 0.14], mass: 0.21 }] }",
    );
    // Twice the mass, half of it 140 mm away: the balance point is 70 mm that way. About the length nothing changes; across it
    // m(b² + c²)/12 (textbook) = 1.5820e-3 and 1.6188e-3 kg m² gain 0.21·0.21/0.42 · 0.14² = 2.058e-3 (two bodies' reduced mass).
    // The far end is at 150 + 70 mm instead of 150, with the half edges 10 and 25: 221.6 and 152.4 mm.
    expect(found[0]).toBe(
      "pin weighs 210 g more (100 %), is 130 % harder to turn about its middle axis and 127 % harder to turn about its short axis, " +
        "balances 70 mm off where it did (by [0, 0, 70] mm), reaches 69 mm further",
    );
  });

  it("is another shape", async () => {
    expect((await words("0.3] }", "0.35] }"))[0]).toMatch(
      'pin is {"box":[0.02,0.05,0.35]} instead of {"box":[0.02,0.05,0.3]}, weighs 35 g more',
    );
  });
});

describe("takes and throws that came or went", () => {
  it("are told as such, and change no other take", async () => {
    expect(await words("takes: 3", "takes: 5")).toEqual(["lob: takes 4, 5 are new"]);
    expect(await words("takes: 3", "takes: [1, 3]")).toEqual(["lob: take 2 is gone"]);
  });

  it("are whole throws", async () => {
    const two = `${LOB}  toss: { like: lob, takes: 2 }\n`;
    expect((await rows(LOB, two)).map(({ text }) => text)).toEqual(["throw toss (2 takes) is new"]);
    expect((await rows(two, LOB)).map(({ text }) => text)).toEqual(["throw toss (2 takes) is gone"]);
  });
});

describe("a host's numbers", () => {
  const hosted = changed(
    "seed: 1",
    // the engine's x, y, z are glTF's z, x, y; centimetres
    "seed: 1\nhost: { axes: [z, x, y], unit: 0.01 }",
    LOB.replace("[0, 1, 0]", "[0, 0, 100]").replace("[0, 1, 3]", "[300, 0, 100]"),
  );

  it("are told in metres, along the throw and up as the host has it", async () => {
    const found = await rows(hosted, changed("[300, 0, 100]", "[320, 10, 130]", hosted));
    expect(found[0].text).toMatch(/^lob_01 arrives 200 mm further, 100 mm to the left, 300 mm higher /);
  });

  it("tell a rise in metres too", async () => {
    const [first] = await rows(hosted, changed("after: 1 }", "after: 1.1 }", hosted));
    // as above
    expect(first.text).toMatch("rises 257 mm higher");
  });

  it("are not taken for motion when the host changes", async () => {
    const metres = changed("unit: 0.01", "unit: 1", hosted)
      .replace("[0, 0, 100]", "[0, 0, 1]")
      .replace("[300, 0, 100]", "[3, 0, 1]");
    for (const { text } of await rows(hosted, metres))
      expect(text).toMatch("is recorded in another unit (another host)");
    for (const { text } of await rows(hosted, LOB))
      expect(text).toMatch("is recorded in other axes (another host)");
  });
});

describe("a long list", () => {
  it("is told throw by throw with the take that moved most, in twenty lines", async () => {
    const many = Array.from({ length: 30 }, (_, i) => `  toss-${i}: { like: lob, takes: 4 }\n`).join("");
    const found = await drift(LOB + many, changed("[0, 1, 3]", "[0, 1, 3.1]", LOB + many));
    expect(found).toHaveLength(1 + 3 + 30 * 4);
    const lines = driftLines(found);
    expect(lines).toHaveLength(21);
    expect(lines[1]).toMatch(/^lob: 3 takes drifted, most of all lob_0\d arrives 100 mm further/);
    // the throw file's row and 31 throws, 20 of them told
    expect(lines[20]).toBe("and 12 more (--json lists all)");
  });

  it("tells of a throw the take that moved most, whichever that is", () => {
    const takes = Array.from({ length: 21 }, (_, i): Drift => {
      const displacement = i === 7 ? 0.5 : 0.1;
      return {
        kind: "take",
        what: "changed",
        name: `lob_${i}`,
        text: `lob_${i} …`,
        throw: "lob",
        displacement,
      };
    });
    expect(driftLines(takes)).toEqual(["lob: 21 takes drifted, most of all lob_7 …"]);
  });

  it("is told take by take while it is short", async () => {
    const found = await drift(LOB, changed("[0, 1, 3]", "[0, 1, 3.1]"));
    expect(driftLines(found)).toEqual(found.map(({ text }) => text));
  });
});
