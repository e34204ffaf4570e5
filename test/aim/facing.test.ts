import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { type DirectionPair, facingRotation } from "../../src/aim/facing.js";
import { angleBetween, fromAxisAngle, IDENTITY, type Quat, rotate } from "../../src/math/quat.js";
import { addScaled, cross, distance, dot, length, normalize, type Vec3 } from "../../src/math/vec3.js";
import { between, direction } from "./arbitrary.js";

// What a facing means is the throw file's own definition: the first pair holds exactly, the second as nearly as it can; with one pair the
// smallest turn from the modelled pose, about the world's up where any half turn would do.

const X: Vec3 = [1, 0, 0];
const Y: Vec3 = [0, 1, 0];
const Z: Vec3 = [0, 0, 1];
const minus = (v: Vec3): Vec3 => [-v[0], -v[1], -v[2]];
const pair = (prop: Vec3, world: Vec3): DirectionPair => ({ prop, world });
const pairs = () => fc.tuple(direction(), direction()).map(([prop, world]) => pair(prop, world));
function holds(q: Quat, { prop, world }: DirectionPair): void {
  expect(distance(rotate(q, prop), world)).toBeLessThan(4e-15);
}
/** Radians; good for small angles too. */
const angle = (a: Vec3, b: Vec3) => Math.atan2(length(cross(a, b)), dot(a, b));

describe("with two pairs", () => {
  it("the first holds exactly", () => {
    fc.assert(
      fc.property(pairs(), pairs(), (first, second) => holds(facingRotation(first, second), first)),
      { seed: 1 },
    );
  });

  it("the first holds exactly where the second lies almost along it", () => {
    fc.assert(
      fc.property(pairs(), pairs(), between(-9, -1), (first, second, exponent) => {
        const beside = addScaled(first.prop, second.prop, 10 ** exponent);
        holds(facingRotation(first, pair(normalize(beside), second.world)), first);
      }),
      { seed: 6 },
    );
  });

  it("the second is as near as the first leaves it: as far off as the angles within the pairs differ", () => {
    fc.assert(
      fc.property(pairs(), pairs(), (first, second) => {
        const wanted = Math.abs(angle(first.prop, second.prop) - angle(first.world, second.world));
        fc.pre(
          [angle(first.prop, second.prop), angle(first.world, second.world)].every((a) => Math.sin(a) > 1e-3),
        );
        const q = facingRotation(first, second);
        expect(angle(rotate(q, second.prop), second.world)).toBeCloseTo(wanted, 11);
      }),
      { seed: 2 },
    );
  });

  it("both hold when they can", () => {
    // worked by hand: x to the world's up and y to its ahead is a third of a turn about x + y + z
    const q = facingRotation(pair(X, Y), pair(Y, Z));
    expect(angleBetween(q, [0.5, 0.5, 0.5, 0.5])).toBeLessThan(1e-15);
  });

  it("a second pair along the first, of the prop or of the world, decides nothing", () => {
    const alone = facingRotation(pair(X, Y));
    expect(facingRotation(pair(X, Y), pair(minus(X), Z))).toEqual(alone);
    expect(facingRotation(pair(X, Y), pair(Z, minus(Y)))).toEqual(alone);
  });
});

describe("with one pair", () => {
  it("the pair holds exactly, by the smallest turn that does it", () => {
    fc.assert(
      fc.property(pairs(), (one) => {
        const q = facingRotation(one);
        holds(q, one);
        expect(angleBetween(IDENTITY, q)).toBeCloseTo(angle(one.prop, one.world), 7);
      }),
      { seed: 3 },
    );
  });

  it("nothing turns when the direction lies there already", () => {
    expect(facingRotation(pair(Z, Z))).toEqual(IDENTITY);
  });

  it("half a turn is about the world's up where that does it", () => {
    for (const level of [X, Z, normalize([3, 0, -4])])
      expect(angleBetween(facingRotation(pair(level, minus(level))), [0, 1, 0, 0])).toBeLessThan(1e-15);
  });

  it("half a turn from up to down is about a level axis", () => {
    const q = facingRotation(pair(Y, minus(Y)));
    holds(q, pair(Y, minus(Y)));
    expect(q[1]).toBe(0);
  });

  it("a direction that is opposite but for rounding is turned about the same axis, and still lies exactly there", () => {
    fc.assert(
      fc.property(direction(), between(-16, -8), (noise, exponent) => {
        const world = normalize(addScaled(minus(X), noise, 10 ** exponent));
        const q = facingRotation(pair(X, world));
        holds(q, pair(X, world));
        if (exponent < -8) expect(angleBetween(q, fromAxisAngle(Y, Math.PI))).toBeLessThan(3e-8);
      }),
      { seed: 4 },
    );
  });

  it("agrees with the two-pair construction about the pair's own normal", () => {
    fc.assert(
      fc.property(pairs(), (one) => {
        const normal = cross(one.prop, one.world);
        fc.pre(length(normal) > 1e-3);
        const n = normalize(normal);
        const q = facingRotation(one, pair(n, n));
        expect(angleBetween(q, facingRotation(one))).toBeLessThan(1e-12);
      }),
      { seed: 5 },
    );
  });
});
