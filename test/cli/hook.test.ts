import { execFileSync } from "node:child_process";
import { mkdirSync, readdirSync, readFileSync, symlinkSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { build } from "esbuild";
import { expect, it } from "vitest";
import { run, Workplace } from "./folder.js";

const ROOT = fileURLToPath(new URL("../../", import.meta.url));
const README = readFileSync(join(ROOT, "README.md"), "utf8");

/** The README's block of that language that holds the text. */
function block(language: string, holding: string): string {
  const blocks = Array.from(README.matchAll(/^```(.*)\n([\s\S]*?)^```$/gm));
  const found = blocks.filter(([, name, text]) => name === language && text.includes(holding));
  expect(found).toHaveLength(1);
  return found[0][2];
}

/** A repository with the README's throw file names, its hook and attributes, and tossbake installed as this source has it. */
async function repository() {
  const place = new Workplace();
  const shell = (command: string) => {
    try {
      const env = { ...process.env, GIT_CONFIG_GLOBAL: "/dev/null", GIT_CONFIG_SYSTEM: "/dev/null" };
      const options = { cwd: place.root, env, encoding: "utf8", stdio: "pipe" } as const;
      return { code: 0, output: execFileSync("sh", ["-c", `${command} 2>&1`], options) };
    } catch (error) {
      const { status, stdout } = error as { status: number; stdout: string };
      return { code: status, output: stdout };
    }
  };
  await install(place);
  shell("git init -q && git config user.name Quay && git config user.email quay@example.org");
  shell("mv lob.throws.yaml first.throws.yaml");
  writeFileSync(place.path(".gitignore"), "node_modules\n");
  writeFileSync(place.path(".gitattributes"), block("", "*.glb binary"));
  writeFileSync(place.path(".git/hooks/pre-commit"), block("sh", "checkout-index"), { mode: 0o755 });
  await run("bake", place.path("first.throws.yaml"), "-o", place.path("clips"));
  return { place, shell };
}

async function install(place: Workplace) {
  const modules = place.path("node_modules");
  mkdirSync(join(modules, ".bin"), { recursive: true });
  for (const name of readdirSync(join(ROOT, "node_modules")))
    if (!name.startsWith(".")) symlinkSync(join(ROOT, "node_modules", name), join(modules, name));
  const program = join(modules, ".bin", "tossbake");
  await build({
    stdin: {
      contents: `import { main } from "./src/cli/main.js"; process.exitCode = await main(process.argv.slice(2));`,
      resolveDir: ROOT,
    },
    bundle: true,
    platform: "node",
    format: "esm",
    packages: "external",
    banner: { js: "#!/usr/bin/env node" },
    outfile: `${program}.mjs`,
    logLevel: "silent",
  });
  writeFileSync(program, `#!/usr/bin/env node\nawait import("./tossbake.mjs");\n`, { mode: 0o755 });
  writeFileSync(join(modules, ".bin", "package.json"), `{ "type": "module" }`);
}

it("the README's hook lets a true commit pass and stops one that drifted, as its CI step does", async () => {
  const { place, shell } = await repository();
  const step = block("yaml", "- run:").replace("- run: ", "").trim();

  expect(shell("git add -A && git commit -q -m first")).toMatchObject({ code: 0 });
  expect(shell(step)).toMatchObject({ code: 0, output: expect.stringMatching("no drift in 5 takes") });
  expect(shell("git log --oneline").output).toMatch("first");

  place.edit("first.throws.yaml", "[0, 1, 3]", "[0, 1, 3.014]");
  // not staged yet: what is committed is still true
  expect(shell("git commit -q --allow-empty -m unstaged")).toMatchObject({ code: 0 });
  const drift = /lob_01 arrives 14 mm further/;
  expect(shell("git commit -q -a -m second")).toMatchObject({
    code: 1,
    output: expect.stringMatching(drift),
  });
  expect(shell(step)).toMatchObject({ code: 1, output: expect.stringMatching(drift) });
  expect(shell("git log --oneline").output).not.toMatch("second");

  await run("bake", place.path("first.throws.yaml"), "-o", place.path("clips"));
  expect(shell("git commit -q -a -m third")).toMatchObject({ code: 0 });
  expect(shell("git log --oneline").output).toMatch("third");
});

it("the README's attributes let Git show the record's lines, and leave the clips' bytes alone", async () => {
  const { place, shell } = await repository();
  shell("git -c core.autocrlf=true add -A && git commit -q -m first");
  place.edit("clips/takes.json", '"turns": 1.5', '"turns": 1.75');
  writeFileSync(place.path("clips/lob.glb"), "\r\n");
  const diff = shell("git diff").output;
  expect(diff).toMatch(/^\+.*"turns": 1\.75/m);
  expect(diff).toMatch(/^Binary files a\/clips\/lob\.glb and b\/clips\/lob\.glb differ/m);
  // a checkout with the line ends of another system leaves the record as it was baked
  shell("git -c core.autocrlf=true checkout -q -f");
  expect(shell("npx tossbake verify first.throws.yaml -o clips")).toMatchObject({ code: 0 });
  expect(readFileSync(place.path("clips/takes.json"), "utf8")).not.toMatch("\r");
});

it("the README's example of drift is what verify says of the README's first throw", async () => {
  const place = new Workplace(block("yaml", "seed: first"));
  await run("bake", place.throwFile, "-o", place.out);
  place.edit("lob.throws.yaml", "[0.4, 1, 3.2]", "[0.4, 1, 3.214]");
  const { out } = await run("verify", place.throwFile, "-o", place.out);
  const [, ...example] = block("", "lob-to-bench_01").split("\n…")[0].split("\n");
  expect(out.split("\n").slice(1, 1 + example.length)).toEqual(example);
  expect(example).toHaveLength(2);
});
