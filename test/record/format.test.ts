import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { ClipRecord, TakesRecord } from "../../src/record/clip-record.js";
import { clipText, formatRecord, recordPieces, withNearest } from "../../src/record/format.js";
import { bakeText, LOB } from "./lob.js";

describe("a record as text", () => {
  it("has numbers of 12 significant digits, and writes 0 for what is nothing but rounding", () => {
    expect(formatRecord([Math.PI, 1e6 / 3, -2e-7 / 3])).toBe(
      "[3.14159265359, 333333.333333, -6.66666666667e-8]\n",
    );
    expect(formatRecord([0.1 + 0.2, 9.9e-13, -9.9e-13, 1.01e-12, -0])).toBe("[0.3, 0, 0, 1.01e-12, 0]\n");
  });

  it("keeps what fits on one line of 100 characters on one, the comma behind it too", () => {
    const list = (digits: number) => ({ list: ["x".repeat(digits), 1] });
    // { "list": ["…", 1] }
    const frame = '{ "list": ["", 1] }'.length;
    expect(formatRecord(list(99 - frame)).split("\n")).toEqual([expect.stringMatching(/^.{99}$/), ""]);
    expect(formatRecord(list(100 - frame)).split("\n").length).toBeGreaterThan(2);
  });

  it("lays out the rest two spaces deep", () => {
    const long = "x".repeat(60);
    expect(formatRecord({ a: [1, 2], b: { c: long, d: [long, { e: null }] } })).toBe(
      `{
  "a": [1, 2],
  "b": {
    "c": "${long}",
    "d": ["${long}", { "e": null }]
  }
}
`,
    );
    expect(formatRecord({ empty: {}, list: [], text: "a\nb" })).toBe(
      '{ "empty": {}, "list": [], "text": "a\\nb" }\n',
    );
  });

  it("is JSON of the same, and no line is longer than 100 that could be broken", () => {
    fc.assert(
      fc.property(fc.jsonValue({ depthSize: "large" }), (value) => {
        const whole = JSON.parse(JSON.stringify(value), (_, v) => (typeof v === "number" ? 1 : v));
        const text = formatRecord(whole);
        expect(JSON.parse(text)).toEqual(whole);
        for (const line of text.split("\n").filter((line) => line.length > 100))
          expect(line).toMatch(/^ *("(\\.|[^"])*": )?("(\\.|[^"])*"|[[{])?,?$/);
      }),
      { seed: 1 },
    );
  });

  it("changes one line where one number changes", () => {
    const clip = (turns: number) => ({ name: "lob_01", text: "x".repeat(80), turns, keys: [1, 2] });
    const [a, b] = [1.5, 1.75].map((turns) => formatRecord([clip(1), clip(turns)]).split("\n"));
    expect(a.filter((line, i) => line !== b[i])).toEqual(['    "turns": 1.5,']);
  });
});

describe("a record written in pieces", () => {
  const inPieces = ({ clips, ...head }: TakesRecord): string => {
    const pieces = recordPieces(head);
    const texts = clips.map(({ nearest, ...clip }: ClipRecord) => withNearest(clipText(clip), nearest));
    return [
      pieces.start,
      ...texts.map((text, i) => pieces.clip(text, i === 0)),
      pieces.end(texts.length === 0),
    ].join("");
  };

  it("is the text of the whole, with no clip, one and several", async () => {
    const { record } = await bakeText(LOB);
    expect(record.clips[0].nearest).toBeNull();
    expect(record.clips[1].nearest).not.toBeNull();
    for (const count of [0, 1, 3]) {
      const part = { ...record, clips: record.clips.slice(0, count) };
      expect(inPieces(part)).toBe(formatRecord(part));
    }
  });
});
