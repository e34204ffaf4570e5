import { readFileSync } from "node:fs";
import { expect, it } from "vitest";
import { ROOT, readSources } from "./sources.js";

// What is public is this project's own choice; a change of it is a change of version by semantic versioning (semver.org, 2.0.0, §§ 5 to 8).

interface Public {
  name: string;
  /** As it is declared, its docstring apart. */
  doc: string;
  /** From the declaration to the next line that begins with a brace. */
  body: string;
  isFunction: boolean;
}

const read = (path: string) => readFileSync(`${ROOT}src/${path}`, "utf8");

/** Names that a module takes in or hands on, with the file each comes from. */
function handedOn(path: string): [string, string][] {
  const folder = path.includes("/") ? `${path.slice(0, path.lastIndexOf("/"))}/` : "";
  return [...read(path).matchAll(/(?:import|export) (?:type )?\{([^}]*)\} from "([^"]+)\.js"/g)].flatMap(
    ([, names, from]) =>
      names
        .split(",")
        .map((name) => name.trim().replace(/^type /, ""))
        .filter((name) => name !== "")
        .map((name): [string, string] => [
          name,
          `${new URL(from, `file:///${folder}`).pathname.slice(1)}.ts`,
        ]),
  );
}

function declared(name: string, path: string): Public {
  const text = read(path);
  const found = new RegExp(
    `(?:/\\*\\*((?:(?!\\*/)[^])*)\\*/\\n)?export (?:async )?(function|const|class|interface|type) ${name}\\b`,
  ).exec(text);
  if (!found) {
    const further = handedOn(path).find(([other]) => other === name);
    if (!further) throw new Error(`${name} is not in ${path}`);
    return declared(name, further[1]);
  }
  const rest = text.slice(found.index + found[0].length);
  return {
    name,
    doc: (found[1] ?? "").replace(/^\s*\* ?/gm, "").trim(),
    body: rest.slice(0, rest.search(/\n[}\]]/)),
    isFunction: found[2] === "function",
  };
}

const exported = handedOn("index.ts").map(([name, path]) => declared(name, path));

it("the public names are as listed: whoever changes the list changes the version", () => {
  const listed = readFileSync(`${ROOT}test/house/public-names.txt`, "utf8").trim().split("\n");
  expect(exported.map(({ name }) => name).sort()).toEqual(listed);
});

it.each(exported.map((each) => [each.name, each] as const))("%s says what it is", (_, { doc }) => {
  expect(doc).not.toBe("");
});

it.each(
  exported
    .filter(({ isFunction, body }) => isFunction && /\bthrow new\b/.test(body))
    .map((each) => [each.name, each] as const),
)("%s says what it throws", (_, { doc }) => {
  expect(doc).toMatch(/@throws|\bthrows\b/i);
});

it("the overview of the library is of what there is", () => {
  const readme = readFileSync(`${ROOT}README.md`, "utf8");
  const names = new Set(exported.map(({ name }) => name));
  const imported = [...readme.matchAll(/import \{([^}]*)\} from "tossbake"/g)].flatMap(([, list]) =>
    list.split(",").map((name) => name.trim()),
  );
  expect(imported.length).toBeGreaterThan(3);
  for (const name of imported) expect(names).toContain(name);
});

it("no message of the library's names an option of the command line", () => {
  for (const { path, text } of readSources().filter(({ path }) => !/^(cli|node|review\/page)\//.test(path)))
    expect(text.match(/["'` ]--[a-z][\w-]*/g) ?? [], path).toEqual([]);
});
