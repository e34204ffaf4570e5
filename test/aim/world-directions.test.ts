import { describe, expect, it } from "vitest";
import { WORLD_DIRECTIONS, worldDirection } from "../../src/aim/world-directions.js";
import { RequestError } from "../../src/math/request-error.js";
import { cross, dot, length, type Vec3 } from "../../src/math/vec3.js";

// glTF 2.0, 3.4: +Y up, +Z forward, -X right, right-handed.
const COURSE = { ahead: [0, 5, 2] as Vec3, travel: [0, -3, 4] as Vec3 };
const at = (word: string): Vec3 => worldDirection(word, COURSE).map((c) => c + 0) as unknown as Vec3;

describe("the words for directions of the world", () => {
  it("are those of glTF for a throw along +Z", () => {
    expect(at("up")).toEqual([0, 1, 0]);
    expect(at("down")).toEqual([0, -1, 0]);
    expect(at("ahead")).toEqual([0, 0, 1]);
    expect(at("back")).toEqual([0, 0, -1]);
    expect(at("right")).toEqual([-1, 0, 0]);
    expect(at("left")).toEqual([1, 0, 0]);
  });

  it("turn with the throw", () => {
    // along +X the right hand points along +Z: a quarter turn of the above
    expect(worldDirection("right", { ahead: [7, 0, 0] })).toEqual([0, 0, 1]);
  });

  it("left is topspin and right is backspin: the top of what turns about it goes ahead, or back", () => {
    // velocity of a point of a turning body: ω × r (any textbook of mechanics)
    const topGoes = (word: string) => dot(cross(at(word), at("up")), at("ahead"));
    expect(topGoes("left")).toBe(1);
    expect(topGoes("right")).toBe(-1);
  });

  it("flight is the velocity's direction, its fall too", () => {
    expect(at("flight")).toEqual([0, -0.6, 0.8]);
  });

  it("are unit vectors all, and so is a vector of any length", () => {
    for (const word of WORLD_DIRECTIONS) expect(length(at(word))).toBeCloseTo(1, 15);
    expect(worldDirection([0, 0, -20], {})).toEqual([0, 0, -1]);
  });
});

describe("what a throw leaves without meaning", () => {
  const fault = (word: string, course: Parameters<typeof worldDirection>[1]): RequestError => {
    try {
      worldDirection(word, course);
    } catch (error) {
      if (error instanceof RequestError) return error;
    }
    throw new Error("was answered");
  };

  it.each(["ahead", "back", "left", "right"])("is %s of a vertical throw, and of none", (word) => {
    expect(fault(word, { ahead: [0, 2, 0] }).message).toContain(`"${word}"`);
    expect(fault(word, { ahead: [1e-12, 2, 0] }).message).toContain("straight up or down");
    expect(fault(word, {}).remedy).toContain("[x, y, z]");
  });

  it("is flight at no speed", () => {
    expect(fault("flight", { travel: [0, 0, 0], ahead: [0, 0, 1] }).message).toContain("no speed");
    expect(fault("flight", {}).message).toContain('"flight"');
  });

  it("is a word that there is not", () => {
    expect(fault("forwards", COURSE).remedy).toContain("ahead");
  });
});
