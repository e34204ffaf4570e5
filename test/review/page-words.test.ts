import { describe, expect, it } from "vitest";
import { faultWords, newsWords, placeWords } from "../../src/review/page/banner.js";
import { KEYS, keyFor } from "../../src/review/page/keys.js";
import * as words from "../../src/review/page/words.js";
import { bakedPage, sent } from "./page-fixture.js";

const plain = (text: string) => text.replaceAll("\u00a0", " ");

describe("numbers as the page says them", () => {
  it("are millimetres below a metre and metres above", () => {
    expect([0, 1e-9, 0.0234, 0.98765, 3.2].map((value) => plain(words.metres(value)))).toEqual([
      "0 mm",
      "under 0.001 mm",
      "23.4 mm",
      "988 mm",
      "3.20 m",
    ]);
  });

  it("have no minus before nothing and no exponent", () => {
    expect(words.decimals(-0.0001, 2)).toBe("0.00");
    expect(words.digits(0.000001234)).toBe("0.00000123");
    expect(words.digits(123456)).toBe("123456");
  });

  it("are turns a second and degrees, whatever the record has", () => {
    expect(plain(words.rate(4 * Math.PI))).toBe("2.00 turns/s");
    expect(words.angle(Math.PI / 2)).toBe("90.0°");
    expect(words.angle(1e-9)).toBe("under 0.001°");
  });

  it("count one take and more", () => {
    expect([words.counted(1, "take"), words.counted(2, "take")]).toEqual(["1 take", "2 takes"]);
  });
});

describe("what is wrong", () => {
  const error = {
    message: "/a/b/quay.throws.yaml:4:7 throws.x: wrong\n/a/b/quay.throws.yaml:9:1 throws.y: too",
    line: 4,
    column: 7,
  };

  it("is told with its line and column, without the folders", () => {
    expect(placeWords("quay.throws.yaml", error)).toBe("quay.throws.yaml, line 4, column 7");
    expect(faultWords("quay.throws.yaml", error)).toBe(
      "quay.throws.yaml:4:7 throws.x: wrong\nquay.throws.yaml:9:1 throws.y: too",
    );
    expect(faultWords("quay.throws.yaml", { message: "spanner.glb: is no glTF" })).toBe(
      "spanner.glb: is no glTF",
    );
  });

  it("is said once, and so is that it is in order again", async () => {
    const data = await bakedPage();
    const wrong = { ...sent(data), error };
    expect(newsWords(data, wrong)).toMatchObject({ urgent: true });
    expect(newsWords(data, wrong)!.text).toContain("line 4, column 7");
    expect(newsWords(wrong, { ...wrong })).toBeUndefined();
    expect(newsWords(wrong, data)!.text).toBe("In order again: 20 takes.");
    expect(newsWords(data, sent(data))).toBeUndefined();
    const [lob, ...others] = data.throws;
    expect(newsWords(data, { ...data, throws: [{ ...lob, stamp: "other" }, ...others] })).toMatchObject({
      urgent: false,
    });
  });
});

describe("the page's keys", () => {
  const pressed = (key: string, over: Partial<KeyboardEvent> = {}, tag = "") =>
    keyFor(
      {
        key,
        shiftKey: false,
        target: {
          closest: (selector: string) => (selector === tag ? {} : null),
          matches: (selector: string) => selector.split(/,\s*/).includes(tag),
        } as unknown as EventTarget,
        ...over,
      } as KeyboardEvent,
      true,
    );

  it("are each there once", () => {
    const all = KEYS.flatMap(({ keys, shift }) => keys.map((key) => `${shift ? "Shift " : ""}${key}`));
    expect(new Set(all).size).toBe(all.length);
    expect(KEYS.every(({ label, does }) => label !== "" && does !== "")).toBe(true);
  });

  it("tell a letter with Shift from one without", () => {
    expect(pressed("n")?.does).toBe("next take of the list");
    expect(pressed("N", { shiftKey: true })?.does).toBe("next throw");
    expect(pressed("A", { shiftKey: true })).toBeUndefined();
    expect(pressed("?", { shiftKey: true })?.does).toBe("these keys");
  });

  it("leave the browser its own, and fields what is typed into them", () => {
    expect(pressed("a", { ctrlKey: true })).toBeUndefined();
    expect(pressed("r", { metaKey: true })).toBeUndefined();
    expect(pressed("a", {}, "select")).toBeUndefined();
    expect(pressed(" ", {}, "button")).toBeUndefined();
    expect(pressed("a", {}, "button")?.does).toContain("accept");
    expect(pressed("a", {}, "dialog")).toBeUndefined();
  });

  it("of a single character can be turned off; arrows and the space bar stay", () => {
    const off = (key: string) => keyFor({ key, shiftKey: false, target: null } as KeyboardEvent, false);
    expect([off("a"), off("?"), off("1")]).toEqual([undefined, undefined, undefined]);
    expect([off(" ")?.does, off("ArrowRight")?.does]).toEqual(["play or pause", "one frame ahead"]);
  });
});
