import { describe, expect, it } from "vitest";
import { normalize as normalizeQuat, rotate } from "../../src/math/quat.js";
import { cross, dot, length, normalize, subtract, type Vec3 } from "../../src/math/vec3.js";
import { type Prop, weigh } from "../../src/prop/prop.js";
import { restingFaces } from "../../src/prop/rest.js";
import type { Shape } from "../../src/prop/shape-kind.js";
import { anyDirection, random } from "../flight/tumbling.js";

const facesOf = async (shape: Shape, options = {}) => restingFaces(await weigh("it", shape, options), shape);
const byNormal = (faces: { normal: Vec3; share: number }[], normal: Vec3) =>
  faces.find((face) => dot(face.normal, normal) > 1 - 1e-9)?.share;

const unit = (axis: number): Vec3 => [axis === 0 ? 1 : 0, axis === 1 ? 1 : 0, axis === 2 ? 1 : 0];

/**
 * Share of all directions from a box's middle that leave through one of its sides: 4 asin(ab / √((a²+h²)(b²+h²))) of 4π (solid angle of a rectangle of
 * half sides a, b from h above its middle: Khadjavi, J. Optical Society of America 58, 1417, 1968).
 */
function rectangleShare(half: Vec3, axis: number): number {
  const [h, a, b] = [half[axis], half[(axis + 1) % 3], half[(axis + 2) % 3]];
  return Math.asin((a * b) / Math.sqrt((a * a + h * h) * (b * b + h * h))) / Math.PI;
}

const chance = () => random(7);
const evenly = (next: () => number) => anyDirection(next);

describe("the sides a prop rests on", () => {
  it("are a cube's six, each as likely: by symmetry", async () => {
    const faces = await facesOf({ box: [0.2, 0.2, 0.2] });
    expect(faces).toHaveLength(6);
    for (const { share } of faces) expect(share).toBeCloseTo(1 / 6, 12);
  });

  it("take of a box what each subtends", async () => {
    const half: Vec3 = [0.1, 0.2, 0.3];
    const faces = await facesOf({ box: [0.2, 0.4, 0.6] });
    expect(faces).toHaveLength(6);
    for (const axis of [0, 1, 2]) {
      expect(byNormal(faces, unit(axis))).toBeCloseTo(rectangleShare(half, axis), 12);
    }
  });

  it("are of a box that is weighted off its middle as 200,000 drops by the same rule find them", async () => {
    const half: Vec3 = [0.1, 0.2, 0.3];
    const prop = await weigh("it", { box: [0.2, 0.4, 0.6] }, { centerOfMass: [0.05, 0.1, -0.22] });
    const faces = restingFaces(prop, { box: [0.2, 0.4, 0.6] });
    // every face of a box has its centre of mass over it: the face that the vertical leaves through, by the slab method
    const next = chance();
    const found = new Map<string, number>();
    const drops = 200_000;
    for (let i = 0; i < drops; i++) {
      const d = evenly(next);
      const ways = [0, 1, 2].map((a) => (Math.sign(d[a]) * half[a] - prop.centerOfMass[a]) / d[a]);
      const axis = ways.indexOf(Math.min(...ways));
      const key = `${axis}${Math.sign(d[axis])}`;
      found.set(key, (found.get(key) ?? 0) + 1);
    }
    expect(faces).toHaveLength(6);
    for (const { normal, share } of faces) {
      const axis = normal.findIndex((x) => Math.abs(x) > 0.5);
      const seen = (found.get(`${axis}${Math.sign(normal[axis])}`) ?? 0) / drops;
      // four standard deviations of a share
      expect(Math.abs(share - seen)).toBeLessThan(4 * Math.sqrt((share * (1 - share)) / drops));
    }
  });

  it("leave out what the prop tips from, and count that for the side it tips onto", () => {
    // a block that leans over so far that nothing holds it up on its ends: from x = 0..1 below to x = 1.4..2.4 above
    const block: Vec3[] = [0, 1].flatMap((y) =>
      [0, 1].flatMap((z) => [0, 1].map((x): Vec3 => [x + 1.4 * y, y, z])),
    );
    const faces = restingFaces(solid(block, [1.2, 0.5, 0.5]));
    const slanted = normalize([1, -1.4, 0]);
    expect(faces).toHaveLength(4);
    // from its middle (1.2 in x) the lower end falls over the edge at x = 1, that of the slanted side that looks down, the upper end likewise
    const next = chance();
    const drops = 200_000;
    let onto = 0;
    for (let i = 0; i < drops; i++) {
      const d = evenly(next);
      const [side, end, z] = [dot(slanted, d), -d[1], Math.abs(d[2])];
      // the face whose plane the vertical meets first, from the middle: at distance from the middle / slope towards it
      const far = dot(slanted, [-0.2, -0.5, 0]);
      const [toSide, toEnd, toZ] = [far / Math.abs(side), 0.5 / Math.abs(end), 0.5 / z];
      const first = Math.min(toSide, toEnd, toZ);
      if ((first === toSide && side > 0) || (first === toEnd && end > 0)) onto++;
    }
    const share = byNormal(faces, slanted) as number;
    expect(Math.abs(share - onto / drops)).toBeLessThan(4 * Math.sqrt((share * (1 - share)) / drops));
    expect(byNormal(faces, [-slanted[0], -slanted[1], 0])).toBeCloseTo(share, 12);
  });

  it("are six of a mesh box too, however its sides are cut up and its corners rounded to single precision", () => {
    const turn = normalizeQuat([0.3, -0.5, 0.2, 0.7]);
    const grid: Vec3[] = [];
    for (let i = 0; i <= 4; i++)
      for (let j = 0; j <= 4; j++)
        for (let k = 0; k <= 4; k++) grid.push([(i - 2) * 0.05, (j - 2) * 0.1, (k - 2) * 0.15]);
    const points = grid.map((p) => rotate(turn, p).map(Math.fround) as unknown as Vec3);
    const faces = restingFaces(solid(points, [0, 0, 0]));
    expect(faces).toHaveLength(6);
    for (const axis of [0, 1, 2]) {
      const along = rotate(turn, unit(axis));
      const sides = faces.filter(({ normal }) => length(cross(normal, along)) < 1e-6);
      expect(sides).toHaveLength(2);
      for (const { share } of sides) expect(share).toBeCloseTo(rectangleShare([0.1, 0.2, 0.3], axis), 6);
    }
  });

  it("are the two ends of what is round, each as likely: by symmetry", async () => {
    const round: Shape[] = [
      { cylinder: { radius: 0.1, length: 0.3 } },
      { disc: { radius: 0.1, thickness: 0.01 } },
      { tube: { outer: 0.1, inner: 0.05, length: 0.3 } },
      { ring: { radius: 0.1, thickness: 0.02 } },
    ];
    for (const shape of round) {
      const faces = await facesOf(shape);
      expect(faces.map(({ normal }) => normal[1]).sort()).toEqual([-1, 1]);
      for (const { share } of faces) expect(share).toBeCloseTo(1 / 2, 12);
    }
    expect(await facesOf({ cone: { radius: 0.1, length: 0.3 } })).toEqual([{ normal: [0, -1, 0], share: 1 }]);
  });

  it("are likelier the nearer they are to the centre of mass: as 1 − d/√(d² + r²) (solid angle of a disc, from memory)", async () => {
    const shape: Shape = { cylinder: { radius: 0.1, length: 0.3 } };
    const faces = await facesOf(shape, { centerOfMass: [0, -0.05, 0] });
    const seen = (d: number) => 1 - d / Math.hypot(d, 0.1);
    expect(faces[0].normal).toEqual([0, -1, 0]);
    expect(faces[0].share / faces[1].share).toBeCloseTo(seen(0.1) / seen(0.2), 3);
  });

  it("are both sides of a sheet that has no thickness", () => {
    const faces = restingFaces(
      solid(
        [
          [0, 0, 0],
          [1, 0, 0],
          [1, 2, 0],
          [0, 2, 0],
        ],
        [0.5, 1, 0],
      ),
    );
    expect(faces.map(({ normal }) => Math.abs(normal[2]))).toEqual([1, 1]);
    expect(faces.map(({ share }) => share)).toEqual([1 / 2, 1 / 2]);
  });

  it.each([
    { sphere: 0.1 },
    { ellipsoid: [0.1, 0.2, 0.3] },
    { capsule: { radius: 0.1, length: 0.4 } },
  ] as Shape[])("are none of %o: it is refused by name", async (shape) => {
    await expect(facesOf(shape)).rejects.toThrow(/arrive\.facing: "it" has no flat side to rest on/);
  });
});

/** A prop as far as its sides go. */
const solid = (points: Vec3[], centerOfMass: Vec3): Prop =>
  ({
    name: "it",
    extremes: Float64Array.from(points.flat()),
    centerOfMass,
    scale: 1,
    reach: Math.max(...points.map((p) => length(subtract(p, centerOfMass)))),
  }) as unknown as Prop;
