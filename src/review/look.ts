/** How sheets look: a print of a stroboscopic photograph on paper. All colours, widths and sizes are here. */

export const FONT_FAMILY = "system-ui, 'Segoe UI', Roboto, 'Helvetica Neue', 'Noto Sans', Arial, sans-serif";

/** Sizes of text by class, units of a sheet. */
export const FONT_SIZE = { title: 20, heading: 14, sentence: 15, label: 12, small: 10.5 } as const;

/** On paper, and where the surroundings are dark. The two lie far enough apart in lightness to be told apart in greyscale. */
type Tint = readonly [light: string, dark: string];

const PAPER: Tint = ["#f7f4ec", "#1d1c1a"];
const INK: Tint = ["#26231e", "#ece7db"];
const FAINT: Tint = ["#5f594e", "#b0a999"];
const HAIR: Tint = ["#cbc3b2", "#4a463e"];
const BODY: Tint = ["#d8d0bf", "#4f4a41"];
const PALE: Tint = ["#e8e2d5", "#36332d"];
const RUST: Tint = ["#a03a1c", "#f08a63"];
const SEA: Tint = ["#1f5f78", "#79bdd6"];
const MOSS: Tint = ["#56691f", "#b3c86c"];

type Style = Readonly<Record<string, string | number | Tint>>;

const line = (tint: Tint, width: number, more: Style = {}): Style => ({
  fill: "none",
  stroke: tint,
  "stroke-width": width,
  "stroke-linecap": "round",
  "stroke-linejoin": "round",
  ...more,
});

const text = (size: number, tint: Tint, more: Style = {}): Style => ({
  "font-size": `${size}px`,
  fill: tint,
  ...more,
});

/** A prop's outline, drawn even-odd. */
const outline = (fill: Tint, stroke: Tint, width: number): Style => ({
  fill,
  "fill-rule": "evenodd",
  stroke,
  "stroke-width": width,
  "stroke-linejoin": "round",
});

/** The classes there are, and what each is for. */
const STYLES = {
  /** The ground that all is drawn on. */
  paper: { fill: PAPER },
  /** The prop; the one exposure that is spoken of; and those that only show where others were. */
  body: outline(BODY, INK, 0.8),
  picked: outline(BODY, INK, 1.6),
  ghost: outline(PALE, HAIR, 0.6),
  /** The prop as it once flew, over how it does now: empty and dashed. */
  "body-before": line(SEA, 1.2, { "stroke-dasharray": "4 2.6" }),
  /** The centre of mass's way, and a second one beside it. */
  path: line(INK, 1.1),
  "path-before": line(SEA, 1.1, { "stroke-dasharray": "5 3" }),
  /** The three principal axes: told apart by their dashes where colours are not seen. */
  long: line(RUST, 1.6),
  middle: line(SEA, 1.6, { "stroke-dasharray": "7 3" }),
  short: line(MOSS, 1.6, { "stroke-dasharray": "2 3.2" }),
  /** An axis's end that points to the viewer or away. */
  "long-dot": { fill: RUST },
  "middle-dot": { fill: SEA },
  "short-dot": { fill: MOSS },
  /** What the throw file asks for, and where it was met. */
  asked: line(RUST, 1.2),
  met: { fill: RUST, stroke: PAPER, "stroke-width": 0.8 },
  /** Centre of mass, origin, named points. */
  spot: { fill: INK, stroke: PAPER, "stroke-width": 0.8 },
  "spot-before": line(SEA, 1.2, { fill: PAPER }),
  sight: line(INK, 1.1),
  /** Floors, limits and boxes. */
  floor: line(FAINT, 1.4),
  limit: line(FAINT, 1, { "stroke-dasharray": "6 2.5 1.2 2.5" }),
  box: { ...line(FAINT, 0.9), fill: PALE, "fill-opacity": 0.55 },
  /** Rulers, and lines that part one piece of a sheet from another or lead to a text. */
  rule: line(INK, 1),
  hair: line(HAIR, 0.8),
  lead: line(FAINT, 0.6),
  title: text(FONT_SIZE.title, INK, { "font-weight": 600 }),
  heading: text(FONT_SIZE.heading, INK, { "font-weight": 600 }),
  sentence: text(FONT_SIZE.sentence, INK),
  label: text(FONT_SIZE.label, INK),
  faint: text(FONT_SIZE.label, FAINT),
  small: text(FONT_SIZE.small, FAINT),
  number: text(FONT_SIZE.small, INK, { "font-weight": 600 }),
  "long-text": text(FONT_SIZE.label, RUST),
  "middle-text": text(FONT_SIZE.label, SEA),
  "short-text": text(FONT_SIZE.label, MOSS),
} satisfies Record<string, Style>;

export type Look = keyof typeof STYLES;

const isTint = (value: string | number | Tint): value is Tint => typeof value === "object";

const rule = (name: string, entries: readonly (readonly [string, string | number])[]): string =>
  `.tossbake .${name}{${entries.map(([key, value]) => `${key}:${value}`).join(";")}}`;

/** The rules of all classes; after them the tints for dark surroundings alone. */
export function styleSheet(): string {
  const styles = Object.entries<Style>(STYLES);
  const light = styles.map(([name, style]) =>
    rule(
      name,
      Object.entries(style).map(([key, value]) => [key, isTint(value) ? value[0] : value]),
    ),
  );
  const dark = styles.flatMap(([name, style]) => {
    const tints = Object.entries(style).flatMap(([key, value]): [string, string][] =>
      isTint(value) ? [[key, value[1]]] : [],
    );
    return tints.length > 0 ? [rule(name, tints)] : [];
  });
  return `${light.join("\n")}\n@media (prefers-color-scheme:dark){\n${dark.join("\n")}\n}\n`;
}
