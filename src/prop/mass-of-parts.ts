import { isInside } from "./inside.js";
import { type MassProperties, scaleDensity } from "./mass.js";
import type { Notes } from "./notes.js";
import { overlap } from "./overlap.js";
import { solidIntegrals } from "./solid.js";
import type { Part } from "./split.js";
import { type Box, boxOf, diagonal, triangleArea, vertex } from "./vertex.js";

/** What the surface a part comes from is made of. */
export interface Substance {
  /** kg/m³ */
  readonly density: number;
  /** For messages: `node "arm", material "steel"`. */
  readonly label: string;
}

/** Volume over (area × size) below which a closed part is flat. */
const FLAT = 1e-12;
/** Share of the mass that may be counted twice unsaid. */
const OVERLAP = 1e-3;

/**
 * Bodies of closed parts. A part that faces inwards is a cavity where it lies in another part, and else is inside
 * out and turned round, with all within it that comes from the same surface. Masses of parts that overlap add; that is noted.
 *
 * @param substances by surface, as `owners` of the parts count them
 * @returns `flat`: the parts that have no volume, not weighed
 */
export function massOfParts(
  parts: readonly Part[],
  substances: readonly Substance[],
  notes: Notes,
): { bodies: MassProperties[]; flat: Part[] } {
  const solids: Solid[] = [];
  const flat: Part[] = [];
  for (const part of parts) {
    const integrals = solidIntegrals(part.positions, part.triangles);
    const box = boxOf(part.positions);
    if (isFlat(part, integrals.volume, diagonal(box))) {
      flat.push(part);
      continue;
    }
    const { surface, mixed } = mainSurface(part, substances);
    const { density, label } = substances[surface];
    if (mixed) notes.add(`${label}, ${density} kg/m³`, MIXED);
    solids.push({ part, integrals, box, surface, density, sign: Math.sign(integrals.volume), within: [] });
  }
  if (solids.some((solid) => solid.sign < 0)) settleSides(solids, substances, notes);
  const bodies = solids.map(bodyOf);
  noteOverlap(solids, bodies, substances, notes);
  return { bodies, flat };
}

interface Solid {
  readonly part: Part;
  /** Of density 1; below zero where the part faces inwards. */
  readonly integrals: MassProperties;
  readonly box: Box;
  readonly surface: number;
  readonly density: number;
  /** 1: matter; -1: a cavity (before `settleSides`: faces inwards). */
  sign: number;
  /** The parts around it, the innermost first. */
  readonly within: Solid[];
}

const MIXED = (n: number) =>
  `${n === 1 ? "a solid has" : `${n} solids have`} faces of other densities too: weighed as that of the greater area throughout; state one density, or mass`;
const INSIDE_OUT = (n: number) =>
  `${n === 1 ? "a part is" : `${n} parts are`} inside out: turned round (turn its faces in the model)`;

/** Decides what is matter and what a cavity. */
function settleSides(solids: readonly Solid[], substances: readonly Substance[], notes: Notes): void {
  const size = (solid: Solid) => Math.abs(solid.integrals.volume);
  const largestFirst = [...solids].sort((a, b) => size(b) - size(a));
  for (const [n, solid] of largestFirst.entries())
    for (let m = n - 1; m >= 0; m--) if (contains(largestFirst[m], solid)) solid.within.push(largestFirst[m]);
  const faces = new Map(solids.map((solid) => [solid, solid.sign]));
  for (const solid of solids) {
    const outermost = solid.within.at(-1) ?? solid;
    if (outermost !== solid && outermost.surface !== solid.surface) continue;
    if (faces.get(outermost) === 1) continue;
    solid.sign = -solid.sign;
    if (outermost === solid) notes.add(substances[solid.surface].label, INSIDE_OUT);
  }
}

/** A cavity takes away what the innermost solid around it is made of. */
function bodyOf(solid: Solid): MassProperties {
  const density = solid.sign < 0 ? solid.within.find((around) => around.sign > 0)!.density : solid.density;
  const turned = turnedBy(solid);
  return { ...scaleDensity(solid.integrals, turned * density), volume: turned * solid.integrals.volume };
}

const turnedBy = (solid: Solid) => solid.sign * Math.sign(solid.integrals.volume);

function contains(outer: Solid, inner: Solid): boolean {
  for (let i = 0; i < 3; i++)
    if (inner.box.low[i] < outer.box.low[i] || inner.box.high[i] > outer.box.high[i]) return false;
  const { positions, triangles } = inner.part;
  return isInside(vertex(positions, triangles[0]), outer.part.positions, outer.part.triangles);
}

function noteOverlap(
  solids: readonly Solid[],
  bodies: readonly MassProperties[],
  substances: readonly Substance[],
  notes: Notes,
): void {
  const found = overlap(
    solids.map((solid) => ({
      positions: solid.part.positions,
      triangles: solid.part.triangles,
      sign: turnedBy(solid),
      density: solid.density,
    })),
  );
  const share = found ? found.mass / bodies.reduce((sum, { mass }) => sum + mass, 0) : 0;
  if (!found || share < OVERLAP) return;
  const [one, two] = found.pair.map((n) => substances[solids[n].surface].label);
  const percent = Number((100 * share).toPrecision(share < 0.1 ? 1 : 2));
  notes.add(
    one === two ? one : `${one}; ${two}`,
    () =>
      `parts overlap, and each counts: about ${percent} % of the mass is counted twice; density 0 leaves a node or material out`,
  );
}

function isFlat({ positions, triangles, owners }: Part, volume: number, size: number): boolean {
  // No triangle has more than half the square of the size: as a rule that says it without a look at them.
  if (Math.abs(volume) > FLAT * owners.length * size * size * size) return false;
  let area = 0;
  for (let t = 0; t < owners.length; t++) area += triangleArea(positions, triangles, t);
  return !(Math.abs(volume) > FLAT * area * size);
}

/** The surface that makes up most of a part, and whether the others are of another density. */
function mainSurface(
  { positions, triangles, owners }: Part,
  substances: readonly Substance[],
): { surface: number; mixed: boolean } {
  if (owners.every((owner) => owner === owners[0])) return { surface: owners[0], mixed: false };
  const areas = new Map<number, number>();
  owners.forEach((owner, t) => {
    areas.set(owner, (areas.get(owner) ?? 0) + triangleArea(positions, triangles, t));
  });
  let surface = owners[0];
  for (const [owner, area] of areas) if (area > areas.get(surface)!) surface = owner;
  const { density } = substances[surface];
  return { surface, mixed: [...areas.keys()].some((owner) => substances[owner].density !== density) };
}
