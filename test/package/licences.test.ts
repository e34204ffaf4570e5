import { readFileSync } from "node:fs";
import { expect, it } from "vitest";
// @ts-expect-error a script without types
import { licenceList, packages } from "../../assets/list-licences.js";
import { ROOT } from "../house/sources.js";

interface Package {
  name: string;
  licence: string;
  hasInstallScript: boolean;
  isBundled: boolean;
}

/** Licences that ask for no more than their own text (SPDX's names; common practice, no source for the choice). */
const PERMISSIVE = ["0BSD", "Apache-2.0", "BSD-2-Clause", "BSD-3-Clause", "ISC", "MIT"];

const all: Package[] = await packages();

it("THIRD-PARTY.md is what the lock file says; npm run licences makes it again", async () => {
  expect(readFileSync(`${ROOT}THIRD-PARTY.md`, "utf8")).toBe(await licenceList());
});

it("every package that comes along is permissive, and runs no script when it is installed", () => {
  expect(all.length).toBeGreaterThan(10);
  for (const { name, licence, hasInstallScript } of all) {
    expect(PERMISSIVE, name).toContain(licence);
    expect(hasInstallScript, name).toBe(false);
  }
});

it("every package that is named as a dependency is among them", () => {
  const { dependencies } = JSON.parse(readFileSync(`${ROOT}package.json`, "utf8"));
  for (const name of Object.keys(dependencies)) expect(all.map((each) => each.name)).toContain(name);
});

it("what the page holds a copy of comes with its licence's text", () => {
  const copied = all.filter(({ isBundled }) => isBundled).map(({ name }) => name);
  expect(copied).toContain("three");
  const text = readFileSync(`${ROOT}THIRD-PARTY.md`, "utf8");
  for (const name of copied) expect(text).toMatch(new RegExp(`^### ${name}\n\n\`\`\`\n[^]*?copyright`, "im"));
});
