/** The program as it is installed, with the preview's page and its thread, and a preview that runs. */

import { type ChildProcess, spawn } from "node:child_process";
import { once } from "node:events";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { build } from "esbuild";
// @ts-expect-error it is a script of the build, without types
import { bundlePage } from "../../assets/build-page.js";
import { Program } from "../cli/program.js";

const ROOT = fileURLToPath(new URL("../../", import.meta.url));

export async function installPage(): Promise<Program> {
  const program = await Program.install();
  await build({
    entryPoints: [join(ROOT, "src/node/preview-worker.ts")],
    outfile: join(program.folder, "dist/node/preview-worker.js"),
    bundle: true,
    platform: "node",
    format: "esm",
    packages: "external",
    logLevel: "silent",
  });
  await bundlePage(join(program.folder, "dist/page"));
  return program;
}

/** `tossbake preview` as a process. */
export interface Preview {
  /** Where it says that the page is, with a slash at the end. */
  url: string;
  process: ChildProcess;
  /** Standard error so far. */
  errors(): string;
  /** Interrupts it as Ctrl+C does; its exit code. */
  stop(): Promise<number | null>;
}

export async function startPreview({ folder }: Program, args: readonly string[]): Promise<Preview> {
  const child = spawn(process.execPath, [join(folder, "bin/tossbake.js"), "preview", ...args], {
    env: { ...process.env, NODE_OPTIONS: "" },
  });
  let said = "";
  let errors = "";
  child.stderr.setEncoding("utf8").on("data", (text: string) => {
    errors += text;
  });
  const ended = once(child, "exit");
  const url = await new Promise<string>((found, fail) => {
    child.stdout.setEncoding("utf8").on("data", (text: string) => {
      said += text;
      const address = /http:\/\/\S+/.exec(said)?.[0];
      if (address) found(address);
    });
    child.once("exit", (code) => fail(new Error(`preview ended with ${code}: ${said}${errors}`)));
  });
  return {
    url,
    process: child,
    errors: () => errors,
    async stop() {
      child.kill("SIGINT");
      const [code] = await ended;
      return code;
    },
  };
}
