import { RequestError } from "../math/request-error.js";
import { cross, dot, normalize, subtract } from "../math/vec3.js";
import { findParts } from "./closed-parts.js";
import { withoutDoubles } from "./doubles.js";
import { withoutLayers } from "./layers.js";
import { combine, type MassProperties } from "./mass.js";
import { massOfHull } from "./mass-of-hull.js";
import { massOfParts, type Substance } from "./mass-of-parts.js";
import { massOfWalls, type Walls } from "./mass-of-walls.js";
import { DOUBLED, mend } from "./mend.js";
import { Notes } from "./notes.js";
import { boxOf, diagonal, vertex } from "./vertex.js";
import { type Triangles, weld } from "./weld.js";

/** What counts as matter. */
export interface Solidity {
  readonly solid: "auto" | "hull" | "surface";
  /** Thickness of thin surfaces, in the lengths of the surfaces. */
  readonly wall: number;
  /** Then what is open is a thin surface, and no opening is capped. */
  readonly isWallStated: boolean;
}

/** m */
export const USUAL_WALL = 0.002;

type LabelOf = (mesh: Triangles) => string;

/**
 * Mass properties of surfaces, and warnings about all that is not plainly a solid.
 *
 * @param meshes of the surfaces, each welded
 * @param substances by surface, as `owners` of the meshes count them
 * @throws RequestError at ["model"] for what is flat throughout and no `wall` stated, and for cavities larger than what is around them
 */
export function massOfSurfaces(
  meshes: readonly Triangles[],
  substances: readonly Substance[],
  solidity: Solidity,
): { body: MassProperties; warnings: string[] } {
  const notes = new Notes();
  const labelOf: LabelOf = ({ owners }) => substances[owners[0]].label;
  const { bodies, walls } =
    solidity.solid === "hull"
      ? { bodies: [massOfHull(meshes, substances, notes)], walls: [] }
      : solidity.solid === "surface"
        ? { bodies: [], walls: [{ mesh: oneLayer(meshes, labelOf, notes), share: 1 }] }
        : solidsAndWalls(meshes, substances, solidity.isWallStated, labelOf, notes);
  const all = [...bodies, ...massOfWalls(walls, substances, solidity.wall)];
  const body = all.length > 0 ? combine(all) : undefined;
  if (!body || !(body.mass > 0))
    throw new RequestError(
      ["model"],
      body
        ? `weighs ${body.mass} kg: its cavities are larger than what they lie in`
        : "has no faces with an area",
      "make each cavity lie within the solid around it, or use a shape, or state mass, centerOfMass and inertia",
    );
  const warnings = notes.list();
  if (solidity.isWallStated && walls.length === 0)
    warnings.push(
      `wall changes nothing: ${solidity.solid === "hull" ? "the hull is" : "all parts are closed, and"} solid; solid: surface makes thin walls of the faces`,
    );
  return { body, warnings };
}

/** All triangles, each place once. */
function oneLayer(meshes: readonly Triangles[], labelOf: LabelOf, notes: Notes): Triangles {
  const mesh = weld(meshes);
  const found = withoutDoubles(mesh);
  if (!found) return mesh;
  const layer = weld([found.single, found.sheets]);
  notes.add(labelOf(mesh), DOUBLED, mesh.owners.length - layer.owners.length);
  return layer;
}

function solidsAndWalls(
  meshes: readonly Triangles[],
  substances: readonly Substance[],
  isWallStated: boolean,
  labelOf: LabelOf,
  notes: Notes,
): { bodies: MassProperties[]; walls: Walls[] } {
  const { closed, open } = findParts(meshes);
  const parts = closed.map((part) => withoutLayers(part));
  const layers = parts.flatMap((part) => part.layers);
  parts.forEach(({ repeats }, n) => {
    if (repeats > 0) notes.add(labelOf(closed[n]), DOUBLED, repeats);
  });
  const mended = mend(open, !isWallStated, labelOf, notes);
  const { bodies, flat } = massOfParts(
    [...parts.flatMap(({ solids }) => solids), ...mended.closed],
    substances,
    notes,
  );
  if (!isWallStated && bodies.length === 0 && open.length === 0) refuseFlat([...flat, ...layers]);
  if (!isWallStated) {
    for (const sheet of mended.sheets) notes.add(labelOf(sheet), OPEN);
    for (const sheet of [...flat, ...layers]) notes.add(labelOf(sheet), FLAT);
  }
  return {
    bodies,
    walls: [
      ...[...mended.sheets, ...layers].map((mesh) => ({ mesh, share: 1 })),
      // Both its sides are there.
      ...flat.map((mesh) => ({ mesh, share: 0.5 })),
    ],
  };
}

const OPEN = (n: number) =>
  `not closed: ${n === 1 ? "an open part is" : `${n} open parts are`} taken as a thin surface of ${USUAL_WALL} m; state wall, or solid: hull, or close it in the model`;
const FLAT = (n: number) =>
  `${n === 1 ? "a part has" : `${n} parts have`} no thickness: taken as a thin surface of ${USUAL_WALL} m; state wall`;

/** Faces that lie on one another in one plane are no card but a solid gone flat: a scale of 0, say. */
function refuseFlat(meshes: readonly Triangles[]): void {
  if (meshes.length === 0) return;
  const [first] = meshes;
  const [a, b, c] = [0, 1, 2].map((k) => vertex(first.positions, first.triangles[k]));
  const normal = normalize(cross(subtract(b, a), subtract(c, a)));
  for (const { positions, triangles } of meshes) {
    const tolerance = FLATNESS * diagonal(boxOf(positions));
    for (const v of triangles)
      if (Math.abs(dot(subtract(vertex(positions, v), a), normal)) > tolerance) return;
  }
  throw new RequestError(
    ["model"],
    "is flat: its faces lie on one another and enclose nothing",
    "give it a thickness in the model, or state wall (m): then it is a thin surface",
  );
}

/** Distance from one plane, over the size, that is rounding. */
const FLATNESS = 1e-6;
