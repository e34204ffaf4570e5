/**
 * Lists whose work comes with the package, in THIRD-PARTY.md: what npm installs beside it, by the lock file, and what the preview page's bundle holds a copy of.
 * The same lock file makes the same bytes.
 */

import { readdir, readFile, writeFile } from "node:fs/promises";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { build } from "esbuild";

const ROOT = fileURLToPath(new URL("../", import.meta.url));

/**
 * @typedef {object} Package
 * @property {string} name
 * @property {string} version
 * @property {string} licence as it names it, in SPDX's words
 * @property {boolean} hasInstallScript
 * @property {boolean} isBundled in the preview page
 * @property {boolean} isInstalled beside tossbake
 */

/** @returns {Promise<Package[]>} by name */
export async function packages() {
  const { packages: locked } = JSON.parse(await readFile(join(ROOT, "package-lock.json"), "utf8"));
  const bundled = await bundledPaths();
  return Object.entries(locked)
    .map(([path, entry]) => ({ path, entry, name: path.replace(/^.*node_modules\//, "") }))
    .filter(({ path, entry }) => path !== "" && (!entry.dev || bundled.has(path)))
    .map(({ path, entry, name }) => ({
      name,
      version: entry.version,
      licence: entry.license ?? "",
      hasInstallScript: entry.hasInstallScript === true,
      isBundled: bundled.has(path),
      isInstalled: !entry.dev,
    }))
    .sort((a, b) => (a.name < b.name ? -1 : 1));
}

/** Where the packages lie of which the page's bundle holds a part, as the lock file has it. */
async function bundledPaths() {
  const { metafile } = await build({
    absWorkingDir: ROOT,
    entryPoints: ["src/review/page/main.ts"],
    bundle: true,
    platform: "browser",
    format: "esm",
    external: ["node:*"],
    write: false,
    metafile: true,
    logLevel: "silent",
  });
  const [{ inputs }] = Object.values(metafile.outputs);
  return new Set(
    Object.keys(inputs).flatMap(
      (path) => /(?:^|\/)(node_modules\/(?:.*\/node_modules\/)?(?:@[^/]+\/)?[^/]+)\//.exec(path)?.[1] ?? [],
    ),
  );
}

export async function licenceList() {
  const all = await packages();
  const row = ({ name, version, licence }) => `| ${name} | ${version} | ${licence} |`;
  const table = (list) =>
    ["| package | version | licence |", "| --- | --- | --- |", ...list.map(row)].join("\n");
  const copies = all.filter(({ isBundled }) => isBundled);
  const texts = await Promise.all(
    copies.map(async ({ name }) => {
      const folder = join(ROOT, "node_modules", name);
      const file = (await readdir(folder)).filter((entry) => /^licen[cs]e/i.test(entry)).sort()[0];
      if (!file) return "";
      return `\n### ${name}\n\n\`\`\`\n${(await readFile(join(folder, file), "utf8")).replaceAll("\r\n", "\n").trim()}\n\`\`\`\n`;
    }),
  );
  return `# Others' work in this package

Made from the lock file by \`npm run licences\`. \`npm run sbom\` prints what is installed as a software bill of materials (CycloneDX).

## Installed beside it

${table(all.filter(({ isInstalled }) => isInstalled))}

## Copied into the preview page

${table(copies)}
${texts.join("")}`;
}

if (process.argv[1] === fileURLToPath(import.meta.url))
  await writeFile(join(ROOT, "THIRD-PARTY.md"), await licenceList());
