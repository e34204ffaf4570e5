/** Reads a sheet as a person does who has only the picture: elements in place, its rulers, and what a renderer makes of them. */

import { Resvg } from "@resvg/resvg-js";

export interface Drawn {
  tag: string;
  attributes: Record<string, string>;
  /** Its text, or none. */
  text: string;
  /** How far its groups move it, px. */
  right: number;
  down: number;
  /** Where it stands in the SVG. */
  from: number;
}

/** In drawing order, groups left out. */
export function elementsOf(svg: string): Drawn[] {
  const moves: [number, number][] = [[0, 0]];
  const drawn: Drawn[] = [];
  for (const match of svg.matchAll(/<(\/?)(\w+)([^>]*?)(\/?)>([^<]*)/g)) {
    const [, closing, tag, written, , text] = match;
    if (tag !== "g") {
      if (closing) continue;
      const [right, down] = moves[moves.length - 1];
      drawn.push({ tag, attributes: attributesOf(written), text, right, down, from: match.index });
    } else if (closing) moves.pop();
    else {
      const [right, down] = moves[moves.length - 1];
      const move = /translate\((\S+) (\S+)\)/.exec(written) ?? ["", "0", "0"];
      moves.push([right + Number(move[1]), down + Number(move[2])]);
    }
  }
  return drawn;
}

const attributesOf = (written: string): Record<string, string> =>
  Object.fromEntries(Array.from(written.matchAll(/([\w-]+)="([^"]*)"/g), ([, key, value]) => [key, value]));

export const classOf = ({ attributes }: Drawn): string => attributes.class ?? "";

/** The outlines along the arc: all before the turning row. */
export function arcOutlines(svg: string): Drawn[] {
  const elements = elementsOf(svg);
  const row = elements.findIndex(({ text }) => text.startsWith("The same poses"));
  return elements.slice(0, row).filter((one) => ["body", "picked"].includes(classOf(one)));
}

/** px on the sheet of a place that is so far along the throw and so high, as the rulers have it, and their scales, px a metre. */
export function rulersOf(svg: string) {
  const elements = elementsOf(svg);
  const row = elements.findIndex(({ text }) => text.startsWith("The same poses"));
  const figures = elements
    .slice(0, row)
    .filter((one) => classOf(one) === "small" && /^-?[\d.]+$/.test(one.text));
  const along = figures.filter(({ attributes }) => attributes["text-anchor"] === "middle");
  const up = figures.filter(({ attributes }) => attributes["text-anchor"] === "end");
  const x = line(along.map(({ attributes, right, text }) => [Number(text), Number(attributes.x) + right]));
  // a figure's middle is this far above its baseline: as high as digits are in common faces, half of that (from memory)
  const y = line(
    up.map(({ attributes, down, text }) => [Number(text), Number(attributes.y) + down - 0.36 * 10.5]),
  );
  return { x, y };
}

function line(points: [number, number][]): { at(value: number): number; scale: number } {
  const [first, last] = [points[0], points[points.length - 1]];
  const scale = (last[1] - first[1]) / (last[0] - first[0]);
  return { scale, at: (value) => first[1] + scale * (value - first[0]) };
}

export interface Pixels {
  width: number;
  height: number;
  /** 0 to 255 each, row by row. */
  alpha: Uint8Array;
}

/** What a renderer draws of the sheet without its paper; with `only`, of the elements of that class alone. */
export function rendered(svg: string, { only, margin = 0 }: { only?: string; margin?: number } = {}): Pixels {
  const [, width, height] = /viewBox="0 0 (\S+) ([^"]+)"/.exec(svg)!.map(Number);
  const hidden = only
    ? `.tossbake *{visibility:hidden}.tossbake .${only}{visibility:visible;stroke:none}`
    : "";
  const framed = svg
    .replace(/width="\S+" height="\S+" viewBox="[^"]*"/, () => {
      const [w, h] = [width + 2 * margin, height + 2 * margin];
      return `width="${w}" height="${h}" viewBox="${-margin} ${-margin} ${w} ${h}"`;
    })
    .replace("</style>", `.tossbake .paper{visibility:hidden}${hidden}</style>`);
  const image = new Resvg(framed, { font: { loadSystemFonts: !only } }).render();
  const { pixels } = image;
  const alpha = new Uint8Array(image.width * image.height);
  for (let i = 0; i < alpha.length; i++) alpha[i] = pixels[4 * i + 3];
  return { width: image.width, height: image.height, alpha };
}

/** The sheet with a class more on one of its elements. */
export const withClass = (svg: string, { from }: Drawn, name: string): string =>
  svg.slice(0, from) + svg.slice(from).replace('class="', `class="${name} `);

/** px, of what is drawn. */
export function centroid({ width, alpha }: Pixels): [number, number] {
  let [sum, x, y] = [0, 0, 0];
  alpha.forEach((value, i) => {
    const column = i % width;
    sum += value;
    x += value * (column + 0.5);
    y += value * ((i - column) / width + 0.5);
  });
  return [x / sum, y / sum];
}

/** How many pieces hang together, over edges and corners. */
export function pieces({ width, height, alpha }: Pixels): number {
  const seen = new Uint8Array(alpha.length);
  let count = 0;
  for (let start = 0; start < alpha.length; start++) {
    if (alpha[start] < 128 || seen[start]) continue;
    count++;
    const stack = [start];
    seen[start] = 1;
    while (stack.length > 0) {
      const i = stack.pop()!;
      const [column, row] = [i % width, Math.floor(i / width)];
      for (let dy = -1; dy <= 1; dy++)
        for (let dx = -1; dx <= 1; dx++) {
          const [c, r] = [column + dx, row + dy];
          const j = r * width + c;
          if (c < 0 || r < 0 || c >= width || r >= height || seen[j] || alpha[j] < 128) continue;
          seen[j] = 1;
          stack.push(j);
        }
    }
  }
  return count;
}
