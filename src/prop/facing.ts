import { turnRound } from "./doubles.js";
import { eachEdge } from "./edges.js";
import { triangleArea } from "./vertex.js";
import type { Triangles } from "./weld.js";

/**
 * The mesh with its triangles turned so that neighbours face the same side, as far as a side can be carried over edges of
 * two triangles; in each such patch the way that the greater area faces is kept. `turned`: how many triangles.
 */
export function withOneFacing(mesh: Triangles): { mesh: Triangles; turned: number } {
  const { triangles, owners, positions } = mesh;
  // Neighbour over each half edge, and whether the two face different sides.
  const neighbour = new Int32Array(triangles.length).fill(-1);
  const contrary = new Uint8Array(triangles.length);
  eachEdge(triangles, positions.length / 3, (first, link) => {
    const second = link[first];
    if (second < 0 || link[second] >= 0) return;
    neighbour[first] = Math.trunc(second / 3);
    neighbour[second] = Math.trunc(first / 3);
    contrary[first] = contrary[second] = triangles[first] === triangles[second] ? 1 : 0;
  });
  // 1: as it is, -1: turned; 0: not yet reached.
  const facing = new Int8Array(owners.length);
  let turned = 0;
  for (let seed = 0; seed < owners.length; seed++) {
    if (facing[seed] !== 0) continue;
    facing[seed] = 1;
    const patch = [seed];
    let balance = 0;
    for (let n = 0; n < patch.length; n++) {
      const t = patch[n];
      balance += facing[t] * triangleArea(positions, triangles, t);
      for (let h = 3 * t; h < 3 * t + 3; h++) {
        const other = neighbour[h];
        if (other < 0 || facing[other] !== 0) continue;
        facing[other] = contrary[h] ? -facing[t] : facing[t];
        patch.push(other);
      }
    }
    if (balance < 0) for (const t of patch) facing[t] = -facing[t];
    for (const t of patch) if (facing[t] < 0) turned++;
  }
  return { mesh: turned > 0 ? turnRound(mesh, (t) => facing[t] < 0) : mesh, turned };
}
