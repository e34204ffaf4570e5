/** A folder with a throw file and the demo's spanner, and the command line run in it. */

import { cpSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { onTestFinished, vi } from "vitest";
import { main } from "../../src/cli/main.js";

export const assets = (name: string) => fileURLToPath(new URL(`../../assets/${name}`, import.meta.url));

export const THROWS = `seed: 1
props:
  spanner: { model: spanner.glb, density: { steel: 7850, default: 1100 } }
  pin: { shape: { box: [0.02, 0.05, 0.3] }, density: 700 }
throws:
  lob:
    prop: spanner
    takes: 3
    release: { at: [0, 1, 0], scatter: 0..5 }
    arrive: { at: [0, 1, 3], after: 1 }
    spin: { axis: short, turns: 1.5 }
  toss: { like: lob, prop: pin, takes: 2 }
`;

export class Workplace {
  readonly root = mkdtempSync(join(tmpdir(), "tossbake-"));
  readonly throwFile = this.path("lob.throws.yaml");
  readonly out = this.path("out");

  constructor(text = THROWS) {
    onTestFinished(() => rmSync(this.root, { recursive: true, force: true }));
    cpSync(assets("props/spanner.glb"), this.path("spanner.glb"));
    writeFileSync(this.throwFile, text);
  }

  path(...names: string[]): string {
    return join(this.root, ...names);
  }

  /** Replaces text in a file of the folder; it must be there. */
  edit(name: string, from: string | RegExp, to: string): void {
    const text = readFileSync(this.path(name), "utf8");
    const edited = text.replace(from, to);
    if (edited === text) throw new Error(`${name} does not hold ${from}`);
    writeFileSync(this.path(name), edited);
  }

  /** Names and contents of a folder's files. */
  contents(folder = this.out): Record<string, string> {
    return Object.fromEntries(
      readdirSync(folder, { withFileTypes: true })
        .filter((entry) => entry.isFile())
        .map(({ name }) => [name, readFileSync(join(folder, name), "base64")]),
    );
  }
}

/** Runs a command line; what it printed and answered. */
export async function run(...args: string[]): Promise<{ code: number; out: string; err: string }> {
  let out = "";
  let err = "";
  const spies = [
    vi.spyOn(process.stdout, "write").mockImplementation((text) => {
      out += text;
      return true;
    }),
    vi.spyOn(process.stderr, "write").mockImplementation((text) => {
      err += text;
      return true;
    }),
  ];
  try {
    const code = await main(args);
    return { code, out, err };
  } finally {
    for (const spy of spies) spy.mockRestore();
  }
}
