import { kindOf } from "../prop/kind.js";
import type { Prop } from "../prop/prop.js";
import { throwAboutInShort } from "./axis-words.js";
import { at, type Drawing, stacked, textBlock } from "./drawing.js";
import { FONT_SIZE } from "./look.js";
import type { Solid } from "./outline.js";
import { principalViews } from "./principal-views.js";
import { spotsBeyond } from "./spots.js";
import { element, pathData, sheetSvg, textAt } from "./svg.js";
import { wrapped } from "./text-size.js";

export interface WeighSheetProp {
  prop: Prop;
  solid: Solid;
}

const WIDTH = 760;
const MARGIN = 32;
const INNER = WIDTH - 2 * MARGIN;
const AXES = ["long", "middle", "short"] as const;

/**
 * Props seen along their principal axes, each in one true scale: axes, centre of mass, the model's origin, named points, and what a
 * throw about each axis does. SVG.
 */
export function weighSheet(title: string, props: readonly WeighSheetProp[]): string {
  const blocks = props.map((shown) => block(shown));
  const all = stacked([heading(title), ...blocks], 34);
  return sheetSvg({
    width: WIDTH,
    height: Math.ceil(all.height) + 2 * MARGIN,
    title,
    description: props.map(({ prop }) => described(prop)).join(" "),
    body: [at(MARGIN, MARGIN, all)],
  });
}

function heading(title: string): Drawing {
  const lines = wrapped(title, FONT_SIZE.title, INNER, true);
  const height = 1.3 * FONT_SIZE.title * lines.length;
  return {
    width: INNER,
    height,
    body: lines
      .map((line, i) => textAt(0, FONT_SIZE.title * (1 + 1.3 * i), line, { class: "title" }))
      .join("\n"),
  };
}

function block({ prop, solid }: WeighSheetProp): Drawing {
  const { scale, ...views } = principalViews(prop, solid, INNER);
  const beyond = spotsBeyond(prop).map(
    ({ name, distance }) =>
      `The ${name} lies ${figures(distance)} m from the centre of mass, outside the picture.`,
  );
  return stacked(
    [
      textBlock(
        [
          { text: prop.name, look: "heading" },
          { text: facts(prop), look: "label" },
          { text: kindOf(prop.principal.moments).kind, look: "label" },
          ...beyond.map((text) => ({ text, look: "faint" as const })),
        ],
        INNER,
      ),
      views,
      ruler(scale),
      axisTable(prop),
    ],
    12,
  );
}

const facts = (prop: Prop): string =>
  `${figures(prop.mass)} kg, ${prop.size.map(figures).join(" × ")} m along the model’s x, y, z; reaches ${figures(prop.reach)} m from its centre of mass`;

/** A line of each axis's look, its moment, and what a throw about it does. */
function axisTable(prop: Prop): Drawing {
  const { axes } = kindOf(prop.principal.moments);
  const row = 20;
  const body = AXES.flatMap((name, i) => {
    const y = row * i + 14;
    return [
      element("path", { class: name, d: pathData([[0, y - 4, 34, y - 4]]) }),
      textAt(44, y, name, { class: `${name}-text` }),
      textAt(100, y, `${figures(prop.principal.moments[i])} kg m²`, { class: "label" }),
      textAt(230, y, `a throw about it ${throwAboutInShort(axes[name])}`, { class: "label" }),
    ];
  });
  return { width: INNER, height: row * AXES.length, body: body.join("\n") };
}

const LENGTHS = [1, 2, 5].flatMap((digit) =>
  [-4, -3, -2, -1, 0, 1, 2, 3].map((power) => Number(`${digit}e${power}`)),
);
/** px: a ruler is no longer. */
const LONGEST = 240;

/** The longest round length that is not too long, in tenths or quarters of it. */
function ruler(scale: number): Drawing {
  const fitting = LENGTHS.filter((length) => length * scale <= LONGEST);
  const length = fitting.length > 0 ? Math.max(...fitting) : LONGEST / scale;
  const wide = length * scale;
  const ticks = Array.from({ length: 11 }, (_, i) => {
    const x = (wide * i) / 10;
    return [x, 6, x, i % 5 === 0 ? 0 : 3];
  });
  return {
    width: wide,
    height: 12,
    body: [
      element("path", { class: "rule", d: pathData([[0, 6, wide, 6], ...ticks], { decimals: 1 }) }),
      textAt(wide + 10, 10, lengthText(length), { class: "label" }),
    ].join("\n"),
  };
}

function lengthText(length: number): string {
  if (length >= 1) return `${figures(length)} m`;
  return length >= 0.01 ? `${figures(length * 100)} cm` : `${figures(length * 1000)} mm`;
}

function described(prop: Prop): string {
  const { axes } = kindOf(prop.principal.moments);
  const throws = AXES.map((name) => `about ${name} it ${throwAboutInShort(axes[name])}`).join(", ");
  return `${prop.name}, ${facts(prop)}, seen along its short, middle and long principal axes with its centre of mass, the model’s origin and its named points. A throw ${throws}.`;
}

const figures = (value: number): string => String(Number(value.toPrecision(3)));
