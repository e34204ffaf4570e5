import { describe, expect, test } from "vitest";
import { styleSheet } from "../../src/review/look.js";
import { element, escaped, numeral, pathData, sheetSvg, textAt } from "../../src/review/svg.js";
import { parseXml } from "./xml.js";

const NASTY = `</text><script>alert("1")</script> & 'x' \u0000\u0007\ud800 ✓ 漢字 😀`;

describe("a sheet's SVG", () => {
  const sheet = sheetSvg({
    width: 300,
    height: 200,
    title: NASTY,
    description: NASTY,
    body: [textAt(10, 20, NASTY, { class: NASTY })],
  });

  test("is well-formed whatever names hold, and has title, description and text as they were written", () => {
    const root = parseXml(sheet);
    // XML 1.0, 2.2: neither control characters nor lone surrogates can be in a document.
    const clean = `</text><script>alert("1")</script> & 'x' \ufffd\ufffd\ufffd ✓ 漢字 😀`;
    expect(root.name).toBe("svg");
    expect(root.children.map(({ name }) => name)).toEqual(["title", "desc", "style", "rect", "text"]);
    expect(root.children[0].text).toBe(clean);
    expect(root.children[1].text).toBe(clean);
    expect(root.children[4]).toMatchObject({ text: clean, attributes: { class: clean, x: "10", y: "20" } });
    expect(root.attributes["aria-labelledby"]?.split(" ")).toEqual([
      root.children[0].attributes.id,
      root.children[1].attributes.id,
    ]);
  });

  test("has no script and names nothing outside itself", () => {
    const empty = sheetSvg({ width: 1, height: 1, title: "", description: "", body: [] });
    // The namespace is a name, not a reference (Namespaces in XML 1.0, 2.1).
    expect(empty.replace('xmlns="http://www.w3.org/2000/svg"', "")).not.toMatch(
      /https?:|href|url\(|@import|<script/,
    );
  });

  test("has a tint for dark surroundings wherever it has one for light ones", () => {
    const [light, dark] = styleSheet().split("@media (prefers-color-scheme:dark)");
    const tinted = (css: string) =>
      css
        .match(/\.[\w-]+\{[^}]*#[^}]*\}/g)!
        .map((rule) => rule.split("{")[0])
        .sort();
    expect(tinted(dark)).toEqual(tinted(light));
    expect(tinted(dark).length).toBeGreaterThan(20);
  });

  // WCAG 2.2, 1.4.3 and its relative luminance: 4.5 to 1 for text.
  test("has texts that stand out from the paper, light and dark", () => {
    for (const css of styleSheet().split("@media")) {
      const paper = luminance(/\.paper\{fill:(#\w+)/.exec(css)![1]);
      const texts = [...css.matchAll(/\.(title|heading|label|faint|small|[a-z]+-text)\{[^}]*fill:(#\w+)/g)];
      expect(texts.length).toBeGreaterThan(7);
      for (const [, name, tint] of texts) {
        const [high, low] = [paper, luminance(tint)].sort((a, b) => b - a);
        expect([name, (high + 0.05) / (low + 0.05)]).toEqual([
          name,
          expect.toSatisfy((ratio) => ratio >= 4.5),
        ]);
      }
    }
  });
});

describe("markup", () => {
  test("rounds numbers, never to -0, and leaves out what is undefined", () => {
    expect(element("a", { x: 1 / 3, y: -0.0001, z: undefined, w: "1" }, "")).toBe(
      '<a x="0.33" y="0" w="1"></a>',
    );
    expect(numeral(-0.004)).toBe("0");
    expect(numeral(1234567.891)).toBe("1234567.89");
  });

  test("escapes what ends text or attribute", () => {
    expect(escaped(`a<b>&"c"`)).toBe("a&lt;b&gt;&amp;&quot;c&quot;");
  });

  test("writes paths whose rounding does not add up", () => {
    const line = Array.from({ length: 2000 }, (_, i) => i * 0.00501).flatMap((x) => [x, -x]);
    const steps = pathData([line])
      .slice(1)
      .match(/-?[\d.]+/g)!
      .map(Number);
    const end = steps.filter((_, i) => i % 2 === 0).reduce((sum, step) => sum + step, 0);
    expect(end).toBeCloseTo(1999 * 0.00501, 2);
  });

  test("maps, closes and parts paths as SVG 2, 9.3 reads them", () => {
    const triangle = [0, 0, 1, 0, 0, 1];
    expect(pathData([triangle, triangle], { closed: true, map: [10, 0, 0, -10, 5, 20] })).toBe(
      "M5 20l10 0-10-10zM5 20l10 0-10-10z",
    );
  });
});

function luminance(tint: string): number {
  const [r, g, b] = [1, 3, 5].map((at) => {
    const value = Number.parseInt(tint.slice(at, at + 2), 16) / 255;
    return value <= 0.04045 ? value / 12.92 : ((value + 0.055) / 1.055) ** 2.4;
  });
  return 0.2126 * r + 0.7152 * g + 0.0722 * b;
}
