import { spawnSync } from "node:child_process";
import {
  existsSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  rmSync,
  symlinkSync,
  writeFileSync,
} from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { RequestError } from "../../src/math/request-error.js";
import { MachineError } from "../../src/node/machine-error.js";
import { writeFiles } from "../../src/node/output-folder.js";
import { spareInputs } from "../../src/node/spare-inputs.js";

let root: string;
beforeEach(() => {
  root = mkdtempSync(join(tmpdir(), "tossbake-output-"));
});
afterEach(() => rmSync(root, { recursive: true, force: true }));

const FILES = [
  { name: "lob.glb", content: new Uint8Array([1, 2, 3]) },
  { name: "takes.json", content: "{}\n" },
];
const read = (...names: string[]) => readFileSync(join(root, ...names), "utf8");
const faultOf = (work: Promise<void>) =>
  work.then(
    () => expect.unreachable("was written"),
    (error: Error) => error,
  );

describe("writing files into a folder", () => {
  it("takes away what a killed bake left, and nothing of one that still runs", async () => {
    const gone = spawnSync(process.execPath, ["--version"]).pid;
    const dead = `.lob.glb.${gone}.part`;
    const alive = `.lob.glb.${process.ppid}.part`;
    for (const name of [dead, alive, ".lob.glb.part", "1.part"]) writeFileSync(join(root, name), "half");
    await writeFiles(root, FILES);
    expect(readdirSync(root).sort()).toEqual(
      [".lob.glb.part", alive, "1.part", "lob.glb", "takes.json"].sort(),
    );
  });

  it("makes the folder and all above it, and leaves nothing but the files", async () => {
    const folder = join(root, "a", "b", "c");
    await writeFiles(folder, FILES);
    expect(readdirSync(folder).sort()).toEqual(["lob.glb", "takes.json"]);
    expect(readFileSync(join(folder, "lob.glb"))).toEqual(Buffer.from([1, 2, 3]));
    expect(read("a", "b", "c", "takes.json")).toBe("{}\n");
  });

  it("replaces what is there and leaves the rest", async () => {
    writeFileSync(join(root, "takes.json"), "old and longer");
    writeFileSync(join(root, "mine.txt"), "mine");
    await writeFiles(root, FILES);
    expect(read("takes.json")).toBe("{}\n");
    expect(read("mine.txt")).toBe("mine");
  });

  it("leaves everything as it was where a folder stands in a file's place, whichever file it is", async () => {
    mkdirSync(join(root, "takes.json"));
    writeFileSync(join(root, "lob.glb"), "old");
    const error = await faultOf(writeFiles(root, FILES));
    expect(error).toBeInstanceOf(MachineError);
    expect(error.message).toMatch(`${root}: cannot be written (a folder stands where a file should be); `);
    expect(read("lob.glb")).toBe("old");
    expect(readdirSync(root).sort()).toEqual(["lob.glb", "takes.json"]);
  });

  it("blames the machine where a file stands in the folder's place, or no folder can be made", async () => {
    writeFileSync(join(root, "file"), "");
    for (const folder of [join(root, "file"), join(root, "file", "deeper")]) {
      const error = await faultOf(writeFiles(folder, FILES));
      expect(error).toBeInstanceOf(MachineError);
      expect(error.message).toMatch("a file stands where a folder should be");
    }
    expect(read("file")).toBe("");
  });

  // the kernel's own folder takes no new ones, from anybody
  it.runIf(existsSync("/proc/self"))(
    "comes to an end in a folder that says the new one is not there",
    async () => {
      expect(await faultOf(writeFiles("/proc/out", FILES))).toBeInstanceOf(MachineError);
    },
  );
});

describe("what a bake is made of", () => {
  it("is not written over, by whatever path it is reached", async () => {
    const model = join(root, "lob.glb");
    writeFileSync(model, "model");
    mkdirSync(join(root, "out"));
    symlinkSync(root, join(root, "linked"));
    for (const folder of [root, join(root, "out", ".."), join(root, "linked")]) {
      const error = await faultOf(spareInputs(folder, ["takes.json", "lob.glb"], [model]));
      expect(error).toBeInstanceOf(RequestError);
      expect(error.message).toMatch(/lob\.glb: would be written over, .*; choose another folder/);
    }
    await spareInputs(join(root, "out"), ["takes.json", "lob.glb"], [model]);
    await spareInputs(root, ["takes.json", "toss.glb"], [model]);
    await spareInputs(join(root, "not there yet"), ["lob.glb"], [model]);
  });
});
