import { describe, expect, it } from "vitest";
import { type Arc, type ArcRequest, arcPosition, arcVelocity, solveArc } from "../../src/flight/arc.js";
import { endArc } from "../../src/flight/arc-end.js";
import { RequestError } from "../../src/math/request-error.js";
import { distance, length, type Vec3 } from "../../src/math/vec3.js";

const FEET = 0.3048; // international foot, exact by definition
const g = (strength: number): Vec3 => [0, -strength, 0];
const O: Vec3 = [0, 0, 0];
const elevationOf = (arc: Arc): number =>
  (Math.atan2(arc.velocity[1], Math.hypot(arc.velocity[0], arc.velocity[2])) * 180) / Math.PI;

const refusal = (request: ArcRequest): string => {
  try {
    solveArc(request);
  } catch (error) {
    expect(error).toBeInstanceOf(RequestError);
    return (error as RequestError).message;
  }
  throw new Error("was not refused");
};

// Textbook problems, statements and answers from memory, to the digits the books print. OpenStax: University Physics, vol. 1, chapter 4
// (g = 9.80); Halliday, Resnick & Walker: Fundamentals of Physics, chapter on motion in two and three dimensions.
describe("textbook problems", () => {
  it("a shell at 70.0 m/s and 75.0° tops out 233 m high after 6.90 s (OpenStax, example 4.7)", () => {
    const open: ArcRequest = {
      from: O,
      gravity: g(9.8),
      heading: 90,
      speed: 70,
      elevation: 75,
      openEnd: true,
    };
    const arc = solveArc(open);
    expect(arc.apex.rise.toFixed(0)).toBe("233");
    expect(arc.apex.time.toFixed(2)).toBe("6.90");
    expect(arcPosition(O, arc, arc.apex.time)[0].toFixed(0)).toBe("125");
  });

  it("the same read backwards gives gravity: a top of 233 m at that launch means 9.8 m/s²", () => {
    const arc = solveArc({
      from: O,
      gravity: { free: [0, 1, 0] },
      heading: 90,
      speed: 70,
      elevation: 75,
      apex: 233.3,
      after: 10,
    });
    expect(length(arc.gravity).toFixed(1)).toBe("9.8");
  });

  it("a ball hit at 30 m/s and 45° is caught 10 m higher after 3.79 s on its way down (OpenStax, example 4.8)", () => {
    const level = 30 * Math.cos(Math.PI / 4) * 3.79;
    const arc = solveArc({ from: O, to: [0, 10, level], gravity: g(9.8), elevation: 45 });
    expect(arc.duration.toFixed(2)).toBe("3.79");
    expect(length(arc.velocity).toFixed(1)).toBe("30.0");
  });

  it("a ship 560 m off is hit at 82 m/s by 27° and by 63° (Halliday & Resnick, the cannon and the ship)", () => {
    const ask: ArcRequest = { from: O, to: [560, 0, 0], gravity: g(9.8), speed: 82 };
    expect(elevationOf(solveArc(ask)).toFixed(0)).toBe("27");
    expect(elevationOf(solveArc({ ...ask, branch: "high" })).toFixed(0)).toBe("63");
    // and 686 m is the range beyond which the ship is safe
    expect(() => solveArc({ ...ask, to: [686, 0, 0] })).not.toThrow();
    expect(refusal({ ...ask, to: [687, 0, 0] })).toMatch(/^arc\.speed: .*needs at least 82\.\d+ m\/s$/);
  });

  it("a capsule dropped from level flight at 55.0 m/s, 500 m up, falls at 48.0° ahead of straight down (Halliday & Resnick, rescue plane)", () => {
    const arc = solveArc({
      from: [0, 500, 0],
      gravity: g(9.8),
      heading: 90,
      speed: 55,
      elevation: 0,
      after: 10.1015,
    });
    const end = arcPosition([0, 500, 0], arc, arc.duration);
    expect(Math.abs(end[1])).toBeLessThan(0.01);
    expect(((Math.atan2(end[0], 500) * 180) / Math.PI).toFixed(1)).toBe("48.0");
  });

  it("a foul shot at 55° through a ring 13 ft ahead and 3 ft up takes 23 ft/s (Halliday & Resnick, problem of the foul shot; g = 32 ft/s²)", () => {
    const arc = solveArc({
      from: [0, 7 * FEET, 0],
      gravity: g(32 * FEET),
      heading: 0,
      elevation: 55,
      through: [5, 10 * FEET, 13 * FEET],
      after: 2,
    });
    expect((length(arc.velocity) / FEET).toFixed(0)).toBe("23");
    const t = (13 * FEET) / arc.velocity[2];
    expect(arcPosition([0, 7 * FEET, 0], arc, t)[1]).toBeCloseTo(10 * FEET, 12);
  });
});

describe("two arcs to choose from", () => {
  it("low is launched lower: also in the same time under the gravity that fits", () => {
    const ask: ArcRequest = {
      from: [0, 4, 0],
      to: [2, 0, 0],
      gravity: { free: [0, 1, 0] },
      after: 1,
      speed: 2.5,
    };
    const low = solveArc(ask);
    const high = solveArc({ ...ask, branch: "high" });
    expect(low.velocity[1]).toBeCloseTo(-1.5, 12); // 2.5² = 2² + 1.5²
    expect(high.velocity[1]).toBeCloseTo(1.5, 12);
    expect(length(low.gravity)).toBeCloseTo(5, 12); // -4 = -1.5 - g/2
    expect(length(high.gravity)).toBeCloseTo(11, 12);
  });

  it("straight up, low meets the mark rising and high falling", () => {
    const ask: ArcRequest = { from: O, to: [0, 2, 0], gravity: g(9.81), speed: 8 };
    expect(arcVelocity(solveArc(ask), solveArc(ask).duration)[1]).toBeGreaterThan(0);
    const high = solveArc({ ...ask, branch: "high" });
    expect(arcVelocity(high, high.duration)[1]).toBeLessThan(0);
  });

  it("where one arc fits, either branch gives it", () => {
    const ask: ArcRequest = { from: O, to: [3, 1, 0], gravity: g(9.81), apex: 2 };
    expect(solveArc({ ...ask, branch: "high" })).toEqual(solveArc(ask));
  });
});

describe("the apex counts within the flight", () => {
  it("a short flight that rises 2 m has its highest point at its end", () => {
    const arc = solveArc({ from: O, gravity: g(10), heading: 0, speed: 20, apex: 2, after: 0.2 });
    expect(arc.velocity[1]).toBeCloseTo(11, 12); // 2 = 0.2 w - 5 · 0.04
    expect(arc.apex.time).toBe(0.2);
    expect(arc.apex.rise).toBeCloseTo(2, 12);
  });

  it("an open end that comes before the asked rise is refused, and before the asked point", () => {
    const ask: ArcRequest = { from: O, gravity: g(10), heading: 0, speed: 20, apex: 5, openEnd: true };
    expect(() => endArc(ask, solveArc(ask), 0.9)).toThrow(/arc\.apex: .*needs at most 4\.9\d* m/);
    expect(endArc(ask, solveArc(ask), 1.2).apex.rise).toBeCloseTo(5, 12);
    const past: ArcRequest = {
      from: O,
      gravity: g(10),
      heading: 0,
      speed: 20,
      through: [0, 1, 10],
      openEnd: true,
    };
    expect(() => endArc(past, solveArc(past), 0.3)).toThrow(/arc\.through/);
  });
});

describe("without gravity the throw is a straight line", () => {
  it.each([{ speed: 5 }, { after: 1 }])("fixed by %j", (key) => {
    const arc = solveArc({ from: O, to: [3, 0, 4], gravity: O, ...key });
    expect(distance(arc.velocity, [3, 0, 4])).toBeLessThan(1e-14);
    expect(arc.duration).toBeCloseTo(1, 14);
  });

  it("a launch still goes through a point, or rises by its end", () => {
    const through = solveArc({ from: O, gravity: O, heading: 90, speed: 5, through: [4, 3, 9], after: 2 });
    expect(distance(through.velocity, [4, 3, 0])).toBeLessThan(1e-14);
    expect(
      solveArc({ from: O, gravity: O, heading: 90, speed: 5, apex: 6, after: 2 }).velocity[1],
    ).toBeCloseTo(3, 14);
  });

  it("what fixes nothing is refused", () => {
    for (const key of [{ apex: 2 }, { elevation: 30 }, { through: [1, 1, 0] as Vec3 }])
      expect(refusal({ from: O, to: [3, 0, 0], gravity: O, ...key })).toMatch(
        /without gravity.*arrive\.after or arc\.speed/,
      );
  });
});

describe("a request that cannot be met names the nearest that could", () => {
  const mark: ArcRequest = { from: [0, 1, 0], to: [3, 2, 0], gravity: g(9.81) };
  const free = { free: [0, 1, 0] as Vec3 };
  const launch: ArcRequest = { from: [0, 1, 0], gravity: g(9.81), heading: 90, after: 0.5 };

  it.each([
    // √(g (h + √(h² + d²))) = √(9.81 (1 + √10)) = 6.3899
    [{ ...mark, speed: 5 }, "arc.speed: a launch at 5 m/s does not reach the mark; needs at least 6.39 m/s"],
    [{ ...mark, apex: 0.7 }, "arc.apex: an apex of 0.7 m is below the mark; needs at least 1 m"],
    // atan(1/3) = 18.435°
    [{ ...mark, elevation: 10 }, "needs to be steeper than 18.43° and below 90°"],
    // the straight line is 1 + 1/2 m high half-way
    [{ ...mark, through: [1.5, 1.4, 0] as Vec3 }, "arc.through higher than 1.5 m"],
    [{ ...mark, through: [4, 5, 0] as Vec3 }, "the point is abreast 4 m ahead"],
    [
      { ...mark, gravity: free, after: 1, elevation: 10 },
      "gravity: at 10° arc.elevation would need a gravity of 0 or less",
    ],
    // √10 m in 1 s
    [
      { ...mark, gravity: free, after: 1, speed: 3.1 },
      "gravity: at 3.1 m/s the mark is not reached in 1 s under any gravity; needs more than 3.162 m/s",
    ],
    [{ ...launch, speed: 3, apex: 2 }, "arc.speed: a launch at 3 m/s does not rise 2 m; needs at least"],
    [{ ...launch, speed: 9, through: [-1, 2, 0] as Vec3 }, "the point lies 1 m behind the release"],
    [{ ...launch, speed: 9, through: [8, 1, 0] as Vec3 }, "arc.through: the point is passed after"],
    [{ ...launch, apex: 1, through: [1, 2.5, 0] as Vec3 }, "needs a height of at most 2 m"],
    [{ ...launch, elevation: -10, apex: 1 }, "arc.elevation: a launch at -10°"],
    [
      { ...launch, heading: undefined, velocity: [1, 1, 0] as Vec3, gravity: free, apex: 0.6 },
      "gravity: to rise 0.6 m in 0.5 s",
    ],
    [
      {
        ...launch,
        heading: undefined,
        velocity: [2, 1, 0] as Vec3,
        gravity: free,
        through: [0.5, 1.4, 0] as Vec3,
      },
      "gravity: to pass at a height of 1.4 m",
    ],
  ])("%j", (request, message) => {
    expect(refusal(request as ArcRequest)).toContain(message);
  });

  it("and what it names is enough", () => {
    for (const speed of [6.39, 7]) expect(() => solveArc({ ...mark, speed })).not.toThrow();
    expect(() => solveArc({ ...mark, elevation: 18.44 })).not.toThrow();
  });
});

describe("too few and too many conditions are told apart", () => {
  const mark: ArcRequest = { from: O, to: [3, 0, 0], gravity: g(9.81) };
  const free = { free: [0, 1, 0] as Vec3 };
  it.each([
    [mark, "give one of arrive.after"],
    [{ ...mark, after: 1, apex: 1 }, "one too many"],
    [{ ...mark, after: 1, heading: 90 }, "arc.heading: arrive.at and arc.heading are given"],
    [{ ...mark, gravity: free, after: 1 }, "give two of arrive.after"],
    [
      { ...mark, gravity: free, apex: 1, elevation: 50 },
      "one of the two has to be arrive.after or arc.speed",
    ],
    [{ from: O, gravity: g(9.81), after: 1 }, "neither a mark nor a launch is given"],
    [
      { from: O, gravity: g(9.81), velocity: [1, 2, 3] as Vec3 },
      "give arrive.at, arrive.after or arrive.floor",
    ],
    [{ from: O, gravity: g(9.81), heading: 0, speed: 4, after: 1 }, "give two of arc.speed"],
    [
      { from: O, gravity: g(9.81), heading: 0, speed: 4, elevation: 20, apex: 1, after: 1 },
      "too many to fix the launch",
    ],
    [
      { from: O, gravity: free, velocity: [1, 2, 3] as Vec3, after: 1 },
      "give arc.apex or arc.through as well",
    ],
    [{ ...mark, after: -1 }, "arrive.after: a flight time of -1 s"],
    [{ ...mark, elevation: 91 }, "arc.elevation: an elevation of 91°"],
  ])("%j", (request, message) => {
    expect(refusal(request as ArcRequest)).toContain(message);
  });
});
