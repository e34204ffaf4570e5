import { describe, expect, it } from "vitest";
import { fly } from "../../src/flight/flight.js";
import { apart, factGroups, paired } from "../../src/review/page/fact-rows.js";
import { measure } from "../../src/review/page/measures.js";
import { missedWords } from "../../src/review/page/misses.js";
import { wobbleAngle } from "../../src/review/page/wobble-angle.js";
import { bakedPage, sent } from "./page-fixture.js";

const data = await bakedPage();
const shownOf = (name: string, of = data) => of.throws.find((shown) => shown.name === name)!;
const measuredOf = (name: string, of = data) => measure(shownOf(name, of), of.props.plank);

describe("the numbers of takes", () => {
  it("have the wobble at release that the throw file asks for", () => {
    for (const { take, wobbleAtRelease } of measuredOf("lob"))
      expect(wobbleAtRelease).toBeCloseTo(take.record.draws["spin.wobble"] as number, 9);
  });

  it("have the turns and times that were drawn", () => {
    for (const { turns, time, take } of measuredOf("lob")) {
      expect(turns).toBeCloseTo(2.5, 9);
      expect(time).toBeCloseTo(take.record.draws["arrive.after"] as number, 9);
    }
  });

  it("have the speeds of a fall: v = √(v₀² + (g t)²), handbook", () => {
    for (const { releaseSpeed, arrivalSpeed, rise } of measuredOf("drop")) {
      expect(releaseSpeed).toBeCloseTo(0.5, 12);
      expect(arrivalSpeed).toBeCloseTo(Math.sqrt(0.25 + (9.80665 * 0.5) ** 2), 9);
      expect(rise).toBe(0);
    }
  });

  it("have the record's own rise to the apex", () => {
    for (const name of ["lob", "pair"])
      for (const { rise, take } of measuredOf(name)) expect(rise).toBeCloseTo(take.record.apex!.rise, 9);
  });

  it("name for each take the most alike of all others, the record's for the last one", () => {
    const all = measuredOf("lob");
    const last = all.at(-1)!;
    expect(last.nearest!.take).toBe(last.take.record.nearest!.take);
    expect(last.nearest!.distance).toBeCloseTo(last.take.record.nearest!.distance, 9);
    for (const { number, nearest, take } of all) {
      expect(nearest!.take).not.toBe(number);
      const earlier = take.record.nearest;
      if (earlier) expect(nearest!.distance).toBeLessThanOrEqual(earlier.distance + 1e-9);
      // whoever is nearest to me is no further from its own nearest than from me
      const other = all.find((each) => each.number === nearest!.take)!;
      expect(other.nearest!.distance).toBeLessThanOrEqual(nearest!.distance + 1e-9);
    }
  });

  it("show three takes that move alike as such", () => {
    const odd = sent(data);
    const { takes } = shownOf("lob", odd);
    for (const [i, factor] of [
      [3, 1.0005],
      [5, 1.001],
    ] as const) {
      const [part] = structuredClone(takes[1].motion.parts);
      const [x, y, z] = part.launch.velocity;
      takes[i].motion.parts = [
        { ...part, launch: { ...part.launch, velocity: [x * factor, y * factor, z * factor] } },
      ];
    }
    const sorted = measure(shownOf("lob", odd), odd.props.plank).sort(
      (a, b) => a.nearest!.distance - b.nearest!.distance,
    );
    const numbers = sorted.slice(0, 3).map(({ number }) => number);
    expect(numbers.sort()).toEqual([2, 4, 6]);
    expect(sorted[3].nearest!.distance).toBeGreaterThan(5 * sorted[2].nearest!.distance);
  });
});

describe("the wobble's angle", () => {
  const launch = data.throws[0].takes[0].motion.parts[0].launch;
  const clean = (spin: readonly [number, number, number], moments = launch.moments) =>
    fly({ ...launch, spin, moments });

  it("is nothing for a clean spin at any time, and unknown for a prop that does not turn", () => {
    const flight = clean([0, 0, 9]);
    for (const t of [0, 0.3, flight.duration]) expect(wobbleAngle(flight, launch.moments, t)).toBe(0);
    expect(wobbleAngle(clean([0, 0, 0]), launch.moments, 0)).toBeNull();
  });

  it("is that of the angular momentum: tan = I₁ω₁ / I₃ω₃", () => {
    const [long, , short] = launch.moments;
    const angle = wobbleAngle(clean([2, 0, 9]), launch.moments, 0);
    expect(angle).toBeCloseTo((Math.atan((long * 2) / (short * 9)) * 180) / Math.PI, 9);
  });

  it("counts any axis between two of like moments as the prop's own", () => {
    const slim = [1, 5, 5] as const;
    expect(wobbleAngle(clean([0, 3, 4], slim), slim, 0)).toBeCloseTo(0, 6);
  });
});

describe("the rows of numbers", () => {
  const [first, second] = measuredOf("lob");
  const rows = (measured: typeof first) => factGroups(measured).flatMap((group) => group.rows);

  it("mark what differs between two takes, and what is the same", () => {
    const pairs = paired(rows(first), rows(second));
    const of = (label: string) => pairs.find((pair) => pair.label === label)!;
    expect(of("Turns").likeness).toBe("same");
    expect(of("Tolerance").likeness).toBe("same");
    expect(of("Time in the air").texts[0]).not.toBe(of("Time in the air").texts[1]);
    expect(pairs.some(({ likeness }) => likeness === "differs")).toBe(true);
    expect(paired(rows(first), rows(first)).every(({ likeness }) => likeness === "same")).toBe(true);
  });

  it("call near what differs by 2 % at most, and unlike what only one has", () => {
    const row = (value: number) => [{ label: "x", text: String(value), value }];
    expect(paired(row(100), row(101))[0].likeness).toBe("near");
    expect(paired(row(100), row(103))[0].likeness).toBe("differs");
    expect(paired(row(100), [])[0]).toMatchObject({ texts: ["100", "–"], likeness: "differs" });
  });

  it("leave out what is not known", () => {
    const turning = {
      ...first,
      miss: null,
      missAngle: null,
      rise: null,
      releaseSpeed: null,
      arrivalSpeed: null,
    };
    const labels = factGroups(turning)[0].rows.map(({ label }) => label);
    expect(labels).toEqual(["Time in the air", "Clip with holds"]);
  });

  it("say how far apart two takes leave and arrive", () => {
    const { release, arrival } = apart(first, first);
    expect([release, arrival]).toEqual([0, 0]);
    // both leave and arrive at the same place by their balance points, within the marks' own exactness
    expect(apart(first, second).release).toBeLessThan(1e-9);
    expect(apart(first, second).arrival).toBeLessThan(1e-6);
  });
});

describe("a miss", () => {
  it("is told from a tenth of a millimetre and a hundredth of a degree on", () => {
    expect(missedWords({ miss: 0.00009, missAngle: 0.0001 })).toBeUndefined();
    expect(missedWords({ miss: null, missAngle: null })).toBeUndefined();
    expect(missedWords({ miss: 0.0234, missAngle: 0.02 })).toBe(
      "its mark by 23.4\u00a0mm and its pose by 1.1°",
    );
  });
});
