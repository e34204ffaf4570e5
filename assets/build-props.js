/**
 * Builds the props of Lantern Quay, and the starter's: `node assets/build-props.js [FOLDER]` (default: assets/props and assets/starter).
 * The same source always gives the same bytes.
 */
import { mkdir, writeFile } from "node:fs/promises";
import path from "node:path";
import { fileURLToPath } from "node:url";
import { writeGlb } from "./lib/document.js";
import { anchor } from "./recipes/anchor.js";
import { crate } from "./recipes/crate.js";
import { lantern } from "./recipes/lantern.js";
import { marlinspike } from "./recipes/marlinspike.js";
import { oar } from "./recipes/oar.js";
import { quoit } from "./recipes/quoit.js";
import { spanner } from "./recipes/spanner.js";
import { token } from "./recipes/token.js";

const own = (name) => fileURLToPath(new URL(name, import.meta.url));
const props = [crate(), lantern(), marlinspike(), oar(), quoit(), spanner(), token()];
for (const [recipes, usual] of [
  [props, own("props")],
  [[anchor()], own("starter")],
]) {
  const folder = process.argv[2] ?? usual;
  await mkdir(folder, { recursive: true });
  for (const recipe of recipes)
    await writeFile(path.join(folder, `${recipe.name}.glb`), await writeGlb(recipe));
}
