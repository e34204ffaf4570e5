import { describe, expect, it } from "vitest";
import {
  clear,
  decide,
  NO_VERDICTS,
  oldVerdict,
  sessionShelf,
  takesLine,
  verdictOf,
  wanted,
} from "../../src/review/page/verdicts.js";
import { parseThrowFile } from "../../src/throwfile/parse.js";
import { takeNumbers } from "../../src/throwfile/types.js";
import { bakedPage, THROWS } from "./page-fixture.js";

const data = await bakedPage();
const motions = data.throws[0].takes.map(({ motion }) => motion);

describe("verdicts on takes", () => {
  it("are given, changed, and taken back by giving them again", () => {
    const accepted = decide(NO_VERDICTS, motions[0], "accepted");
    expect(verdictOf(accepted, motions[0])).toBe("accepted");
    expect(verdictOf(accepted, motions[1])).toBeUndefined();
    const rejected = decide(accepted, motions[0], "rejected");
    expect(verdictOf(rejected, motions[0])).toBe("rejected");
    expect(verdictOf(decide(rejected, motions[0], "rejected"), motions[0])).toBeUndefined();
  });

  it("hold of the motion that was looked at: another one has to be decided again", () => {
    const verdicts = decide(NO_VERDICTS, motions[0], "accepted");
    const [part] = motions[0].parts;
    const moved = { ...motions[0], parts: [{ ...part, launch: { ...part.launch, duration: 2 } }] };
    expect(verdictOf(verdicts, moved)).toBeUndefined();
    expect(oldVerdict(verdicts, moved)).toBe("accepted");
    expect(wanted(verdicts, [moved]).accepted).toBe(0);
    // and the same verdict counts for the new motion, instead of being taken back
    expect(verdictOf(decide(verdicts, moved, "accepted"), moved)).toBe("accepted");
    expect(oldVerdict(verdicts, motions[0])).toBeUndefined();
  });

  it("are kept apart by throw, be it called as JavaScript calls things of its own", () => {
    const odd = { ...motions[0], throw: "constructor" };
    expect(verdictOf(NO_VERDICTS, odd)).toBeUndefined();
    const verdicts = decide(decide(NO_VERDICTS, odd, "accepted"), motions[0], "rejected");
    expect(verdictOf(verdicts, odd)).toBe("accepted");
    expect(verdictOf(clear(verdicts, "constructor"), odd)).toBeUndefined();
    expect(verdictOf(clear(verdicts, "constructor"), motions[0])).toBe("rejected");
  });
});

describe("the list of wanted takes", () => {
  const rejecting = decide(decide(NO_VERDICTS, motions[1], "rejected"), motions[4], "rejected");

  it("is all takes but the rejected ones", () => {
    expect(wanted(NO_VERDICTS, motions).takes).toEqual([1, 2, 3, 4, 5, 6]);
    expect(wanted(rejecting, motions)).toEqual({ takes: [1, 3, 4, 6], accepted: 0, rejected: 2 });
  });

  it("is the accepted ones alone once there is one", () => {
    const one = decide(rejecting, motions[5], "accepted");
    expect(wanted(one, motions).takes).toEqual([6]);
    const verdicts = decide(one, motions[2], "accepted");
    expect(wanted(verdicts, motions).takes).toEqual([3, 6]);
  });

  it("is written as the throw file takes it", () => {
    expect(takesLine([3, 7, 19])).toBe("takes: [3, 7, 19]");
    const text = THROWS.replaceAll("takes: 6", takesLine(wanted(rejecting, motions).takes));
    const { takes } = parseThrowFile("page.throws.yaml", text).throws.get("lob")!;
    expect(takeNumbers(takes)).toEqual([1, 3, 4, 6]);
  });
});

describe("the shelf of verdicts", () => {
  const storage = () => {
    const kept = new Map<string, string>();
    return {
      getItem: (key: string) => kept.get(key) ?? null,
      setItem: (key: string, value: string) => void kept.set(key, value),
    } as unknown as Storage;
  };

  it("keeps them while the page is open, file by file", () => {
    const session = storage();
    const verdicts = decide(NO_VERDICTS, motions[0], "accepted");
    sessionShelf("a", () => session).write(verdicts);
    expect(sessionShelf("a", () => session).read()).toEqual(verdicts);
    expect(sessionShelf("b", () => session).read()).toEqual(NO_VERDICTS);
  });

  it("does without a storage that is refused, as that of a page from a file may be", () => {
    const shelf = sessionShelf("a", () => {
      throw new DOMException("refused", "SecurityError");
    });
    expect(() => shelf.write(NO_VERDICTS)).not.toThrow();
    expect(shelf.read()).toEqual(NO_VERDICTS);
  });

  it.each(["no JSON", "null", "[1]", '{"lob":5}', '{"lob":{"1":{"verdict":"perhaps","motion":"x"}}}'])(
    "takes nothing for a verdict that is none: %s",
    (text) => {
      const session = storage();
      session.setItem("tossbake verdicts a", text);
      const read = sessionShelf("a", () => session).read();
      for (const motion of motions) expect(verdictOf(read, motion)).toBeUndefined();
    },
  );
});
