/** A small bake as the preview page is told of it. */

import { bake } from "../../src/bake/bake.js";
import { recordOf } from "../../src/record/record-of.js";
import { type PageData, pageData } from "../../src/review/page-data.js";
import { parseThrowFile } from "../../src/throwfile/parse.js";

export const THROWS = `
seed: page
props:
  plank: { shape: { box: [0.5, 0.2, 0.05] }, density: 650 }
throws:
  lob:
    prop: plank
    takes: 6
    release: { at: [0, 1.2, 0], scatter: 0..5 }
    arrive: { at: [0, 1, 3], after: 0.8..1 }
    spin: { axis: short, turns: 2.5, wobble: 5..15 }
    hold: { before: 6f, after: 3f }
  drop:
    prop: plank
    takes: 2
    release: { at: [0, 2, 0], velocity: [0, 0, 0.5] }
    arrive: { after: 0.5 }
    spin: { axis: long, rate: 0.3..0.5 }
  back:
    prop: plank
    takes: 6
    release: { at: [0, 1, 3] }
    arrive: { at: [0, 1.2, 0], after: 0.8 }
    spin: { axis: short, turns: 1 }
chains:
  pair: { throws: [lob, back] }
`;

export async function bakedPage(text = THROWS): Promise<PageData> {
  const file = parseThrowFile("page.throws.yaml", text);
  const baked = await bake(file, () => Promise.reject(new Error("there is no model")));
  return pageData(file, baked, await recordOf(file, text, baked));
}

/** As it comes to the page: through JSON. */
export const sent = (data: PageData): PageData => JSON.parse(JSON.stringify(data));
