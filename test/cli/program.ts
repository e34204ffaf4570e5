/** The program as it is installed: its script, one file of all its modules and one of what its threads run, in a process of its own. */

import { type ChildProcess, spawn, spawnSync } from "node:child_process";
import { cpSync, mkdtempSync, rmSync, symlinkSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { build } from "esbuild";

const ROOT = fileURLToPath(new URL("../../", import.meta.url));

export interface Run {
  code: number | null;
  out: string;
  err: string;
}

export interface RunOptions {
  /** Of Node itself, before the script. */
  node?: string[];
  cwd?: string;
  env?: Record<string, string>;
}

export class Program {
  private constructor(readonly folder: string) {}

  static async install(): Promise<Program> {
    const folder = mkdtempSync(join(tmpdir(), "tossbake-program-"));
    cpSync(join(ROOT, "bin"), join(folder, "bin"), { recursive: true });
    cpSync(join(ROOT, "package.json"), join(folder, "package.json"));
    symlinkSync(join(ROOT, "node_modules"), join(folder, "node_modules"));
    await build({
      entryPoints: ["cli/main.ts", "node/bake-worker.ts"].map((name) => join(ROOT, "src", name)),
      outbase: join(ROOT, "src"),
      outdir: join(folder, "dist"),
      bundle: true,
      platform: "node",
      format: "esm",
      packages: "external",
      logLevel: "silent",
    });
    return new Program(folder);
  }

  run(args: string[], options: RunOptions = {}): Run {
    return this.node([join(this.folder, "bin/tossbake.js"), ...args], options);
  }

  /** Started, and left to run. */
  start(args: string[], { node = [], cwd = this.folder, env = {} }: RunOptions = {}): ChildProcess {
    return spawn(process.execPath, [...node, join(this.folder, "bin/tossbake.js"), ...args], {
      cwd,
      env: { ...process.env, NODE_OPTIONS: "", ...env },
      stdio: ["ignore", "pipe", "pipe"],
    });
  }

  /** Standard output of a module's text. */
  evaluate(text: string, options: RunOptions = {}): string {
    return this.node(["--input-type=module", "--eval", text], options).out;
  }

  private node(args: string[], { node = [], cwd = this.folder, env = {} }: RunOptions): Run {
    const result = spawnSync(process.execPath, [...node, ...args], {
      cwd,
      env: { ...process.env, NODE_OPTIONS: "", ...env },
      encoding: "utf8",
    });
    return { code: result.status, out: result.stdout, err: result.stderr };
  }

  remove(): void {
    rmSync(this.folder, { recursive: true, force: true });
  }
}
