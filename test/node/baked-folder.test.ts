import { mkdirSync, writeFileSync } from "node:fs";
import { expect, it } from "vitest";
import { contentsOf } from "../../src/node/baked-folder.js";
import { Workplace } from "../cli/folder.js";

it("reads a folder's own files and nothing outside it, whatever a record names", async () => {
  const place = new Workplace();
  mkdirSync(place.out);
  writeFileSync(place.path("out", "lob.glb"), "lob");
  const contents = contentsOf(place.out);
  expect(String(await contents("lob.glb"))).toBe("lob");
  expect(await contents("none.glb")).toBeUndefined();
  for (const name of ["../spanner.glb", place.path("spanner.glb"), "./lob.glb", "x/../lob.glb"])
    expect(await contents(name)).toBeUndefined();
});
