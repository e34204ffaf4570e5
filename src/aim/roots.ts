import { findRoot } from "../math/roots.js";
import { scale, type Vec3 } from "../math/vec3.js";
import { type Bounds, type Cell, lead, linkBetween, type Sample, type SampleAt } from "./grid.js";

const TURN = 2 * Math.PI;

/** Steps of the golden section towards a crest: it is known to 1e-4 of the cells about it, its height to about the square of that. */
const CREST_STEPS = 20;
const GOLDEN = (Math.sqrt(5) - 1) / 2;

/**
 * Every momentum (ordered principal frame, whole flight as unit of time) whose motion ends in the end pose, within the cells and a number of
 * turns: in each cell and for each number of polhode periods, wherever the motion turns a whole number of turns past the pose.
 */
export function momenta(
  cells: readonly Cell[],
  sampleAt: SampleAt,
  { leastTurns, mostTurns }: Bounds,
): Vec3[] {
  const found: Vec3[] = [];
  const keep = (cell: Cell, winding: number, target: number, from: number, to: number): void => {
    const past = leadFrom(cell, winding, sampleAt);
    const angle = findRoot((x) => past(x).lead - target, from, to);
    const { sample, time } = past(angle);
    const turns = Math.abs(sample.polhode.energy * time) / TURN;
    if (turns >= leastTurns && turns <= mostTurns) found.push(scale(sample.momentum, time));
  };
  cells.forEach((cell, i) => {
    for (let winding = cell.windings[0]; winding <= cell.windings[1]; winding++) {
      if (isBeyond(cell, winding, leastTurns, mostTurns)) continue;
      const start = lead(cell.left, winding);
      const end = lead(cell.right, winding + cell.link.winding) - cell.link.azimuth;
      const [low, high] = start < end ? [start, end] : [end, start];
      for (let k = Math.ceil(low / TURN); k * TURN <= high; k++)
        if (k * TURN !== end || start === end)
          keep(cell, winding, k * TURN, cell.left.angle, cell.right.angle);
      const next = cells[i + 1];
      if (next?.left === cell.right) overCrest(cell, next, winding, start, end, sampleAt, keep);
    }
  });
  return found;
}

/** A pair of solutions close to each other hides between three samples whose middle one is the highest or lowest: looks for the crest. */
function overCrest(
  cell: Cell,
  next: Cell,
  winding: number,
  start: number,
  top: number,
  sampleAt: SampleAt,
  keep: (cell: Cell, winding: number, target: number, from: number, to: number) => void,
): void {
  const end =
    lead(next.right, winding + cell.link.winding + next.link.winding) - cell.link.azimuth - next.link.azimuth;
  const up = top >= start ? 1 : -1;
  if ((top - end) * up < 0) return;
  const target = up * Math.ceil((up * top) / TURN) * TURN;
  // a parabola through three points rises by less than the greater fall over its highest; twice that to be safe
  if ((target - top) * up > 2 * Math.max((top - start) * up, (top - end) * up)) return;
  const past = leadFrom(cell, winding, sampleAt);
  const height = (x: number): number => (past(x).lead - target) * up;
  let [a, b] = [cell.left.angle, next.right.angle];
  let [x, y] = [b - GOLDEN * (b - a), a + GOLDEN * (b - a)];
  let [hx, hy] = [height(x), height(y)];
  for (let i = 0; i < CREST_STEPS && hx < 0 && hy < 0; i++) {
    if (hx > hy) {
      b = y;
      [y, hy] = [x, hx];
      x = b - GOLDEN * (b - a);
      hx = height(x);
    } else {
      a = x;
      [x, hx] = [y, hy];
      y = a + GOLDEN * (b - a);
      hy = height(y);
    }
  }
  if (hx < 0 && hy < 0) return;
  const crest = hx >= hy ? x : y;
  // one of the two may lie beyond the middle sample and be seen in its own cell if that sample is above the target: here it is not
  keep(cell, winding, target, cell.left.angle, crest);
  keep(cell, winding, target, crest, next.right.angle);
}

/** The lead at any angle near a cell, going on smoothly from the cell's left. */
function leadFrom(cell: Cell, winding: number, sampleAt: SampleAt) {
  return (angle: number): { lead: number; time: number; sample: Sample } => {
    const sample = sampleAt(angle);
    if (!sample) return { lead: Number.NaN, time: Number.NaN, sample: cell.left };
    const link = linkBetween(cell.left, sample);
    const own = winding + link.winding;
    return { lead: lead(sample, own) - link.azimuth, time: sample.time + own * sample.period, sample };
  };
}

/** Whether both ends of a cell lie well outside the turns that are asked for, on the same side. */
function isBeyond(cell: Cell, winding: number, leastTurns: number, mostTurns: number): boolean {
  const turns = (sample: Sample, own: number): number =>
    (sample.polhode.energy * (sample.time + own * sample.period)) / TURN;
  const a = turns(cell.left, winding);
  const b = turns(cell.right, winding + cell.link.winding);
  if (a * b <= 0) return false;
  const margin = 2 * Math.abs(a - b);
  const [low, high] = [Math.min(Math.abs(a), Math.abs(b)), Math.max(Math.abs(a), Math.abs(b))];
  return low - margin > mostTurns || high + margin < leastTurns;
}
