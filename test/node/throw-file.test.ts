import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, describe, expect, it } from "vitest";
import { openedText } from "../../src/node/throw-file.js";

const root = mkdtempSync(join(tmpdir(), "tossbake-throw-file-"));
afterAll(() => rmSync(root, { recursive: true }));
writeFileSync(join(root, "pin.gltf"), '{ "asset": { "version": "2.0" } }');

/** Whatever it throws. */
const TEXT = `seed: 1
props: { pin: { shape: { sphere: 0.1 }, density: 700 } }
throws: { lob: { prop: pin, arrive: { at: [0, 1, 3], after: 1 } } }
`;

describe("a model that a throw file names", () => {
  it.each([
    ["beside it", "pin.gltf"],
    ["relative to its folder, wherever that is", "../props/../pin.gltf"],
    ["absolute, which stands for itself", join(root, "pin.gltf")],
  ])("is looked for %s", async (title, model) => {
    const folder = title.startsWith("relative") ? join(root, "throws") : root;
    const { models, inputs } = openedText(join(folder, "lob.throws.yaml"), TEXT);
    await models(model);
    expect([...inputs]).toEqual([join(folder, "lob.throws.yaml"), join(root, "pin.gltf")]);
  });
});
