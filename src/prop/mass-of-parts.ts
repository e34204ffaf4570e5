import { RequestError } from "../math/request-error.js";
import { cross, length, subtract } from "../math/vec3.js";
import type { Part } from "./closed-parts.js";
import { isInside } from "./inside.js";
import { combine, type MassProperties, scaleDensity } from "./mass.js";
import { solidIntegrals } from "./solid.js";
import { vertex } from "./vertex.js";

/** What the surface a part comes from is made of. */
export interface Substance {
  /** kg/m³ */
  readonly density: number;
  /** For messages: `node "arm", material "steel"`. */
  readonly label: string;
}

/** Volume over (area × size) below which a closed part is flat. */
const FLAT = 1e-12;

/**
 * Mass properties of closed parts. A part that faces inwards is a cavity where it lies in another part, and else is inside
 * out and turned round, with all within it that comes from the same surface. Masses of parts that overlap add.
 *
 * @param substances by surface, as `owners` of the parts count them
 * @throws RequestError at ["model"] where nothing has a volume
 */
export function massOfParts(
  parts: readonly Part[],
  substances: readonly Substance[],
): { body: MassProperties; warnings: string[] } {
  const warnings = new Set<string>();
  const solids: Solid[] = [];
  for (const part of parts) {
    const integrals = solidIntegrals(part.positions, part.triangles);
    const { surface, mixed } = mainSurface(part, substances);
    const { density, label } = substances[surface];
    const box = boxOf(part);
    if (!(Math.abs(integrals.volume) > FLAT * areaOf(part) * length(subtract(box.high, box.low)))) {
      warnings.add(`${label}: a closed part is flat: it has no volume and weighs nothing`);
      continue;
    }
    if (mixed)
      warnings.add(
        `${label}: a solid with faces of other densities too: weighed as ${density} kg/m³ throughout`,
      );
    solids.push({ part, integrals, box, surface, density, sign: Math.sign(integrals.volume), within: [] });
  }
  if (solids.length === 0)
    throw new RequestError(
      ["model"],
      "is flat: its closed parts have no volume",
      "give it a thickness, or state mass, centerOfMass and inertia",
    );
  if (solids.some((solid) => solid.sign < 0))
    for (const message of settleSides(solids, substances)) warnings.add(message);
  const body = combine(solids.map(bodyOf));
  if (!(body.mass > 0))
    throw new RequestError(
      ["model"],
      `weighs ${body.mass} kg: its cavities are larger than what they lie in`,
      "make each cavity lie within the solid around it",
    );
  return { body, warnings: [...warnings] };
}

interface Box {
  low: [number, number, number];
  high: [number, number, number];
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
  within: Solid[];
}

/** Decides what is matter and what a cavity; returns warnings. */
function settleSides(solids: readonly Solid[], substances: readonly Substance[]): string[] {
  const warnings: string[] = [];
  const size = (solid: Solid) => Math.abs(solid.integrals.volume);
  for (const solid of solids)
    solid.within = solids
      .filter((other) => other !== solid && size(other) > size(solid) && contains(other, solid))
      .sort((a, b) => size(a) - size(b));
  const faces = new Map(solids.map((solid) => [solid, solid.sign]));
  for (const solid of solids) {
    const outermost = solid.within.at(-1) ?? solid;
    if (outermost !== solid && outermost.surface !== solid.surface) continue;
    if (faces.get(outermost) === 1) continue;
    solid.sign = -solid.sign;
    if (outermost === solid)
      warnings.push(`${substances[solid.surface].label}: a part is inside out: turned round`);
  }
  return warnings;
}

/** A cavity takes away what the innermost solid around it is made of. */
function bodyOf(solid: Solid): MassProperties {
  const density = solid.sign < 0 ? solid.within.find((around) => around.sign > 0)!.density : solid.density;
  const turned = solid.sign * Math.sign(solid.integrals.volume);
  return { ...scaleDensity(solid.integrals, turned * density), volume: turned * solid.integrals.volume };
}

function contains(outer: Solid, inner: Solid): boolean {
  for (let i = 0; i < 3; i++)
    if (inner.box.low[i] < outer.box.low[i] || inner.box.high[i] > outer.box.high[i]) return false;
  const { positions, triangles } = inner.part;
  return isInside(vertex(positions, triangles[0]), outer.part.positions, outer.part.triangles);
}

/** The surface that makes up most of a part, and whether the others are of another density. */
function mainSurface(part: Part, substances: readonly Substance[]): { surface: number; mixed: boolean } {
  const areas = new Map<number, number>();
  part.owners.forEach((owner, t) => {
    areas.set(owner, (areas.get(owner) ?? 0) + triangleArea(part, t));
  });
  let surface = part.owners[0];
  for (const [owner, area] of areas) if (area > areas.get(surface)!) surface = owner;
  const { density } = substances[surface];
  return { surface, mixed: [...areas.keys()].some((owner) => substances[owner].density !== density) };
}

const areaOf = (part: Part) => part.owners.reduce((sum, _, t) => sum + triangleArea(part, t), 0);

function triangleArea({ positions, triangles }: Part, t: number): number {
  const a = vertex(positions, triangles[3 * t]);
  const b = vertex(positions, triangles[3 * t + 1]);
  const c = vertex(positions, triangles[3 * t + 2]);
  return length(cross(subtract(b, a), subtract(c, a))) / 2;
}

function boxOf({ positions, triangles }: Part): Box {
  const box: Box = {
    low: [Infinity, Infinity, Infinity],
    high: [-Infinity, -Infinity, -Infinity],
  };
  for (const index of triangles)
    for (let i = 0; i < 3; i++) {
      box.low[i] = Math.min(box.low[i], positions[3 * index + i]);
      box.high[i] = Math.max(box.high[i], positions[3 * index + i]);
    }
  return box;
}
