import { readFile } from "node:fs/promises";
import { fileURLToPath } from "node:url";
import { beforeAll, describe, expect, it } from "vitest";
import { loadProps } from "../../src/bake/props.js";
import { solveTake, type Take } from "../../src/bake/take.js";
import { axisShares, turnsAboutMomentum } from "../../src/flight/turns.js";
import { readModel } from "../../src/gltf/read.js";
import { conjugate, multiply, type Quat, rotate, rotateBack } from "../../src/math/quat.js";
import { dot, length, subtract, type Vec3 } from "../../src/math/vec3.js";
import type { Prop } from "../../src/prop/prop.js";
import { parseThrowFile } from "../../src/throwfile/parse.js";
import { type ThrowFile, takeNumbers } from "../../src/throwfile/types.js";

const ASSETS = new URL("../../assets/", import.meta.url);
const NAME = "quay.throws.yaml";

let file: ThrowFile;
const props = new Map<string, Prop>();
const takes = new Map<string, Take[]>();

beforeAll(async () => {
  file = parseThrowFile(NAME, await readFile(fileURLToPath(new URL(NAME, ASSETS)), "utf8"));
  const loaded = await loadProps(file, new Set(file.props.keys()), async (path) => {
    const bytes = await readFile(fileURLToPath(new URL(path, ASSETS)));
    return { model: await readModel(path, new Uint8Array(bytes)), sha256: "" };
  });
  for (const [name, { prop }] of loaded) props.set(name, prop);
  for (const entry of file.throws.values()) {
    const prop = props.get(entry.prop)!;
    takes.set(
      entry.name,
      takeNumbers(entry.takes).map((number) => solveTake(file, entry, prop, number)),
    );
  }
}, 60_000);

const takesOf = (name: string) => takes.get(name)!;

/** Turns the model from as modelled. */
function pose(name: string, { flight }: Take, time: number): Quat {
  const prop = props.get(file.throws.get(name)!.prop)!;
  return multiply(flight.orientation(time), conjugate(prop.principal.axes));
}

/** Where a direction of the model points at an end of the flight. */
const pointing = (name: string, take: Take, direction: Vec3, time: number) =>
  rotate(pose(name, take, time), direction);

/** Of the prop's outermost points over the quay at the end of the flight. */
function heights(name: string, take: Take): number[] {
  const { centerOfMass, extremes } = props.get(file.throws.get(name)!.prop)!;
  const { flight } = take;
  const turned = pose(name, take, flight.duration);
  const middle = flight.centerOfMass(flight.duration)[1];
  return Array.from({ length: extremes.length / 3 }, (_, i) => {
    const [x, y, z] = extremes.subarray(3 * i, 3 * i + 3);
    return middle + rotate(turned, subtract([x, y, z], centerOfMass))[1];
  });
}

const mean = (values: number[]) => values.reduce((sum, value) => sum + value, 0) / values.length;

it("every throw gets all its takes", () => {
  expect(file.throws.size).toBeGreaterThanOrEqual(10);
  for (const list of takes.values()) expect(list.length).toBeGreaterThanOrEqual(8);
});

it("every prop weighs what such a thing weighs, without a warning", () => {
  // kg, from memory: such a spanner 0.3–0.5, an ash oar of 2.1 m 2–3, a rope quoit 0.2–0.3, a hand lantern 0.3–0.6, a
  // marlinspike 0.3–0.7, a small crate 2–3 and its 4 of tea; a coin of the token's size and 3 mm 0.03–0.04.
  const kilograms: Record<string, [number, number]> = {
    spanner: [0.3, 0.5],
    oar: [2, 3],
    quoit: [0.2, 0.3],
    token: [0.03, 0.04],
    lantern: [0.3, 0.6],
    marlinspike: [0.3, 0.7],
    "tea-crate": [6, 7],
  };
  expect([...props.keys()].sort()).toEqual(Object.keys(kilograms).sort());
  for (const [name, [least, most]] of Object.entries(kilograms)) {
    const { mass, warnings } = props.get(name)!;
    expect(warnings, name).toEqual([]);
    expect(mass, name).toBeGreaterThan(least);
    expect(mass, name).toBeLessThan(most);
  }
});

it("everything flies as a hand can throw it", () => {
  // From memory: a relaxed throw leaves the hand at 3 to 12 m/s and flies for half a second to two; what slips off an edge is slower.
  for (const [name, list] of takes) {
    for (const { flight } of list) {
      const isThrown = !["crate-slips", "spanner-drops"].includes(name);
      expect(length(flight.velocity(0)), name).toBeGreaterThan(isThrown ? 2.7 : 0.5);
      expect(length(flight.velocity(0)), name).toBeLessThan(12);
      expect(flight.duration, name).toBeGreaterThan(0.4);
      expect(flight.duration, name).toBeLessThan(1.8);
    }
  }
});

describe("what the comments of the throw file claim", () => {
  it("the spanner about its short axis turns about that alone, and lies as it lay when it is caught", () => {
    const name = "spanner-hand-to-hand";
    for (const take of takesOf(name)) {
      expect(axisShares(take.flight)[2]).toBeGreaterThan(0.999);
      const [start, end] = [0, take.flight.duration].map((time) => pointing(name, take, [0, 0, 1], time));
      expect(dot(start, end)).toBeGreaterThan(0.999);
    }
  });

  it("the spanner about its middle axis turns over: for a while it turns about that axis the other way", () => {
    for (const { flight } of takesOf("spanner-tumble")) {
      const start = flight.spin(0)[1];
      const shares = Array.from(
        { length: 200 },
        (_, i) => flight.spin((flight.duration * i) / 199)[1] / start,
      );
      expect(Math.min(...shares)).toBeLessThan(-0.9);
    }
  });

  it("the spike's point stays where it was aimed while it drills, and is in front after a turn and a half", () => {
    for (const take of takesOf("spike-to-mast")) {
      const [start, end] = [0, take.flight.duration].map((time) =>
        pointing("spike-to-mast", take, [0, 1, 0], time),
      );
      expect(dot(start, end)).toBeGreaterThan(Math.cos((10 * Math.PI) / 180));
    }
    for (const take of takesOf("spike-end-over-end")) {
      const end = pointing("spike-end-over-end", take, [0, 1, 0], take.flight.duration);
      expect(end[2]).toBeGreaterThan(0.99);
    }
  });

  it("what has to arrive in a certain way does, in every take, after about the turns wished", () => {
    const DEGREES = Math.PI / 180;
    const within = (degrees: number) => Math.cos(degrees * DEGREES) - 1e-12;
    for (const take of takesOf("spanner-caught")) {
      const { duration } = take.flight;
      const prop = props.get("spanner")!;
      // the grip, seen from the balance point, towards the catcher; the hand allows 3 degrees
      const [x, , z] = prop.centerOfMass;
      const grip = pointing("spanner-caught", take, [-x, 0, -z], duration);
      const { at } = take.drawn.arrive;
      const ahead = [at![0], 0, at![2]];
      expect(dot(grip, ahead as unknown as Vec3) / length(grip) / Math.hypot(...ahead)).toBeGreaterThan(
        within(3),
      );
      expect(Math.abs(turnsAboutMomentum(take.flight) - 1.5)).toBeLessThan(0.1);
    }
    for (const take of takesOf("spike-point-first")) {
      const { flight } = take;
      const end = pointing("spike-point-first", take, [0, 1, 0], flight.duration);
      const travel = flight.velocity(flight.duration);
      // the socket of the point lies on the spike's axis but for its lashing: a tenth of a degree
      expect(dot(end, travel) / length(travel)).toBeGreaterThan(within(0.5));
      expect(Math.abs(turnsAboutMomentum(flight) - 1.5)).toBeLessThan(0.15);
    }
    for (const take of takesOf("oar-blade-first")) {
      const end = pointing("oar-blade-first", take, [0, 1, 0], take.flight.duration);
      expect(end[2]).toBeGreaterThan(within(4.5)); // 4 of scatter, and the mark up to 0.15 m aside in 3.2 m
      const turned = pointing("oar-blade-first", take, [0, 0, 1], take.flight.duration);
      expect(turned[0]).toBeGreaterThan(within(7));
    }
  });

  it("the token lands heads, heads, tails, however it left the thumb", () => {
    const list = takesOf("token-called");
    const heads = (take: Take, time: number) => pointing("token-called", take, [0, 1, 0], time)[1];
    list.forEach((take, i) => {
      // the enamel moves the balance point by microns: the socket is off the axis by a hundredth of a degree or so
      expect(heads(take, take.flight.duration) * (i % 3 === 2 ? -1 : 1)).toBeGreaterThan(0.999);
    });
    expect(new Set(list.map((take) => Math.sign(heads(take, 0)))).size).toBe(2);
  });

  it("the oar's blade stays in the plane of the turn one way, and rolls over the other", () => {
    const greatestTilt = (name: string, blade: Vec3) =>
      takesOf(name).map((take) =>
        Math.max(
          ...Array.from({ length: 100 }, (_, i) => {
            const now = pointing(name, take, blade, (take.flight.duration * i) / 99);
            return (Math.acos(Math.min(1, dot(now, pointing(name, take, blade, 0)))) * 180) / Math.PI;
          }),
        ),
      );
    // The direction along the axis of the turn: the blade's normal is z, its width x.
    for (const degrees of greatestTilt("oar-end-over-end", [0, 0, 1])) expect(degrees).toBeLessThan(25);
    for (const degrees of greatestTilt("oar-blade-rolls", [1, 0, 0])) expect(degrees).toBeGreaterThan(90);
  });

  it("the token leaves the thumb heads up and tails up by turns", () => {
    takesOf("token-flip").forEach((take, i) => {
      // scattered by up to 4 degrees
      expect(pointing("token-flip", take, [0, 1, 0], 0)[1] * (i % 2 ? -1 : 1)).toBeGreaterThan(0.99);
    });
  });

  it("of the lantern's two arcs the one under the awning takes twice as long", () => {
    const durations = takesOf("lantern-to-deck").map(({ flight }) => flight.duration);
    const [low, high] = [0, 1].map((odd) => mean(durations.filter((_, i) => i % 2 === odd)));
    expect(high / low).toBeGreaterThan(2);
  });

  it("the drifting lantern needs a quarter to a third of the Earth's gravity", () => {
    for (const { flight } of takesOf("lantern-drifts")) {
      const share = length(flight.launch.gravity) / 9.80665; // standard gravity, CGPM 1901
      expect(share).toBeGreaterThan(0.2);
      expect(share).toBeLessThan(0.37);
    }
  });

  it("what falls on the quay ends with its lowest point on the stones", () => {
    for (const name of ["crate-over-railing", "spanner-drops"]) {
      for (const take of takesOf(name)) expect(Math.min(...heights(name, take))).toBeCloseTo(0, 10);
    }
  });

  it("the crate that is set down stands on three of its points or more, on more than one of its sides in all", () => {
    const name = "crate-set-down";
    const sides = takesOf(name).map((take) => {
      const low = heights(name, take).filter((height) => height < 1e-6);
      expect(low.length).toBeGreaterThanOrEqual(3);
      for (const height of low) expect(Math.abs(height)).toBeLessThan(1e-6);
      return rotateBack(pose(name, take, take.flight.duration), [0, -1, 0]).map((x) => Math.round(x));
    });
    expect(new Set(sides.map(String)).size).toBeGreaterThan(1);
  });

  it("the quoit lies flat on the planks of the hatch, between its boards", () => {
    const name = "quoit-over-coaming";
    for (const take of takesOf(name)) {
      const up = pointing(name, take, [0, 1, 0], take.flight.duration);
      expect(Math.abs(up[1])).toBeGreaterThan(1 - 1e-9);
      expect(Math.min(...heights(name, take))).toBeCloseTo(0.1, 9);
      const z = take.flight.centerOfMass(take.flight.duration)[2];
      expect(z).toBeGreaterThan(2.36);
      expect(z).toBeLessThan(3.5);
    }
  });

  it("the crate would clip the railing now and then, were it not drawn again", () => {
    const name = "crate-over-railing";
    const entry = file.throws.get(name)!;
    const free = { ...entry, limits: undefined };
    const prop = props.get(entry.prop)!;
    const unchecked = takesOf(name).map(({ number }) => solveTake(file, free, prop, number));
    expect(unchecked.some(({ candidate }, i) => candidate !== takesOf(name)[i].candidate)).toBe(true);
  });
});
