/** Throw files for the tests of the page, in folders of their own. */

import { cpSync, mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";

const PROPS = fileURLToPath(new URL("../../assets/props/", import.meta.url));

export class Workshop {
  readonly folder = mkdtempSync(join(tmpdir(), "tossbake-workshop-"));
  readonly path: string;

  constructor(text: string, name = "yard.throws.yaml") {
    this.path = join(this.folder, name);
    cpSync(join(PROPS, "spanner.glb"), join(this.folder, "spanner.glb"));
    this.save(text);
  }

  save(text: string): void {
    writeFileSync(this.path, text);
  }

  remove(): void {
    rmSync(this.folder, { recursive: true, force: true });
  }
}

/** Two throws of a spanner and one of a disc; z says how far the first goes. */
export const yard = (z = 3): string => `seed: yard
props:
  spanner:
    model: spanner.glb
    density: 5000
    points: { grip: [0, 0, 0], jaw: [0, 0, 0.135] }
  lid: { shape: { disc: { radius: 0.1, thickness: 0.01 } } }
throws:
  lob:
    prop: spanner
    takes: 4
    release: { at: [0, 1.2, 0], point: grip, facing: [[grip, back], [short, up]], scatter: 0..5 }
    arrive: { at: [0, 1, ${z}], after: 0.8..0.9 }
    spin: { axis: middle, turns: 1.5 }
    hold: { before: 0.1, after: 0.2 }
  skim:
    prop: lid
    takes: 3
    release: { at: [0, 1, 0] }
    arrive: { at: [0.5, 0.8, 4], after: 0.6..0.7 }
    spin: { axis: short, turns: 2..3 }
`;
