import { existsSync, readFileSync, writeFileSync } from "node:fs";
import { parse } from "csv-parse/sync";
import { describe, expect, it } from "vitest";
import { run, THROWS, Workplace } from "./folder.js";

// Options, exit codes and file names: the project's own choice.

const CHAIN = `${THROWS}  home: { like: lob, arrive: { at: [0, 1, 0] } }
chains: { round: { throws: [lob, home] } }
`;

const rowsOf = (place: Workplace, name: string): string[][] =>
  parse(readFileSync(place.path("out", name), "utf8"));

describe("tossbake csv", () => {
  it("writes a table for each take of each throw and chain, the same bytes twice", async () => {
    const place = new Workplace(CHAIN);
    const first = await run("csv", place.throwFile, "-o", place.out);
    expect(first).toEqual({
      code: 0,
      out: `11 tables written to ${place.out}, 30 rows a second\n`,
      err: "",
    });
    const before = place.contents();
    expect(Object.keys(before).sort()).toEqual(
      [
        ...["home_01", "home_02", "home_03", "lob_01", "lob_02", "lob_03"],
        ...["round_01", "round_02", "round_03", "toss_01", "toss_02"],
      ].map((name) => `${name}.csv`),
    );
    await run("csv", place.throwFile, "-o", place.out);
    expect(place.contents()).toEqual(before);
    // 1 s of lob, 1 s back, a row each 1/30 s with both ends, and the header
    expect(rowsOf(place, "lob_01.csv")).toHaveLength(32);
    expect(rowsOf(place, "round_01.csv")).toHaveLength(62);
  });

  it("says in its header what each column is, and writes every row of as many fields", async () => {
    const place = new Workplace();
    await run("csv", place.throwFile, "-o", place.out, "--only", "lob", "--takes", "2-2", "--rate", "4");
    expect(Object.keys(place.contents())).toEqual(["lob_02.csv"]);
    const text = readFileSync(place.path("out", "lob_02.csv"), "utf8");
    expect(text).not.toContain("\r");
    expect(text.endsWith("\n")).toBe(true);
    // the reader refuses rows of other lengths
    const [head, ...rows] = rowsOf(place, "lob_02.csv");
    expect(head.join(" ")).toBe(
      "time_s centerOfMass_x_m centerOfMass_y_m centerOfMass_z_m rotation_x rotation_y rotation_z rotation_w " +
        "velocity_x_m_per_s velocity_y_m_per_s velocity_z_m_per_s " +
        "angularVelocity_x_rad_per_s angularVelocity_y_rad_per_s angularVelocity_z_rad_per_s",
    );
    expect(rows.map(([time]) => time)).toEqual(["0", "0.25", "0.5", "0.75", "1"]);
  });

  it("goes by the throw file's frameRate", async () => {
    const place = new Workplace(THROWS.replace("seed: 1", "seed: 1\nframeRate: 24"));
    const { out } = await run("csv", place.throwFile, "-o", place.out, "--only", "lob");
    expect(out).toContain("24 rows a second");
    expect(rowsOf(place, "lob_01.csv")[2][0]).toBe("0.0416666666667");
  });

  it("writes tables of some takes whatever files their clips would go into", async () => {
    const place = new Workplace(THROWS.replace("seed: 1", "seed: 1\nbake: { files: together }"));
    // bake refuses that: one file holds all throws
    expect((await run("bake", place.throwFile, "-o", place.out, "--only", "toss")).code).toBe(2);
    expect(await run("csv", place.throwFile, "-o", place.out, "--only", "toss")).toMatchObject({
      code: 0,
      err: "",
    });
    expect(Object.keys(place.contents())).toEqual(["toss_01.csv", "toss_02.csv"]);
  });

  it("says which takes are left out, and writes the others", async () => {
    const place = new Workplace(
      THROWS.replace("    spin:", "    limits: { speed: 0.1 }\n    spin:").replace(
        "prop: pin, takes: 2",
        "prop: pin, takes: 2, limits: null",
      ),
    );
    const { code, err } = await run("csv", place.throwFile, "-o", place.out);
    expect(code).toBe(1);
    expect(err.trimEnd().split("\n")).toHaveLength(3);
    expect(err).toMatch(/^lob_01 is left out: /);
    expect(Object.keys(place.contents())).toEqual(["toss_01.csv", "toss_02.csv"]);
  });

  it("answers a wrong request with one message and writes nothing", async () => {
    const place = new Workplace();
    for (const [args, message] of [
      [["--rate", "0"], /It is a number above 0, in rows a second/],
      [["--rate", "1e12"], /^--rate:? is 1000000000000 a second, and lob_01 lasts 1 s/],
      [["--only", "lib"], /^--only:? there is no throw "lib"/],
      [["--takes", "7-9"], /^--takes:? no throw has a take from 7 to 9/],
    ] as const) {
      const { code, err } = await run("csv", place.throwFile, "-o", place.out, ...args);
      expect(code).toBe(2);
      expect(err).toMatch(message);
      expect(existsSync(place.out)).toBe(false);
    }
  });

  it("never writes over what it is made of", async () => {
    const place = new Workplace();
    const own = place.path("lob_01.csv");
    writeFileSync(own, THROWS);
    const { code, err } = await run("csv", own, "-o", place.root);
    expect(code).toBe(2);
    expect(err).toMatch("would be written over");
    expect(readFileSync(own, "utf8")).toBe(THROWS);
  });
});
