import { sideOf } from "./hull-exact.js";

/** Rounding of a determinant of three edges, as a share of the product of their lengths. */
const ROUNDING = 4e-15;
const NONE = -1;

/** The triangles of a hull that grows. They are numbers into arrays, not objects: there are millions, and most are gone at once. */
export class HullSides {
  /** Three a side, counter-clockwise from outside. */
  private corners = new Int32Array(3 * 64);
  /** The sides beyond the edges from corner 0 to 1, 1 to 2, 2 to 0. */
  private across = new Int32Array(3 * 64);
  /** Outwards, as long as twice the area; then the volume below which a point is not outside, and what of a volume is rounding. */
  private planes = new Float64Array(5 * 64);
  /** Points that lie outside of a side and are yet to be taken in: the first of a chain, and the one furthest out. */
  private first = new Int32Array(64);
  private furthest = new Int32Array(64);
  private height = new Float64Array(64);
  private isGone = new Uint8Array(64);
  private count = 0;
  /** Numbers of sides that are gone, to be used again. */
  private readonly free: number[] = [];
  /** The chains' further points. */
  private readonly next: Int32Array;
  /** By corner: the new side whose edge of the rim begins there. */
  private readonly rim: Int32Array;

  /**
   * @param places whole numbers, 3 a point, none greater than `size`
   * @param slack a point that is no further outside is left out
   */
  constructor(
    private readonly places: Float64Array,
    private readonly size: number,
    private readonly slack: number,
  ) {
    this.next = new Int32Array(places.length / 3);
    this.rim = new Int32Array(places.length / 3);
  }

  tetrahedron([a, b, c, d]: readonly [number, number, number, number]): number[] {
    // so that d lies within abc
    const [p, q] = sideOf(this.places, a, b, c, d) > 0 ? [c, b] : [b, c];
    const sides = [this.add(a, p, q), this.add(p, a, d), this.add(q, p, d), this.add(a, q, d)];
    this.across.set([1, 2, 3, 0, 3, 2, 0, 1, 3, 0, 2, 1]);
    return sides;
  }

  /** Whether a side stands and has points outside. */
  isOpen(side: number): boolean {
    return this.isGone[side] === 0 && this.furthest[side] !== NONE;
  }

  /** Gives a point to the first of some sides that it lies outside of. */
  assign(p: number, sides: readonly number[]): void {
    for (const side of sides) {
      const volume = this.volume(side, p);
      const slack = this.planes[5 * side + 3];
      const rounding = this.planes[5 * side + 4];
      if (volume <= slack - rounding) continue;
      // over a side too thin to measure from, whatever is outside at all counts
      if (volume <= slack + rounding && !this.sees(p, side)) continue;
      this.next[p] = this.first[side];
      this.first[side] = p;
      if (this.furthest[side] === NONE || volume > this.height[side]) {
        this.furthest[side] = p;
        this.height[side] = volume;
      }
      return;
    }
  }

  /** Takes in the point furthest outside of a side: all sides it sees make way for a cone from their rim. Answers the new sides. */
  extend(side: number): number[] {
    const corner = this.furthest[side];
    const gone = this.seenFrom(corner, side);
    const made = this.cone(corner, gone);
    for (const old of gone)
      for (let p = this.first[old]; p !== NONE; ) {
        const next = this.next[p];
        if (p !== corner) this.assign(p, made);
        p = next;
      }
    for (const old of gone) this.free.push(old);
    return made;
  }

  /** Corners of all sides that stand, three each. */
  triangles(): Uint32Array {
    const standing: number[] = [];
    for (let side = 0; side < this.count; side++)
      if (this.isGone[side] === 0) for (let k = 0; k < 3; k++) standing.push(this.corners[3 * side + k]);
    return Uint32Array.from(standing);
  }

  private add(a: number, b: number, c: number): number {
    const side = this.free.pop() ?? this.count++;
    if (side === this.first.length) this.grow();
    const p = this.places;
    const ux = p[3 * b] - p[3 * a];
    const uy = p[3 * b + 1] - p[3 * a + 1];
    const uz = p[3 * b + 2] - p[3 * a + 2];
    const vx = p[3 * c] - p[3 * a];
    const vy = p[3 * c + 1] - p[3 * a + 1];
    const vz = p[3 * c + 2] - p[3 * a + 2];
    const x = uy * vz - uz * vy;
    const y = uz * vx - ux * vz;
    const z = ux * vy - uy * vx;
    const edges = Math.sqrt((ux * ux + uy * uy + uz * uz) * (vx * vx + vy * vy + vz * vz));
    this.corners[3 * side] = a;
    this.corners[3 * side + 1] = b;
    this.corners[3 * side + 2] = c;
    this.planes[5 * side] = x;
    this.planes[5 * side + 1] = y;
    this.planes[5 * side + 2] = z;
    this.planes[5 * side + 3] = this.slack * Math.sqrt(x * x + y * y + z * z);
    // no two points are further apart than √12 of the size
    this.planes[5 * side + 4] = ROUNDING * edges * 4 * this.size;
    this.first[side] = NONE;
    this.furthest[side] = NONE;
    this.isGone[side] = 0;
    return side;
  }

  private grow(): void {
    const { corners, across, planes, first, furthest, height, isGone } = this;
    const length = 2 * first.length;
    this.corners = new Int32Array(3 * length);
    this.across = new Int32Array(3 * length);
    this.planes = new Float64Array(5 * length);
    this.first = new Int32Array(length);
    this.furthest = new Int32Array(length);
    this.height = new Float64Array(length);
    this.isGone = new Uint8Array(length);
    this.corners.set(corners);
    this.across.set(across);
    this.planes.set(planes);
    this.first.set(first);
    this.furthest.set(furthest);
    this.height.set(height);
    this.isGone.set(isGone);
  }

  /** Six times the volume between a side and a point, above 0 outside; with rounding. */
  private volume(side: number, p: number): number {
    const { places, planes } = this;
    const a = 3 * this.corners[3 * side];
    const x = planes[5 * side] * (places[3 * p] - places[a]);
    const y = planes[5 * side + 1] * (places[3 * p + 1] - places[a + 1]);
    return x + y + planes[5 * side + 2] * (places[3 * p + 2] - places[a + 2]);
  }

  private sees(p: number, side: number): boolean {
    const volume = this.volume(side, p);
    if (Math.abs(volume) > this.planes[5 * side + 4]) return volume > 0;
    const { corners } = this;
    return sideOf(this.places, corners[3 * side], corners[3 * side + 1], corners[3 * side + 2], p) > 0;
  }

  /** Marks and answers all sides that a point sees, of which `start` is one; they hang together. */
  private seenFrom(p: number, start: number): number[] {
    const gone = [start];
    this.isGone[start] = 1;
    for (let i = 0; i < gone.length; i++)
      for (let k = 0; k < 3; k++) {
        const side = this.across[3 * gone[i] + k];
        if (this.isGone[side] === 1 || !this.sees(p, side)) continue;
        this.isGone[side] = 1;
        gone.push(side);
      }
    return gone;
  }

  /** The new sides from a corner to the rim of those that are gone. */
  private cone(corner: number, gone: readonly number[]): number[] {
    const made: number[] = [];
    for (const old of gone)
      for (let k = 0; k < 3; k++) {
        const kept = this.across[3 * old + k];
        if (this.isGone[kept] === 1) continue;
        const from = this.corners[3 * old + k];
        const to = this.corners[3 * old + ((k + 1) % 3)];
        const side = this.add(from, to, corner);
        this.across[3 * side] = kept;
        // the same edge runs the other way round in the one that is kept
        for (let j = 0; j < 3; j++) if (this.corners[3 * kept + j] === to) this.across[3 * kept + j] = side;
        // the rim goes through each of its corners once
        this.rim[from] = side;
        made.push(side);
      }
    for (const side of made) {
      const beside = this.rim[this.corners[3 * side + 1]];
      this.across[3 * side + 1] = beside;
      this.across[3 * beside + 2] = side;
    }
    return made;
  }
}
