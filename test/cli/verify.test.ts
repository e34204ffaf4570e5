import { cpSync, mkdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { assets, run, THROWS, Workplace } from "./folder.js";

// Exit codes: 0 no drift, 1 drift, 2 a wrong request: the project's own choice. What drifts is what each test changes.

/** The engine's x, y, z are glTF's z, x, y; centimetres. */
const HOSTED = THROWS.replace("seed: 1", "seed: 1\nhost: { axes: [z, x, y], unit: 0.01 }")
  .replace("[0, 1, 0]", "[0, 0, 100]")
  .replace("[0, 1, 3]", "[300, 0, 100]");

/** Bakes, then lets something happen, then verifies; the rows without the one about the throw file. */
async function verifiedAfter(happening: (place: Workplace) => unknown) {
  const place = new Workplace();
  expect((await run("bake", place.throwFile, "-o", place.out)).code).toBe(0);
  await happening(place);
  const before = place.contents();
  const { code, out } = await run("verify", place.throwFile, "-o", place.out, "--json");
  expect(place.contents()).toEqual(before);
  const { drift, rows } = JSON.parse(out) as { drift: boolean; rows: { kind: string; text: string }[] };
  expect(code).toBe(drift ? 1 : 0);
  expect(drift).toBe(rows.length > 0);
  return rows.filter(({ kind }) => kind !== "throwFile").map(({ text }) => text);
}

describe("verify finds no drift", () => {
  it("right after a bake", async () => {
    expect(await verifiedAfter(() => {})).toEqual([]);
  });

  it("in a record of another version of tossbake, or with other line ends", async () => {
    expect(
      await verifiedAfter((p) => p.edit("out/takes.json", /"tossbake": ".*"/, '"tossbake": "99.0.0"')),
    ).toEqual([]);
    expect(await verifiedAfter((p) => p.edit("out/takes.json", /\n/g, "\r\n"))).toEqual([]);
  });

  it("in which takes were made in the same run", async () => {
    expect(
      await verifiedAfter((p) =>
        p.edit("out/takes.json", /"nearest": \{ "take": 1, .* \}/, '"nearest": null'),
      ),
    ).toEqual([]);
  });

  it("in files that are none of a bake's", async () => {
    expect(
      await verifiedAfter((p) => {
        writeFileSync(p.path("out/notes.txt"), "ask for a longer lob");
        mkdirSync(p.path("out/old.glb"));
      }),
    ).toEqual([]);
  });

  it("in a folder whose throws were baked one by one", async () => {
    expect(
      await verifiedAfter(async (p) => {
        rmSync(p.out, { recursive: true });
        await run("bake", p.throwFile, "-o", p.out, "--only", "toss");
        await run("bake", p.throwFile, "-o", p.out, "--only", "lob");
      }),
    ).toEqual([]);
  });

  it("in models that lie in the folder themselves", async () => {
    const place = new Workplace();
    await run("bake", place.throwFile, "-o", place.root);
    expect(await run("verify", place.throwFile, "-o", place.root)).toMatchObject({ code: 0 });
  });
});

describe("verify says what drifted", () => {
  it("where the mark was moved and the turns changed", async () => {
    const rows = await verifiedAfter((p) => {
      p.edit("lob.throws.yaml", "[0, 1, 3]", "[0, 1, 3.014]");
      p.edit("lob.throws.yaml", "turns: 1.5", "turns: 1.7");
    });
    expect(rows).toHaveLength(5);
    for (const text of rows)
      expect(text).toMatch(/^(lob|toss)_0\d arrives 14 mm further.*, turns 0.2 more, leaves /);
  });

  it("in metres where the throw file's numbers are a host's", async () => {
    const place = new Workplace(HOSTED);
    await run("bake", place.throwFile, "-o", place.out);
    place.edit("lob.throws.yaml", "[300, 0, 100]", "[320, 0, 100]");
    const { out } = await run("verify", place.throwFile, "-o", place.out);
    expect(out).toMatch("lob_01 arrives 200 mm further");
  });

  it("where a material became denser", async () => {
    const rows = await verifiedAfter((p) => p.edit("lob.throws.yaml", "default: 1100", "default: 1500"));
    // the rubber sleeve is at the grip's end: heavier, the spanner balances nearer to it
    expect(rows[0]).toMatch(/^spanner weighs .* g more \(.* %\), .*balances .* mm off/);
    expect(rows.filter((text) => text.startsWith("lob_"))).toHaveLength(3);
    expect(rows.filter((text) => text.startsWith("toss_"))).toHaveLength(0);
  });

  it("where the model changed", async () => {
    const rows = await verifiedAfter((p) => cpSync(assets("props/marlinspike.glb"), p.path("spanner.glb")));
    expect(rows[0]).toMatch(/^spanner spanner.glb changed, weighs /);
    for (const n of [1, 2, 3]) expect(rows[n]).toMatch(new RegExp(`^lob_0${n} .*; spanner.glb changed$`));
  });

  it("where the tolerance changed", async () => {
    const rows = await verifiedAfter((p) =>
      p.edit("lob.throws.yaml", "props:", "bake: { tolerance: 0.0001 }\nprops:"),
    );
    expect(rows).toHaveLength(5);
    for (const text of rows)
      expect(text).toMatch(/is cut to 0.1 mm instead of .* mm, is cut into \d+ keys more$/);
  });

  it("where takes and throws came and went", async () => {
    expect(await verifiedAfter((p) => p.edit("lob.throws.yaml", "takes: 3", "takes: 4"))).toEqual([
      "lob: take 4 is new",
    ]);
    expect(await verifiedAfter((p) => p.edit("lob.throws.yaml", / {2}toss.*\n/, ""))).toEqual([
      "pin is no longer thrown",
      "throw toss (2 takes) is gone",
      "toss.glb is left over from a throw that is gone",
      "toss.svg is left over from a throw that is gone",
    ]);
    expect(await verifiedAfter((p) => p.edit("lob.throws.yaml", /$/, "  third: { like: lob }\n"))).toEqual([
      "throw third (3 takes) is new",
    ]);
  });

  it("where a throw that is gone left its file, and the record forgot it", async () => {
    const rows = await verifiedAfter(async (p) => {
      p.edit("lob.throws.yaml", / {2}toss.*\n/, "");
      await run("bake", p.throwFile, "-o", p.out);
    });
    expect(rows).toEqual(["toss.glb is a stray: no throw that is known writes it"]);
  });

  it("where a file is missing, or is a stray", async () => {
    expect(await verifiedAfter((p) => rmSync(p.path("out/lob.glb")))).toEqual(["lob.glb is missing"]);
    expect(await verifiedAfter((p) => cpSync(p.path("out/lob.glb"), p.path("out/lob (copy).glb")))).toEqual([
      "lob (copy).glb is a stray: no throw that is known writes it",
    ]);
  });

  it("where a clip's file was changed by other hands", async () => {
    const rows = await verifiedAfter((p) => {
      const bytes = readFileSync(p.path("out/lob.glb"));
      // the last byte of the keys
      bytes[bytes.length - 1] ^= 1;
      writeFileSync(p.path("out/lob.glb"), bytes);
    });
    expect(rows).toEqual(["lob.glb was changed after it was baked: the record is the same, the file is not"]);
  });

  it("where the record was edited by hand", async () => {
    expect(await verifiedAfter((p) => p.edit("out/takes.json", '"turns": 1.5', '"turns": 1.75'))).toEqual([
      "takes.json was edited by hand: lob_01 has turns 1.75 instead of 1.5, but lob.glb is the same",
    ]);
    expect(await verifiedAfter((p) => p.edit("out/takes.json", '"format": 1,', '"format": 1, '))).toEqual([
      "takes.json was edited by hand: no value differs, but line 2 is not as a bake writes it",
    ]);
    expect(
      await verifiedAfter((p) => {
        const record = JSON.parse(readFileSync(p.path("out/takes.json"), "utf8"));
        record.clips.splice(1, 1);
        writeFileSync(p.path("out/takes.json"), JSON.stringify(record));
      }),
    ).toEqual(["takes.json was edited by hand: lob: take 2 is not in it, but lob.glb is the same"]);
  });

  it("alone by its hash where the throw file changed without a motion", async () => {
    const place = new Workplace();
    await run("bake", place.throwFile, "-o", place.out);
    place.edit("lob.throws.yaml", /$/, "# at dusk\n");
    const { code, out } = await run("verify", place.throwFile, "-o", place.out);
    expect(code).toBe(1);
    expect(out).toMatch(/^lob.throws.yaml changed, but no motion: /);
  });
});

describe("verify --against", () => {
  async function twoFolders(happening: (place: Workplace) => void) {
    const place = new Workplace();
    await run("bake", place.throwFile, "-o", place.path("before"));
    happening(place);
    await run("bake", place.throwFile, "-o", place.out);
    return place;
  }

  it("finds two bakes of one throw file alike", async () => {
    const place = await twoFolders(() => {});
    const { code, out } = await run("verify", "-o", place.out, "--against", place.path("before"));
    expect(out).toMatch("no drift in 5 takes");
    expect(code).toBe(0);
  });

  it("finds an edit by hand in either folder", async () => {
    const place = await twoFolders(() => {});
    const folders = [place.out, place.path("before")];
    place.edit("out/takes.json", '"format": 1,', '"format":1,');
    for (const [folder, other] of [folders, [...folders].reverse()]) {
      const { code, out } = await run("verify", "-o", folder, "--against", other);
      expect(code).toBe(1);
      expect(out).toMatch("takes.json was edited by hand: no value differs, but line 2");
    }
  });

  it("tells what changed from the other folder to this one", async () => {
    const place = await twoFolders((p) => p.edit("lob.throws.yaml", "[0, 1, 3]", "[0, 1, 3.2]"));
    const forth = await run("verify", "-o", place.out, "--against", place.path("before"));
    const back = await run("verify", "-o", place.path("before"), "--against", place.out);
    expect([forth.code, back.code]).toEqual([1, 1]);
    expect(forth.out).toMatch("lob_01 arrives 200 mm further");
    expect(back.out).toMatch("lob_01 arrives 200 mm shorter");
  });

  it("names what is missing and stray in either", async () => {
    const place = await twoFolders((p) => {
      rmSync(p.path("before/lob.glb"));
      writeFileSync(p.path("before/x.glb"), "");
    });
    const { out } = await run("verify", "-o", place.out, "--against", place.path("before"));
    expect(out).toMatch(`${place.path("before/lob.glb")} is missing`);
    expect(out).toMatch(`${place.path("before/x.glb")} is a stray`);
  });

  it("asks for the throw file where the numbers are a host's, and then tells metres", async () => {
    const place = new Workplace(HOSTED);
    await run("bake", place.throwFile, "-o", place.path("before"));
    place.edit("lob.throws.yaml", "[300, 0, 100]", "[320, 0, 100]");
    await run("bake", place.throwFile, "-o", place.out);
    const folders = ["-o", place.out, "--against", place.path("before")];
    const alone = await run("verify", ...folders);
    expect(alone.code).toBe(2);
    expect(alone.err).toMatch(/does not fall along -Y.*name the throw file too/);
    const named = await run("verify", place.throwFile, ...folders);
    expect(named.code).toBe(1);
    expect(named.out).toMatch("lob_01 arrives 200 mm further");
  });
});

describe("verify refuses", () => {
  it("a folder without a record, or with none that can be read", async () => {
    const place = new Workplace();
    expect(await run("verify", place.throwFile, "-o", place.out)).toMatchObject({
      code: 2,
      err: expect.stringMatching("has no takes.json"),
    });
    mkdirSync(place.path("out/takes.json"), { recursive: true });
    expect((await run("verify", place.throwFile, "-o", place.out)).err).toMatch(
      /takes\.json: cannot be read/,
    );
    rmSync(place.path("out/takes.json"), { recursive: true });
    for (const text of ["", "{}", "[]", "null", '{"format": 2}']) {
      writeFileSync(place.path("out/takes.json"), text);
      expect(await run("verify", place.throwFile, "-o", place.out)).toMatchObject({ code: 2, out: "" });
    }
  });

  it("a wrong command line or throw file", async () => {
    const place = new Workplace();
    await run("bake", place.throwFile, "-o", place.out);
    for (const args of [
      ["verify"],
      ["verify", "-o", place.out],
      ["verify", place.throwFile],
      ["verify", place.path("none.yaml"), "-o", place.out],
      ["verify", "-o", place.out, "--against", place.path("none")],
      ["verify", place.throwFile, "-o", place.out, "--sideways"],
    ])
      expect(await run(...args)).toMatchObject({ code: 2, out: "", err: expect.stringMatching(/\S/) });
  });

  it("to be led out of the folder by a record that was tampered with", async () => {
    const place = new Workplace();
    for (const folder of ["out", "before"]) {
      await run("bake", place.throwFile, "-o", place.path(folder));
      place.edit(`${folder}/takes.json`, /"file": "lob\.glb"/g, '"file": "../spanner.glb"');
    }
    const { code, out } = await run("verify", "-o", place.out, "--against", place.path("before"));
    expect(code).toBe(1);
    expect(out).toMatch("spanner.glb is missing");
  });
});
