/** A folder in which a program is let loose: what it is given, where it may write, and all that it must leave alone. */

import { createHash } from "node:crypto";
import {
  cpSync,
  lstatSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  realpathSync,
  rmSync,
} from "node:fs";
import { tmpdir } from "node:os";
import { join, relative } from "node:path";

export class Place {
  readonly root = realpathSync(mkdtempSync(join(tmpdir(), "tossbake-let-loose-")));
  readonly cwd = join(this.root, "work");

  constructor(given: string) {
    for (const name of ["tmp", "home", "work"]) mkdirSync(join(this.root, name));
    cpSync(given, join(this.cwd, "in"), { recursive: true });
  }

  /** Where a program leaves things unless it is told. */
  get env(): Record<string, string> {
    return { TMPDIR: join(this.root, "tmp"), HOME: join(this.root, "home") };
  }

  /** All below it but the output folder, each file with a hash of its content. */
  listing(): string[] {
    const out = join(this.cwd, "out");
    const walk = (folder: string): string[] =>
      readdirSync(folder)
        .sort()
        .flatMap((name) => {
          const path = join(folder, name);
          if (path === out) return [];
          const status = lstatSync(path);
          const shown = relative(this.root, path);
          if (status.isDirectory()) return [`${shown}/`, ...walk(path)];
          return [status.isFile() ? `${shown} ${hash(path)}` : shown];
        });
    return walk(this.root);
  }

  remove(): void {
    rmSync(this.root, { recursive: true, force: true });
  }
}

const hash = (path: string) => createHash("sha256").update(readFileSync(path)).digest("hex").slice(0, 16);
