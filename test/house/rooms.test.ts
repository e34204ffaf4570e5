import { builtinModules } from "node:module";
import { posix } from "node:path";
import { describe, expect, it } from "vitest";
import { importsOf, readSources } from "./sources.js";

// The order of the rooms is the way the data takes through the program: common practice (layers), the project's own choice.
const ROOMS = [
  "math",
  "gltf",
  "prop",
  "flight",
  "aim",
  "clip",
  "throwfile",
  "draw",
  "bake",
  "record",
  "review",
  "node",
  "cli",
];
/** Rooms that need Node; all others run in a browser. */
const NODE_ROOMS = ["node", "cli"];

const sources = readSources();
const roomOf = (path: string): string => (path.includes("/") ? path.slice(0, path.indexOf("/")) : path);
/** The public library comes last; it looks into every room a browser has. */
const place = (path: string): number => (path === "index.ts" ? ROOMS.length : ROOMS.indexOf(roomOf(path)));
const isBuiltin = (name: string): boolean => name.startsWith("node:") || builtinModules.includes(name);

describe("the house", () => {
  it("has files, each in a known room", () => {
    expect(sources.length).toBeGreaterThan(10);
    expect(sources.map((s) => s.path).filter((path) => place(path) < 0)).toEqual([]);
  });

  it("imports only from the same room or one further up", () => {
    const wrong = sources.flatMap(({ path, imports }) =>
      imports
        .filter((name) => name.startsWith("."))
        .map((name) => posix.join(posix.dirname(path), name))
        .filter((target) => place(target) < 0 || place(target) > place(path))
        .map((target) => `${path} imports ${target}`),
    );
    expect(wrong).toEqual([]);
  });

  it("lets only node and cli use Node, and the library use neither of them", () => {
    const wrong = sources
      .filter(({ path }) => !NODE_ROOMS.includes(roomOf(path)))
      .flatMap(({ path, imports }) =>
        imports
          .filter((name) => isBuiltin(name) || NODE_ROOMS.some((room) => name.includes(`/${room}/`)))
          .map((name) => `${path} imports ${name}`),
      );
    expect(wrong).toEqual([]);
  });
});

describe("what the test sees", () => {
  it("is every form of import, types too, and no comment", () => {
    expect(
      importsOf(`import a from "./a.js";
        import type { B } from "./b.js";
        import {
          c,
        } from './c.js';
        import "./d.js";
        export * from "./e.js";
        const f = await import("./f.js");
        type G = import("./g.js").G;
        // import h from "./h.js";
        /** import i from "./i.js"; */`),
    ).toEqual(["./a.js", "./b.js", "./c.js", "./d.js", "./e.js", "./f.js", "./g.js"]);
  });
});
