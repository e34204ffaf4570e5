import { describe, expect, it, onTestFinished, vi } from "vitest";
import type * as Arrival from "../../src/aim/arrival.js";
import { run, THROWS, Workplace } from "./folder.js";

/** No pose is really missed by so much: what the solver says is spoilt. */
const spoilt = vi.hoisted(() => ({ by: undefined as number | undefined }));
vi.mock("../../src/aim/arrival.js", async (original) => {
  const real = await original<typeof Arrival>();
  const solveArrival: typeof real.solveArrival = (wish, body) => {
    const aimed = real.solveArrival(wish, body);
    return spoilt.by === undefined ? aimed : { ...aimed, missAngle: spoilt.by };
  };
  return { ...real, solveArrival };
});

// Words and columns: the project's own choice.

const WAYS = `${THROWS}
  caught:
    like: lob
    arrive: { facing: [[z, back], [short, up]] }
    spin: { axis: middle }
  pointed: { like: lob, takes: 2, arrive: { facing: [[z, flight]] } }
  same: { like: lob, arrive: { facing: release }, spin: { axis: short, turns: 2 } }
  few: { like: lob, arrive: { facing: any }, spin: { axis: null, turns: 0.01..0.02 } }
  odd: { like: same, spin: { axis: middle, turns: 0.4 } }
`;

describe("tossbake ways", () => {
  it("lists each way of a take with its numbers, its spin, and a star at the one taken", async () => {
    const place = new Workplace(WAYS);
    const { code, out, err } = await run("ways", place.throwFile, "--only", "caught", "--takes", "2-2");
    expect({ code, err }).toEqual({ code: 0, err: "" });
    const [title, head, , ...rows] = out.trimEnd().split("\n");
    expect(title).toMatch(/^caught, take 2, 1\.000 s: the \d+ ways of 0 to 4 turns$/);
    expect(title).toContain(`the ${rows.length} ways`);
    expect(head.trim().split(/ {2,}/)).toEqual([
      "turns",
      "long",
      "middle",
      "short",
      "speed m/s",
      "spin /s",
      "miss °",
      "spin to write",
    ]);
    const line =
      /^ *\d+( \*)? +\d\.\d{3}( +[01]\.\d\d){3} +\d+\.\d\d +\d+\.\d\d +\d(\.\d+)?e[-+]\d+ +(–|\{ (axis: (-?(long|middle|short)|\[.*\]), )?turns: [\d.]+ \})$/;
    for (const row of rows) expect(row).toMatch(line);
    expect(rows.filter((row) => row.includes(" * "))).toEqual([
      expect.stringMatching(/\{ axis: middle, turns: 1\.5 \}$/),
    ]);
    const turns = rows.map((row) => Number(row.match(/\d\.\d{3}/)?.[0]));
    expect(turns).toEqual([...turns].sort((a, b) => a - b));
  });

  it("lists all takes where none are named, one block each", async () => {
    const place = new Workplace(WAYS);
    const { out } = await run("ways", place.throwFile, "--only", "pointed");
    const titles = out.split("\n").filter((line) => line.startsWith("pointed, take"));
    expect(titles.map((line) => line.match(/take (\d)/)?.[1])).toEqual(["1", "2"]);
    for (const title of titles) expect(title).toMatch(/one direction leaves the roll free$/);
  });

  it("does not say that it lists all where the ways may come in continua", async () => {
    const place = new Workplace(WAYS);
    const { out } = await run("ways", place.throwFile, "--only", "same", "--takes", "1-1");
    expect(out).toMatch(
      /^same, take 1, .* s: \d+ of the ways of 0 to 4 turns: .*case of its own \(same pose\)/,
    );
  });

  it("warns of what the aim warns of", async () => {
    const place = new Workplace(WAYS);
    const { out } = await run("ways", place.throwFile, "--only", "few", "--takes", "1-1");
    expect(out).toMatch(/^this needs 0\.\d{3} turns at least/m);
  });

  it("prints the same as JSON", async () => {
    const place = new Workplace(WAYS);
    const { out } = await run("ways", place.throwFile, "--only", "caught", "--takes", "1-2", "--json");
    const { throw: name, takes } = JSON.parse(out);
    expect(name).toBe("caught");
    expect(takes.map(({ take }: { take: number }) => take)).toEqual([1, 2]);
    for (const { ways } of takes) {
      expect(ways.length).toBeGreaterThan(10);
      for (const way of ways)
        expect(Object.keys(way)).toEqual([
          "turns",
          "share",
          "speed",
          "rate",
          "angularVelocity",
          "miss",
          "taken",
          "spin",
        ]);
    }
  });

  it.each([
    ["a throw without a pose to get to", ["--only", "lob"], /throws\.lob\.arrive: .*add arrive\.facing/],
    ["a throw that is not there", ["--only", "cought"], /no throw "cought"; one of lob/],
    ["no throw", [], /required option '--only <name>'/],
    ["a take that is not there", ["--only", "caught", "--takes", "8-9"], /no throw has a take from 8 to 9/],
    ["takes that are none", ["--only", "caught", "--takes", "2"], /such as 3-7/],
  ])("refuses %s", async (_, args, message) => {
    const place = new Workplace(WAYS);
    const { code, out, err } = await run("ways", place.throwFile, ...args);
    expect({ code, out }).toEqual({ code: 2, out: "" });
    expect(err).toMatch(message);
  });

  it("answers 1 where the limits cannot be held, and lists all the same", async () => {
    const place = new Workplace(
      `${WAYS}  fast: { like: caught, release: { scatter: null }, limits: { speed: 1 } }\n`,
    );
    const { code, out } = await run("ways", place.throwFile, "--only", "fast", "--takes", "1-1");
    expect(code).toBe(1);
    expect(out).toMatch(/limits: its one candidate does not hold the limits \(broken: limits\.speed in 1\)/);
    expect(out).toMatch(/ \* /);
  });
});

describe("tossbake bake tells of the aim", () => {
  it("on one line for each throw and kind of warning, with the takes", async () => {
    const place = new Workplace(WAYS);
    const args = ["bake", place.throwFile, "-o", place.out, "--only", "odd", "few"];
    const { code, out } = await run(...args);
    expect(code).toBe(0);
    const lines = out.split("\n").filter((line) => /^(odd|few), take/.test(line));
    expect(lines).toEqual([
      expect.stringMatching(
        /^few, takes 1–3: this needs 0\.\d{3} turns at least, more than the 0\.01\d* asked for \(take 1; other numbers for the others\)$/,
      ),
      // of the third take's ways one is as near the wish as can be
      expect.stringMatching(/^odd, takes 1–2: the end pose is a case of its own \(same pose\)/),
    ]);
    const json = await run(...args, "--dry-run", "--json");
    expect(() => JSON.parse(json.out)).not.toThrow();
    expect(json.err.split("\n")).toEqual(expect.arrayContaining(lines));
  });

  it("and names a take that misses its pose by more than 0.01 degrees, writes it and answers 1", async () => {
    spoilt.by = (0.0123 * Math.PI) / 180;
    onTestFinished(() => {
      spoilt.by = undefined;
    });
    const place = new Workplace(WAYS);
    const { code, out } = await run("bake", place.throwFile, "-o", place.out, "--only", "caught");
    expect(code).toBe(1);
    expect(out).toMatch(/^caught_01 misses its pose by 0\.0123°$/m);
    expect(Object.keys(place.contents())).toContain("caught.glb");
  });

  it("but not that a pose is a case of its own where the wish came true all the same", async () => {
    const place = new Workplace(WAYS);
    const { out } = await run("bake", place.throwFile, "--dry-run", "--only", "same");
    expect(out).not.toContain("case of its own");
  });
});
