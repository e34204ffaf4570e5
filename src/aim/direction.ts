import {
  between,
  fromAxisAngle,
  multiply,
  normalize as normalizeQuat,
  type Quat,
  rotate,
} from "../math/quat.js";
import {
  add,
  addScaled,
  cross,
  dot,
  length,
  normalize,
  perpendicular,
  scale,
  type Vec3,
} from "../math/vec3.js";
import { endOf, type Turn } from "./polish.js";
import { momentumOf, type Problem, problemOf, spinOf } from "./problem.js";
import { costOf, type OrderedWish, type Ranked, rank } from "./ranking.js";
import { search } from "./search.js";
import { turningOf } from "./turning.js";
import { describeWay, MOST_MISS, type NearestWay, orderedWish, type WayWish, warningsFor } from "./way.js";

export interface DirectionRequest {
  /** Principal moments in any order and unit. */
  moments: Vec3;
  /** Principal frame → world at release. */
  start: Quat;
  /** s */
  duration: number;
  /** Unit vector in the principal frame that is to lie along `target`, a unit vector in the world, at the end. */
  direction: Vec3;
  target: Vec3;
}

/** Rolls about the target that are tried, and points of the grid for each. */
const ROLLS = 24;
const EVEN = 48;
/** Half the width of the search, turns; doubled until nothing outside can be nearer. */
const FIRST_REACH = 0.75;
const MOST_REACH = 12;
/** How many of the best are slid towards the wish. */
const SLID = 3;
const SLIDES = 40;
/** First and last step of a slide, rad within the flight. */
const FIRST_SLIDE = 0.3;
const LAST_SLIDE = 1e-3;
/** A miss below this is left as it is, rad. */
const GOOD = 1e-11;
const ROUNDS = 10;

/**
 * The way nearest the wish that brings one direction of the body along one of the world at the end, the roll about it left free: the best of
 * poses with 24 rolls, then moved along the curve of spins that keep the direction, towards the wish.
 */
export function nearestDirectionWay(request: DirectionRequest, wish: WayWish): NearestWay {
  const turns = rolls(request);
  const problems = turns.map(problemOf);
  const ordered = orderedWish(problems[0].body, wish);
  const wanted = ordered.turns ?? 0;
  let best: { problem: Problem; ranked: Ranked }[] = [];
  for (let reach = FIRST_REACH; reach < MOST_REACH && !(best[0]?.ranked.cost <= reach); reach *= 2) {
    const bounds = {
      leastTurns: Math.max(0, wanted - reach),
      mostTurns: wanted + reach,
      mostTurning: wanted + reach,
    };
    best = problems
      .flatMap((problem) =>
        rank(problem, search(problem, bounds, ordered.axis, EVEN), ordered)
          .slice(0, 2)
          .map((ranked) => ({ problem, ranked })),
      )
      .sort((a, b) => a.ranked.cost - b.ranked.cost);
  }
  const ways = best.slice(0, SLID).flatMap(({ problem, ranked }) => {
    const aim = new DirectionAim(request, problem, ordered);
    const found = aim.polished(spinOf(problem, ranked.candidate.momentum));
    return [found, aim.slid(found)];
  });
  const good = ways.filter(({ miss }) => miss <= MOST_MISS);
  const [nearest] = (good.length > 0 ? good : ways).sort((a, b) => a.cost - b.cost);
  if (!nearest)
    throw new RangeError(
      "no free motion of this body turns the direction onto its target within the turns searched",
    );
  return answer(request, problems[0], nearest, ordered);
}

/** The end poses that keep the direction along the target, with evenly spread rolls; the first by the smallest turn from release. */
function rolls({ moments, start, duration, direction, target }: DirectionRequest): Turn[] {
  const first = multiply(between(rotate(start, direction), target), start);
  return Array.from({ length: ROLLS }, (_, i) => {
    const roll = fromAxisAngle(target, (2 * Math.PI * i) / ROLLS);
    return { moments, start, duration, end: normalizeQuat(multiply(roll, first)) };
  });
}

interface Found {
  spin: Vec3;
  end: Quat;
  cost: number;
  miss: number;
}

/** Spins that bring the direction onto the target: two conditions on three numbers. */
class DirectionAim {
  private readonly sideways: readonly [Vec3, Vec3];

  constructor(
    private readonly request: DirectionRequest,
    private readonly problem: Problem,
    private readonly wish: OrderedWish,
  ) {
    const side = perpendicular(request.target);
    this.sideways = [side, cross(request.target, side)];
  }

  /** Brings the flight's end onto the target by the least changes of the spin (Newton, minimum norm). */
  polished(from: Vec3, rounds = ROUNDS): Found {
    let at = this.ending(from);
    for (let round = 0; round < rounds && at.miss > GOOD; round++) {
      const next = this.ending(add(at.spin, leastNorm(this.derivatives(at), at.off)));
      if (!(next.miss < at.miss)) break;
      at = next;
    }
    return { spin: at.spin, end: at.end, cost: this.cost(at.spin, at.end), miss: at.miss };
  }

  /** Moves along the curve of spins that keep the end, as long as that brings them nearer the wish. */
  slid(from: Found): Found {
    let best = from;
    let size = FIRST_SLIDE / this.request.duration;
    let way: Vec3 | undefined;
    for (let i = 0; i < SLIDES && size > LAST_SLIDE / this.request.duration; i++) {
      const [a, b] = this.derivatives(this.ending(best.spin));
      const across = normalize(cross(a, b));
      const along = way && dot(across, way) < 0 ? scale(across, -1) : across;
      const tries = [1, -1].map((side) => this.polished(addScaled(best.spin, along, side * size), 3));
      const better = tries.find(({ cost, miss }) => miss <= MOST_MISS && cost < best.cost - 1e-9);
      if (better) {
        way = better === tries[0] ? along : scale(along, -1);
        best = better;
        size *= 1.5;
      } else size /= 3;
    }
    return best;
  }

  private ending(spin: Vec3): { spin: Vec3; end: Quat; off: readonly [number, number]; miss: number } {
    const { direction, target } = this.request;
    const end = endOf(this.request, spin);
    const pointed = rotate(end, direction);
    const off = [dot(pointed, this.sideways[0]), dot(pointed, this.sideways[1])] as const;
    const sine = length([off[0], off[1], 0]);
    return { spin, end, off, miss: dot(pointed, target) < 0 ? Math.PI - sine : sine };
  }

  /** Rows of the derivatives of the two components by the spin. */
  private derivatives(at: { spin: Vec3; off: readonly [number, number] }): [Vec3, Vec3] {
    const step = Math.max(1e-7 / this.request.duration, 1e-9 * length(at.spin));
    const moved = [0, 1, 2].map((axis) => {
      const nudge: Vec3 = [axis === 0 ? step : 0, axis === 1 ? step : 0, axis === 2 ? step : 0];
      return this.ending(add(at.spin, nudge)).off;
    });
    const row = (i: 0 | 1): Vec3 => [
      (moved[0][i] - at.off[i]) / step,
      (moved[1][i] - at.off[i]) / step,
      (moved[2][i] - at.off[i]) / step,
    ];
    return [row(0), row(1)];
  }

  private cost(spin: Vec3, end: Quat): number {
    const reached = problemOf({ ...this.problem.turn, end });
    return costOf(turningOf(reached.body, momentumOf(reached, spin), reached.end), this.wish);
  }
}

/** The shortest x with rows·x = −off; zero where the rows are parallel. */
function leastNorm([a, b]: [Vec3, Vec3], off: readonly [number, number]): Vec3 {
  const [aa, ab, bb] = [dot(a, a), dot(a, b), dot(b, b)];
  const determinant = aa * bb - ab * ab;
  if (!(determinant > 1e-14 * aa * bb)) return [0, 0, 0];
  const u = (ab * off[1] - bb * off[0]) / determinant;
  const v = (ab * off[0] - aa * off[1]) / determinant;
  return add(scale(a, u), scale(b, v));
}

function answer(request: DirectionRequest, { body }: Problem, found: Found, wish: OrderedWish): NearestWay {
  const reached = problemOf({ ...request, end: found.end });
  const turning = turningOf(body, momentumOf(reached, found.spin), reached.end);
  const way = describeWay(body, found.spin, turning, found.miss);
  return { way, warnings: warningsFor(way, wish) };
}
