/** The way of the prop as it lies in the picture: which moment is meant by a place beside it. */

export interface ScreenPoint {
  x: number;
  y: number;
}

/** px: a way that is shorter in the picture is none that a hand could follow. */
const SHORTEST = 40;
/** px along the way that a hand may be ahead by, and times its own move. */
const AHEAD = 40;
const FASTER = 3;

export class ArcOnScreen {
  readonly #points: readonly ScreenPoint[];
  readonly #duration: number;
  readonly #length: number;

  /** @param points at even times from 0 to `duration` */
  constructor(points: readonly ScreenPoint[], duration: number) {
    this.#points = points;
    this.#duration = duration;
    this.#length = points.slice(1).reduce((sum, point, i) => sum + distance(point, points[i]), 0);
  }

  /** Whether dragging along it makes sense; else it is dragged by going right and left. */
  get isWay(): boolean {
    return this.#length >= SHORTEST;
  }

  /** px from the way, and when it is nearest. */
  nearest(place: ScreenPoint): { time: number; distance: number } {
    return this.#best(place, 0, this.#points.length - 1);
  }

  /** The moment meant by a hand that was at `time` and moved by `moved` px: on a way that crosses itself it stays on its branch. */
  follow(place: ScreenPoint, time: number, moved: number): number {
    const last = this.#points.length - 1;
    const at = Math.round((time / this.#duration) * last);
    const room = AHEAD + FASTER * moved;
    const reach = (step: number): number => {
      let end = at;
      for (let way = 0; way < room && end + step >= 0 && end + step <= last; end += step)
        way += distance(this.#points[end], this.#points[end + step]);
      return end;
    };
    return this.#best(place, reach(-1), reach(1)).time;
  }

  #best(place: ScreenPoint, from: number, to: number): { time: number; distance: number } {
    const last = this.#points.length - 1;
    let best = { time: (from / last) * this.#duration, distance: distance(place, this.#points[from]) };
    for (let i = from; i < to; i++) {
      const share = along(place, this.#points[i], this.#points[i + 1]);
      const { x, y } = this.#points[i];
      const next = this.#points[i + 1];
      const near = { x: x + share * (next.x - x), y: y + share * (next.y - y) };
      const found = distance(place, near);
      if (found < best.distance) best = { time: ((i + share) / last) * this.#duration, distance: found };
    }
    return best;
  }
}

/** How much of the way from a to b is gone where it is nearest, 0 to 1. */
function along(place: ScreenPoint, a: ScreenPoint, b: ScreenPoint): number {
  const [dx, dy] = [b.x - a.x, b.y - a.y];
  const square = dx * dx + dy * dy;
  if (square === 0) return 0;
  return Math.max(0, Math.min(1, ((place.x - a.x) * dx + (place.y - a.y) * dy) / square));
}

const distance = (a: ScreenPoint, b: ScreenPoint): number => Math.hypot(a.x - b.x, a.y - b.y);
