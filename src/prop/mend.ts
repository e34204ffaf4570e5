import { withCaps } from "./caps.js";
import { connectedParts, faultyEdges } from "./closed-parts.js";
import { withoutDoubles } from "./doubles.js";
import { withOneFacing } from "./facing.js";
import { nearWeld } from "./near-weld.js";
import type { Notes } from "./notes.js";
import { isClosed, type Part, split } from "./split.js";
import { boxOf, diagonal } from "./vertex.js";
import { type Triangles, weld } from "./weld.js";

/** How far apart open edges may lie and still be one, as a share of the size of what is open. */
const NEAR = 1e-4;

/**
 * What can be made closed of open parts, and what stays thin surfaces: faces that are there twice count once; open edges within
 * a ten-thousandth of the size are joined; faces are turned to agree with their neighbours; flat openings are capped. Each is noted.
 *
 * @param cap whether openings may be closed; cracks are always
 * @param labelOf where a part is, for the notes
 */
export function mend(
  open: readonly Part[],
  cap: boolean,
  labelOf: (part: Triangles) => string,
  notes: Notes,
): { closed: Part[]; sheets: Triangles[] } {
  const sheets: Triangles[] = [];
  const closed: Part[] = [];
  for (const part of joinedNear(singled(open, sheets, labelOf, notes), labelOf, notes)) {
    const facing = isClosed(part) ? part : turnedToAgree(part, labelOf, notes);
    if (isClosed(facing)) {
      closed.push(facing);
      continue;
    }
    const capped = withCaps(facing, !cap);
    if (!capped) sheets.push(facing);
    else {
      closed.push(capped.part);
      if (capped.openings > 0) notes.add(labelOf(facing), CAPPED, capped.openings);
    }
  }
  return { closed, sheets };
}

type LabelOf = (part: Triangles) => string;

function singled(open: readonly Part[], sheets: Triangles[], labelOf: LabelOf, notes: Notes): Part[] {
  const mesh = open.length === 1 ? open[0] : weld(open);
  const found = withoutDoubles(mesh);
  if (!found) return open.length === 1 ? [...open] : split(mesh);
  const { single, sheets: layers } = found;
  notes.add(labelOf(mesh), DOUBLED, mesh.owners.length - single.owners.length - layers.owners.length);
  if (layers.owners.length > 0) sheets.push(layers);
  return single.owners.length > 0 ? connectedParts(single) : [];
}

function joinedNear(parts: readonly Part[], labelOf: LabelOf, notes: Notes): readonly Part[] {
  const open = parts.filter((part) => !isClosed(part));
  if (open.length === 0) return parts;
  const mesh = open.length === 1 ? open[0] : weld(open);
  const tolerance = NEAR * diagonal(boxOf(mesh.positions));
  const near = connectedParts(nearWeld(mesh, tolerance));
  const gain = faultyEdges(open) - faultyEdges(near);
  if (gain <= 0) return parts;
  notes.add(labelOf(open[0]), JOINED, gain);
  return [...parts.filter(isClosed), ...near];
}

function turnedToAgree(part: Part, labelOf: LabelOf, notes: Notes): Part {
  if (part.contraryEdges === 0) return part;
  const { mesh, turned } = withOneFacing(part);
  const [facing] = split(mesh);
  if (faultyEdges([facing]) >= faultyEdges([part])) return part;
  notes.add(labelOf(part), TURNED, turned);
  return facing;
}

export const DOUBLED = (n: number) => `${n === 1 ? "a face is" : `${n} faces are`} there twice: counted once`;
const JOINED = (n: number) =>
  `${n} open edges lie within a ten-thousandth of the size of others: joined (merge their vertices in the model)`;
const TURNED = (n: number) =>
  `${n === 1 ? "a face looks" : `${n} faces look`} the other way than its neighbours: turned round (turn it in the model)`;
const CAPPED = (n: number) =>
  `not closed: ${n === 1 ? "a flat opening is" : `${n} flat openings are`} capped and the inside is solid; if it is hollow, state wall`;
