/** All takes of a batch on one sheet: small pictures with their figures, and all arcs of each throw over each other. */

import { arcsOver, scaleBar } from "./arcs-over.js";
import { pathOf } from "./course.js";
import { at, type Drawing, stacked, textBlock } from "./drawing.js";
import { counted, seconds, turnsText } from "./figures.js";
import { framed, heading, INNER } from "./sheet-frame.js";
import type { ThrowSheetInput } from "./sheet-input.js";
import { arcScale, CELL, type SmallTake, smallPicture, smallTake } from "./small-take.js";
import { element } from "./svg.js";
import { courseOf, leavesPlane, sideView, viewFromAbove } from "./view.js";

export interface TakesSheetInput {
  /** Whose takes they are: the throw file, or the folder. */
  title: string;
  throws: readonly ThrowSheetInput[];
}

/** Characters that a sheet has at most: below 250 kB with all that is not counted. */
const MOST = 243_000;
/** px, of the arcs over each other. */
const OVER = { width: 226, height: 120 };
const GAP = 18;
const COLUMNS = Math.floor((INNER - OVER.width - GAP) / CELL.width);
/** Pictures of a throw that are measured; from these the size of the others is told beforehand. */
const TRIED = 40;
/** Characters that place a picture, and that a throw has once beside its arcs. */
const PLACING = 44;
const HEAD = 600;
/** Arcs over each other beyond these are a blot. */
const MOST_ARCS = 200;
/** Of its size: paths further out of an upright plane are shown from above too. */
const LEAVES_PLANE = 0.05;

/** SVG of less than 250 kB, however many takes there are: of more it shows the first, and says so. */
export function takesSheet({ title, throws }: TakesSheetInput): string {
  const groups = throws.map((one) => new Group(one));
  const fit = fitting(groups);
  const shown = groups.slice(0, fit.groups);
  const drawings = shown.map((group) => group.draw(fit.takes));
  const [taken, all] = [shown.reduce((sum, g) => sum + Math.min(fit.takes, g.shown), 0), takeTotal(groups)];
  const left =
    taken < all
      ? ` The first ${counted(taken)} of ${counted(all)} takes are shown${shown.length < groups.length ? `, of the first ${counted(shown.length)} throws` : ""}.`
      : "";
  const sentence = `${counted(all)} ${all === 1 ? "take" : "takes"} of ${counted(groups.length)} ${groups.length === 1 ? "throw" : "throws"}. On the left the ways of the centre of mass of all takes over each other, with a cross where each ends; on the right each take from the side, thrown from left to right, and below its arc four poses from release to arrival, larger and in place.${left}`;
  return framed([heading(title, "all takes", sentence), ...drawings], GAP, `${title}: all takes`, sentence);
}

const takeTotal = (groups: readonly Group[]) => groups.reduce((sum, { total }) => sum + total, 0);

/** How many throws have room, and how many takes of each. */
function fitting(groups: readonly Group[]): { groups: number; takes: number } {
  const size = (count: number, takes: number) =>
    groups.slice(0, count).reduce((sum, group) => sum + group.size(takes), 0);
  let count = groups.length;
  while (count > 1 && size(count, 1) > MOST) count--;
  let takes = groups.reduce((greatest, { shown }) => Math.max(greatest, shown), 0);
  while (takes > 1 && size(count, takes) > MOST) takes = Math.min(takes - 1, Math.floor(takes * 0.97));
  return { groups: count, takes };
}

/** A throw's takes; pictures are drawn when they are asked for. */
class Group {
  readonly #input: ThrowSheetInput;
  readonly #takes: SmallTake[];
  readonly #scale: number;
  readonly #pictures: string[] = [];
  readonly #over: Drawing;

  constructor(input: ThrowSheetInput) {
    this.#input = input;
    this.#takes = input.takes.map(smallTake);
    this.#scale = arcScale(this.#takes);
    this.#over = overOf(this.#takes.slice(0, MOST_ARCS));
  }

  /** Takes that are there to be shown, and all there are. */
  get shown(): number {
    return this.#takes.length;
  }
  get total(): number {
    return this.#input.takeCount ?? this.#takes.length;
  }

  /** Characters of what is drawn of so many takes. */
  size(takes: number): number {
    const count = Math.min(takes, this.#takes.length);
    const tried = Math.min(TRIED, count);
    let sum = 0;
    for (let i = 0; i < tried; i++) sum += this.#picture(i).length + PLACING;
    return this.#over.body.length + HEAD + (tried === 0 ? 0 : (sum * count) / tried);
  }

  draw(most: number): Drawing {
    const count = Math.min(most, this.#takes.length);
    const cells = Array.from({ length: count }, (_, i) =>
      element(
        "g",
        { transform: `translate(${(i % COLUMNS) * CELL.width} ${Math.floor(i / COLUMNS) * CELL.height})` },
        this.#picture(i),
      ),
    );
    const rows = Math.ceil(count / COLUMNS);
    const bar = Number.isFinite(this.#scale) ? [scaleBar(4, rows * CELL.height + 4, this.#scale, "")] : [];
    const grid: Drawing = {
      width: COLUMNS * CELL.width,
      height: rows * CELL.height + 12,
      body: element("g", { "text-anchor": "middle" }, `\n${cells.join("\n")}\n`) + bar.join(""),
    };
    const left = this.#over;
    const both: Drawing = {
      width: INNER,
      height: Math.max(left.height, grid.height),
      body: `${at(0, 0, left)}\n${at(OVER.width + GAP, 0, grid)}`,
    };
    return stacked(
      [
        textBlock(
          [
            { text: this.#input.title, look: "heading" },
            { text: this.#figures(count), look: "faint" },
          ],
          INNER,
        ),
        both,
      ],
      6,
    );
  }

  #figures(count: number): string {
    const { prop } = this.#input;
    const [times, turns] = [
      this.#takes.map(({ take }) => take.motion.duration),
      this.#takes.map((one) => one.turns),
    ];
    const which =
      count < this.total
        ? `first ${counted(count)} of ${counted(this.total)} takes`
        : `${counted(count)} ${count === 1 ? "take" : "takes"}`;
    return `${prop.name}, ${which}: ${range(times, seconds)}, ${range(turns, turnsText)}`;
  }

  #picture(i: number): string {
    this.#pictures[i] ??= smallPicture(this.#input.prop, this.#takes[i], this.#scale);
    return this.#pictures[i];
  }
}

function overOf(takes: readonly SmallTake[]): Drawing {
  const travelling = takes.filter(({ stretches }) => stretches.some(({ travels }) => travels));
  if (travelling.length === 0)
    return textBlock([{ text: "The turning alone: there are no arcs.", look: "faint" }], OVER.width);
  const paths = travelling.map(({ take, stretches }) =>
    stretches.flatMap((stretch) => pathOf(take.motion, stretch, 8)),
  );
  const ahead = courseOf(paths[0]);
  const side = arcsOver(travelling, sideView(ahead), OVER.width, OVER.height);
  const all = paths.flat();
  if (!leavesPlane(all, ahead, LEAVES_PLANE)) return side;
  return stacked([side, arcsOver(travelling, viewFromAbove(ahead), OVER.width, OVER.height)], 6);
}

function range(values: readonly number[], text: (value: number) => string): string {
  const least = text(values.reduce((a, b) => Math.min(a, b)));
  const most = text(values.reduce((a, b) => Math.max(a, b)));
  return least === most ? least : `${least.replace(/\s\D+$/, "")} to ${most}`;
}
