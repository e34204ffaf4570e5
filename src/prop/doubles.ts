import { after } from "./edges.js";
import { pick, type Triangles } from "./weld.js";

/**
 * Triangles over the same three vertices, counted once. What faces one way as often as the other (two-sided faces) bounds
 * nothing and goes to `sheets`, one layer of it; of the rest one triangle stays, facing the way that most do. The balance of
 * each edge is then 0 where it was.
 *
 * @returns undefined where no triangle is doubled
 */
export function withoutDoubles(mesh: Triangles): { single: Triangles; sheets: Triangles } | undefined {
  const { triangles, owners, positions } = mesh;
  // A triangle is found by its lowest vertex, then by its next one in turn, whichever way it faces.
  const head = new Int32Array(positions.length / 3).fill(-1);
  const next = new Int32Array(owners.length).fill(-1);
  const surplus = new Int32Array(owners.length);
  let doubled = false;
  for (let t = 0; t < owners.length; t++) {
    const h = lowestCorner(triangles, t);
    const [low, second, third] = [triangles[h], triangles[after(h)], triangles[after(after(h))]];
    let same = head[low];
    let way = 0;
    for (; same >= 0; same = next[same]) {
      const g = lowestCorner(triangles, same);
      const [b, c] = [triangles[after(g)], triangles[after(after(g))]];
      if (b === second && c === third) way = 1;
      else if (b === third && c === second) way = -1;
      if (way !== 0) break;
    }
    if (way === 0) {
      next[t] = head[low];
      head[low] = t;
      surplus[t] = 1;
      continue;
    }
    doubled = true;
    surplus[same] += way;
    surplus[t] = GONE;
  }
  if (!doubled) return undefined;
  const single: number[] = [];
  const sheets: number[] = [];
  const turned = new Set<number>();
  for (let t = 0; t < owners.length; t++) {
    if (surplus[t] === GONE) continue;
    (surplus[t] === 0 ? sheets : single).push(t);
    if (surplus[t] < 0) turned.add(t);
  }
  return {
    single: turnRound(pick(mesh, single), (i) => turned.has(single[i])),
    sheets: pick(mesh, sheets),
  };
}

const GONE = -0x80000000;

/** The mesh with some triangles facing the other way. */
export function turnRound(mesh: Triangles, which: (t: number) => boolean): Triangles {
  const triangles = mesh.triangles.slice();
  for (let t = 0; t < mesh.owners.length; t++) {
    if (!which(t)) continue;
    triangles[3 * t + 1] = mesh.triangles[3 * t + 2];
    triangles[3 * t + 2] = mesh.triangles[3 * t + 1];
  }
  return { ...mesh, triangles };
}

function lowestCorner(triangles: Uint32Array, t: number): number {
  const [a, b, c] = [triangles[3 * t], triangles[3 * t + 1], triangles[3 * t + 2]];
  return 3 * t + (a < b ? (a < c ? 0 : 2) : b < c ? 1 : 2);
}
