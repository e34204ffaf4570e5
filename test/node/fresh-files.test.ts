import { existsSync, mkdtempSync, readdirSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { expect, it, onTestFinished } from "vitest";
import { writeFreshFiles } from "../../src/node/fresh-files.js";
import { MachineError } from "../../src/node/machine-error.js";

function scratch(): string {
  const folder = mkdtempSync(join(tmpdir(), "fresh-"));
  onTestFinished(() => rmSync(folder, { recursive: true, force: true }));
  return folder;
}

// no file system takes a name of 300 characters (POSIX's NAME_MAX is 255 on all that are usual)
const FILES = [
  { name: "one.txt", content: "1" },
  { name: "n".repeat(300), content: "2" },
];

it("what was written before a file that cannot be is taken back, with the folders made for it", async () => {
  const folder = scratch();
  await expect(writeFreshFiles(join(folder, "a", "b"), FILES)).rejects.toThrow(MachineError);
  expect(existsSync(join(folder, "a"))).toBe(false);
});

it("a folder that was there stays, and what was in it", async () => {
  const folder = scratch();
  writeFileSync(join(folder, "mine.txt"), "mine");
  await expect(writeFreshFiles(folder, FILES)).rejects.toThrow(/cannot be written.*name another folder/);
  expect(readdirSync(folder)).toEqual(["mine.txt"]);
});
