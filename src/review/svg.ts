/** SVG as text: escaped, numbers with few decimals, the same bytes always. Lengths in the sheet's own units (CSS pixels). */

import { FONT_FAMILY, styleSheet } from "./look.js";

/** Of a sheet's units: a hundredth of a pixel is not seen. */
const DECIMALS = 2;

/** Without zeros at its end, never "-0". */
export const numeral = (value: number, decimals = DECIMALS): string =>
  String(Number(value.toFixed(decimals)) + 0);

// XML 1.0, 2.2: these characters cannot be in a document, however they are written.
const UNWRITABLE =
  // biome-ignore lint/suspicious/noControlCharactersInRegex: they are what is looked for
  /[\u0000-\u0008\u000b\u000c\u000e-\u001f\ufffe\uffff]|[\ud800-\udbff](?![\udc00-\udfff])|(?<![\ud800-\udbff])[\udc00-\udfff]/g;

const NAMES: Readonly<Record<string, string>> = { "&": "&amp;", "<": "&lt;", ">": "&gt;", '"': "&quot;" };

/** Text as it stands in an element or between double quotes; what XML cannot hold becomes U+FFFD. */
export const escaped = (text: string): string =>
  text.replace(UNWRITABLE, "\ufffd").replace(/[&<>"]/g, (character) => NAMES[character]);

export type Attributes = Readonly<Record<string, string | number | undefined>>;

/** One element. `children` are markup already; attributes are escaped, numbers rounded, undefined ones left out. */
export function element(name: string, attributes: Attributes, ...children: readonly string[]): string {
  const written = Object.entries(attributes).flatMap(([key, value]) =>
    value === undefined ? [] : [` ${key}="${typeof value === "number" ? numeral(value) : escaped(value)}"`],
  );
  const start = `<${name}${written.join("")}`;
  return children.length > 0 ? `${start}>${children.join("")}</${name}>` : `${start}/>`;
}

/** Elements that belong together. */
export const group = (attributes: Attributes, children: readonly string[]): string =>
  element("g", attributes, `\n${children.join("\n")}\n`);

/** A line of text with its base line at x, y; `attributes` has the class, and `text-anchor` where it is not to begin at x. */
export const textAt = (x: number, y: number, content: string, attributes: Attributes = {}): string =>
  element("text", { x, y, ...attributes }, escaped(content));

/**
 * The `d` of a path through the points of each line, x y x y…, after the affine map [a, b, c, d, e, f] of SVG's `matrix()`.
 * Steps are written from point to point, each from where the rounded ones before it led to.
 */
export function pathData(
  lines: readonly ArrayLike<number>[],
  { closed = false, map = [1, 0, 0, 1, 0, 0] as Affine, decimals = DECIMALS } = {},
): string {
  return lines.map((line) => subpath(line, map, decimals, closed)).join("");
}

export type Affine = readonly [number, number, number, number, number, number];

function subpath(
  line: ArrayLike<number>,
  [a, b, c, d, e, f]: Affine,
  decimals: number,
  closed: boolean,
): string {
  const unit = Number(`1e${decimals}`);
  const parts: string[] = [];
  let [lastX, lastY] = [0, 0];
  for (let i = 0; i + 1 < line.length; i += 2) {
    const x = Math.round((a * line[i] + c * line[i + 1] + e) * unit);
    const y = Math.round((b * line[i] + d * line[i + 1] + f) * unit);
    if (i > 0 && x === lastX && y === lastY) continue;
    const [stepX, stepY] = [x - lastX, y - lastY].map((step) => numeral(step / unit, decimals));
    parts.push(`${i === 0 ? "M" : parts.length === 2 ? "l" : stepX.startsWith("-") ? "" : " "}${stepX}`);
    parts.push(`${stepY.startsWith("-") ? "" : " "}${stepY}`);
    lastX = x;
    lastY = y;
  }
  return parts.join("") + (closed ? "z" : "");
}

export interface Sheet {
  width: number;
  height: number;
  /** Read out, and shown where the pointer rests. */
  title: string;
  /** What there is to see, for who does not see it. */
  description: string;
  /** Markup. */
  body: readonly string[];
  /** Tells the sheet's own ids from others' where several stand in one page; a name of letters, digits and "-". */
  id?: string;
}

/** A whole document on its own paper, with its look, no script and nothing from elsewhere. Ends with a line feed. */
export function sheetSvg({ width, height, title, description, body, id = "sheet" }: Sheet): string {
  const root = {
    xmlns: "http://www.w3.org/2000/svg",
    width,
    height,
    viewBox: `0 0 ${numeral(width)} ${numeral(height)}`,
    class: "tossbake",
    role: "img",
    "aria-labelledby": `${id}-title ${id}-desc`,
    "font-family": FONT_FAMILY,
  };
  return `${element(
    "svg",
    root,
    `\n${[
      element("title", { id: `${id}-title` }, escaped(title)),
      element("desc", { id: `${id}-desc` }, escaped(description)),
      element("style", {}, `\n${styleSheet()}`),
      element("rect", { class: "paper", width, height }),
      ...body,
    ].join("\n")}\n`,
  )}\n`;
}
