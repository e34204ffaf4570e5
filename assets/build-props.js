/**
 * Builds the props of Lantern Quay: `node assets/build-props.js [FOLDER]` (default: assets/props).
 * The same source always gives the same bytes.
 */
import { mkdir, writeFile } from "node:fs/promises";
import path from "node:path";
import { fileURLToPath } from "node:url";
import { writeGlb } from "./lib/document.js";
import { crate } from "./recipes/crate.js";
import { lantern } from "./recipes/lantern.js";
import { marlinspike } from "./recipes/marlinspike.js";
import { oar } from "./recipes/oar.js";
import { quoit } from "./recipes/quoit.js";
import { spanner } from "./recipes/spanner.js";
import { token } from "./recipes/token.js";

const folder = process.argv[2] ?? fileURLToPath(new URL("props", import.meta.url));
await mkdir(folder, { recursive: true });
for (const recipe of [crate(), lantern(), marlinspike(), oar(), quoit(), spanner(), token()]) {
  await writeFile(path.join(folder, `${recipe.name}.glb`), await writeGlb(recipe));
}
