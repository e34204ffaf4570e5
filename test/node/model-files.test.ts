import { cpSync, mkdirSync, mkdtempSync, realpathSync, rmSync, symlinkSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, describe, expect, it } from "vitest";
import { ModelError } from "../../src/gltf/model.js";
import { readModelFile } from "../../src/node/model-files.js";

const root = realpathSync(mkdtempSync(join(tmpdir(), "tossbake-models-")));
afterAll(() => rmSync(root, { recursive: true }));

const folder = join(root, "props");
mkdirSync(join(folder, "parts"), { recursive: true });
const bytes = new Uint8Array(48);
writeFileSync(join(root, "outside.bin"), bytes);
writeFileSync(join(folder, "own one.bin"), bytes);
writeFileSync(join(folder, "parts", "deep.bin"), bytes);
symlinkSync(join(root, "outside.bin"), join(folder, "link.bin"));
mkdirSync(join(root, "props-too"));
writeFileSync(join(root, "props-too", "near.bin"), bytes);
symlinkSync(join(root, "props-too", "near.bin"), join(folder, "near.bin"));
symlinkSync(root, join(folder, "up"));
symlinkSync(join(folder, "own one.bin"), join(folder, "inner.bin"));
symlinkSync(join(folder, "nowhere.bin"), join(folder, "dangling.bin"));
mkdirSync(join(folder, "folder.bin"));

function gltf(uri: string): string {
  const path = join(folder, "m.gltf");
  writeFileSync(path, JSON.stringify({ asset: { version: "2.0" }, buffers: [{ byteLength: 48, uri }] }));
  return path;
}

describe("a model on disk", () => {
  it("reads files in its folder and below, percent-encoded and through links that stay there", async () => {
    for (const [uri, file] of [
      ["own%20one.bin", "own one.bin"],
      ["parts/deep.bin", "parts/deep.bin"],
      ["inner.bin", "own one.bin"],
    ]) {
      const { model, paths, sha256 } = await readModelFile(gltf(uri), "m.gltf");
      expect(model.buffers[0]).toHaveLength(48);
      expect(paths).toEqual([join(folder, "m.gltf"), join(folder, file)]);
      expect(sha256).toMatch(/^[0-9a-f]{64}$/);
    }
  });

  it.each([
    ["a link out of the folder", "link.bin", 'names the file "link.bin" outside its own folder'],
    [
      "a link into a folder whose name begins like its own",
      "near.bin",
      'names the file "near.bin" outside its own folder',
    ],
    [
      "a file through a linked folder",
      "up/outside.bin",
      'names the file "up/outside.bin" outside its own folder',
    ],
    ["the folder itself", ".", 'names the file "." outside its own folder'],
    ["a link to nothing", "dangling.bin", "dangling.bin: does not exist"],
    ["a folder", "folder.bin", "folder.bin: is not a file"],
    ["a file that is not there", "none.bin", "none.bin: does not exist"],
  ])("that names %s is refused", async (_, uri, message) => {
    const reading = readModelFile(gltf(uri), "m.gltf");
    await expect(reading).rejects.toThrow(ModelError);
    await expect(reading).rejects.toThrow(`m.gltf: ${message}`);
  });

  it("that is not there, or a folder, is refused by the name it was given", async () => {
    await expect(readModelFile(join(root, "none.glb"), "none.glb")).rejects.toThrow(
      "none.glb: does not exist",
    );
    await expect(readModelFile(folder, "props")).rejects.toThrow("props: is not a file");
  });

  it("has a hash that covers every file it names, and nothing of where it lies", async () => {
    const path = gltf("parts/deep.bin");
    const { sha256 } = await readModelFile(path, "m.gltf");
    cpSync(folder, join(root, "moved"), { recursive: true, verbatimSymlinks: true });
    const moved = join(root, "moved", "m.gltf");
    expect((await readModelFile(moved, "another name")).sha256).toBe(sha256);
    writeFileSync(join(root, "moved", "parts", "deep.bin"), new Uint8Array(48).fill(1));
    expect((await readModelFile(moved, "m.gltf")).sha256).not.toBe(sha256);
  });
});
