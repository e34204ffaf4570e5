import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { RequestError } from "../../src/math/request-error.js";
import type { TakesRecord } from "../../src/record/clip-record.js";
import { formatRecord } from "../../src/record/format.js";
import { parseRecord } from "../../src/record/parse.js";
import { VERSION } from "../../src/record/version.js";
import { baked } from "../bake/baked.js";

const { record } = await baked(`
props: { pin: { shape: { box: [0.1, 0.2, 0.3] } } }
throws: { lob: { prop: pin, takes: 2, arrive: { at: [0, 1, 2], after: 0.9..1 } } }
`);
const TEXT = formatRecord(record);

describe("takes.json read back", () => {
  it("is what was written", () => {
    expect(formatRecord(parseRecord("takes.json", TEXT))).toBe(TEXT);
  });

  it("keeps what a later version has written besides, at any depth and in its place", () => {
    const later = JSON.parse(TEXT);
    later.clips[0].miss = { axis: 1, ...later.clips[0].miss };
    later.props.pin.principal.names = ["a"];
    later.more = true;
    expect(parseRecord("takes.json", JSON.stringify(later))).toEqual(later);
    expect(formatRecord(parseRecord("takes.json", JSON.stringify(later)))).toBe(formatRecord(later));
  });

  it("may have a null where a take asks nothing or has no neighbour", () => {
    expect(record.clips[0].nearest).toBeNull();
    expect(record.clips[0].miss.angle).toBeNull();
  });

  it("states the package's version", () => {
    const { version } = JSON.parse(readFileSync(new URL("../../package.json", import.meta.url), "utf8"));
    expect(VERSION).toBe(version);
    expect(record.tossbake).toBe(version);
  });
});

describe("a takes.json that is none", () => {
  const fault = (text: string): string => {
    try {
      parseRecord("out/takes.json", text);
    } catch (error) {
      if (error instanceof RequestError) return error.message;
      throw error;
    }
    throw new Error("was read");
  };
  type Change = (json: TakesRecord & Record<string, unknown>) => void;
  const changed = (change: Change) => {
    const json = JSON.parse(TEXT);
    change(json);
    return fault(JSON.stringify(json));
  };

  it("is told with its path, the first thing that is wrong and what to do, on one line", () => {
    for (const text of ["", "{", "no\nJSON", TEXT.slice(0, -20)])
      expect(fault(text)).toMatch(/^out\/takes\.json: is not JSON \(.+\); bake again, or restore it .+$/);
    for (const text of ["null", "[]", "3", '"text"'])
      expect(fault(text)).toMatch(/^out\/takes\.json: the whole: .+; bake again.+$/);
  });

  it.each<[string, Change]>([
    ["format", (json) => Object.assign(json, { format: 2 })],
    ["clips", (json) => Object.assign(json, { clips: {} })],
    ["clips.1.turns", (json) => Object.assign(json.clips[1], { turns: "1.5" })],
    ["clips.0.release.rotation", (json) => Object.assign(json.clips[0].release, { rotation: [0, 0, 1] })],
    ["clips.0.nearest", (json) => Object.assign(json.clips[0], { nearest: undefined })],
    ["props.pin.inertia.2", (json) => Object.assign(json.props.pin.inertia, { 2: 1 })],
    ["throwFile.sha256", (json) => Object.assign(json.throwFile, { sha256: null })],
  ])("is told of %s", (key, change) => {
    expect(changed(change)).toContain(`out/takes.json: ${key}: `);
  });
});
