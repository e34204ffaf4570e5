import { readFileSync } from "node:fs";
import { parse } from "csv-parse/sync";
import { describe, expect, it } from "vitest";
import { chainMotion, type TakeMotion, takeMotion } from "../../src/bake/take-motion.js";
import { angleBetween, type Quat } from "../../src/math/quat.js";
import { distance, type Vec3 } from "../../src/math/vec3.js";
import { type TakeTableOptions, takeTable } from "../../src/record/take-table.js";
import { parseThrowFile } from "../../src/throwfile/parse.js";
import { type Baked, baked } from "../bake/baked.js";

/** A row by its columns' names, as a general reader of CSV (csv-parse) has it. */
type Row = Record<string, string>;

const read = (text: string): Row[] => parse(text, { columns: true });
const tableOf = (take: TakeMotion, options: TakeTableOptions) => read(takeTable(take, options));

const vector = (row: Row, name: string, unit: string): Vec3 => {
  const [x, y, z] = ["x", "y", "z"].map((axis) => Number(row[`${name}_${axis}_${unit}`]));
  return [x, y, z];
};
const place = (row: Row) => vector(row, "centerOfMass", "m");
const velocity = (row: Row) => vector(row, "velocity", "m_per_s");
const turning = (row: Row) => vector(row, "angularVelocity", "rad_per_s");
const rotation = (row: Row): Quat => {
  const [x, y, z, w] = ["x", "y", "z", "w"].map((axis) => Number(row[`rotation_${axis}`]));
  return [x, y, z, w];
};

const THROWS = `
seed: table
props: { stick: { shape: { box: [0.04, 0.3, 0.05] }, weights: [{ at: [0, 0.12, 0], mass: 0.5 }] } }
throws:
  lob:
    prop: stick
    takes: 2
    release: { at: [0, 1.4, 0], scatter: 0..5 }
    arrive: { at: [2, 1, 0.4], after: 0.75 }
    spin: { axis: middle, turns: 2.5 }
  back: { like: lob, arrive: { at: [0, 1.4, 0] } }
  held: { like: lob, hold: { before: 12f, after: 6f } }
chains:
  round: { throws: [lob, back] }
`;

/** Motions of all takes, throws before chains, and the axes of the prop. */
function motions(text: string, { bake }: Baked) {
  const file = parseThrowFile("test.throws.yaml", text);
  const all = [
    ...bake.throws.flatMap((made) => made.takes.map((take) => takeMotion(file, made, take))),
    ...bake.chains.flatMap((made) => made.takes.map((take) => chainMotion(file, made, take))),
  ];
  const { axes } = bake.props.get("stick")!.prop.principal;
  return { axes, host: file.host, of: (name: string) => all.find((take) => take.name === name)! };
}

// a free body's centre of mass: Galilei's parabola; standard gravity, 3rd CGPM (1901)
const parabola = (from: Vec3, v: Vec3, t: number): Vec3 => [
  from[0] + v[0] * t,
  from[1] + v[1] * t - (9.80665 / 2) * t * t,
  from[2] + v[2] * t,
];

describe("a take's table", () => {
  it("has the centre of mass on the parabola of its first row, with the velocity that falls", async () => {
    const { axes, of } = motions(THROWS, await baked(THROWS));
    const rows = tableOf(of("lob_01"), { rate: 240, axes });
    expect(rows).toHaveLength(181);
    const [from, v] = [place(rows[0]), velocity(rows[0])];
    rows.forEach((row, i) => {
      const t = Number(row.time_s);
      expect(t).toBeCloseTo(i / 240, 11);
      expect(distance(place(row), parabola(from, v, t))).toBeLessThan(1e-10);
      expect(distance(velocity(row), [v[0], v[1] - 9.80665 * t, v[2]])).toBeLessThan(1e-10);
    });
  });

  // rotations from 75-digit Taylor series, worked out independently of this program
  const { cases } = JSON.parse(readFileSync("test/data/flights.json", "utf8"));
  for (const { id, moments, omega_body_0, q0, samples } of cases.filter(
    ({ samples }: { samples: { amp_norm: number }[] }) => samples.every(({ amp_norm }) => amp_norm < 1e4),
  ))
    it(`has the rotation and angular velocity of the reference flight ${id}`, () => {
      const still: Vec3 = [0, 0, 0];
      const last = samples.at(-1).t;
      const launch = {
        ...{ centerOfMass: still, velocity: still, gravity: still },
        ...{ orientation: q0, spin: omega_body_0, moments, duration: last },
      };
      const part = { throw: "turn", start: 0, launch, turnsAlone: false } as TakeMotion["parts"][number];
      const take: TakeMotion = {
        ...{ name: "turn_01", throw: "turn", take: 1, prop: "stick" },
        ...{ duration: last, parts: [part] },
      };
      for (const sample of samples) {
        const rows = tableOf(take, { rate: 1 / sample.t, axes: [0, 0, 0, 1] });
        // the row after one step; a clip as long as one step ends with it
        const row = rows[1];
        expect(Number(row.time_s)).toBeCloseTo(sample.t, 10);
        expect(angleBetween(rotation(row), sample.q)).toBeLessThan(1e-8);
        // ω in the world = q·ω in the body·q*, written out (Kuipers, Quaternions and Rotation Sequences, 1999, eq. 5.11)
        const [x, y, z, w] = sample.q;
        const [a, b, c] = sample.omega_body;
        const world: Vec3 = [
          (w * w + x * x - y * y - z * z) * a + 2 * (x * y - w * z) * b + 2 * (x * z + w * y) * c,
          2 * (x * y + w * z) * a + (w * w - x * x + y * y - z * z) * b + 2 * (y * z - w * x) * c,
          2 * (x * z - w * y) * a + 2 * (y * z + w * x) * b + (w * w - x * x - y * y + z * z) * c,
        ];
        expect(distance(turning(row), world)).toBeLessThan(1e-8 * Math.hypot(a, b, c));
      }
    });

  it("begins with the release state of takes.json and ends with its arrival, digit for digit", async () => {
    const made = await baked(THROWS);
    const { axes, of } = motions(THROWS, made);
    for (const { name, release, arrival, duration, parts } of made.record.clips.filter(
      ({ name }) => !name.startsWith("held"),
    )) {
      const rows = tableOf(of(name), { rate: 30, axes });
      for (const [row, state] of [
        [rows[0], release],
        [rows.at(-1)!, arrival],
      ] as const) {
        const cells = [state.centerOfMass, state.rotation, state.velocity, state.angularVelocity].flat();
        const written = cells.map((cell) => (Math.abs(cell) < 1e-12 ? 0 : Number(cell.toPrecision(12))));
        expect(Object.values(row).slice(1).map(Number)).toEqual(written);
      }
      expect(rows.at(-1)!.time_s).toBe(String(Number(duration.toPrecision(12))));
      expect(parts !== undefined).toBe(name.startsWith("round"));
    }
  });

  it("has one row more, at the end, where the clip is no whole number of steps", async () => {
    const { axes, of } = motions(THROWS, await baked(THROWS));
    const times = tableOf(of("lob_01"), { rate: 7, axes }).map(({ time_s }) => time_s);
    expect(times).toEqual(
      [0, 1 / 7, 2 / 7, 3 / 7, 4 / 7, 5 / 7, 0.75].map((t) => String(Number(t.toPrecision(12)))),
    );
  });

  it("stands still in holds: the row at the release flies already, the one at the arrival no longer", async () => {
    const { axes, of } = motions(THROWS, await baked(THROWS));
    const rows = tableOf(of("held_01"), { rate: 60, axes });
    // 12 frames and 6 frames of 1/30 s round 0.75 s
    expect(rows.at(-1)!.time_s).toBe("1.35");
    const flown = rows.filter((row) => velocity(row).some((c) => c !== 0));
    expect([flown[0].time_s, flown.at(-1)!.time_s]).toEqual(["0.4", String((69 / 60 - 1 / 60).toFixed(11))]);
    for (const row of rows.slice(0, 24)) {
      expect(place(row)).toEqual(place(rows[24]));
      expect([...velocity(row), ...turning(row)]).toEqual([0, 0, 0, 0, 0, 0]);
    }
    for (const row of rows.slice(69)) {
      expect(place(row)).toEqual(place(rows.at(-1)!));
      expect([...velocity(row), ...turning(row)]).toEqual([0, 0, 0, 0, 0, 0]);
    }
    expect(turning(rows[24]).some((c) => c !== 0)).toBe(true);
  });

  it("has the motion that begins where two throws of a chain meet", async () => {
    const made = await baked(THROWS);
    const { axes, of } = motions(THROWS, made);
    const rows = tableOf(of("round_01"), { rate: 20, axes });
    const parts = made.record.clips.find(({ name }) => name === "round_01")!.parts!;
    const joint = rows.find(({ time_s }) => time_s === "0.75")!;
    expect(distance(velocity(joint), parts[1].release.velocity!)).toBeLessThan(1e-10);
    expect(distance(velocity(joint), parts[0].arrival.velocity!)).toBeGreaterThan(1);
    expect(rows.at(-1)!.time_s).toBe("1.5");
    expect(distance(velocity(rows.at(-1)!), parts[1].arrival.velocity!)).toBeLessThan(1e-10);
  });

  it("leaves the velocity empty where nothing but the turning is known", async () => {
    const text = THROWS.replace("seed: table", "seed: table\nbake: { layout: turn-only }")
      .replace("at: [2, 1, 0.4], ", "")
      .replace(/ {2}back.*\n/, "")
      .replace(/chains:\n.*\n/, "");
    const { axes, of } = motions(text, await baked(text));
    const rows = tableOf(of("held_01"), { rate: 30, axes });
    for (const row of rows) {
      expect([row.velocity_x_m_per_s, row.velocity_y_m_per_s, row.velocity_z_m_per_s]).toEqual(["", "", ""]);
      expect(place(row)).toEqual(place(rows[0]));
    }
    expect(turning(rows[15]).some((c) => c !== 0)).toBe(true);
  });

  it("is in the host's coordinates, and its header says so", async () => {
    // the engine's x, y, z are glTF's z, x, y; centimetres
    const hosted = THROWS.replace("seed: table", "seed: table\nhost: { axes: [z, x, y], unit: 0.01 }")
      .replace("[0, 1.4, 0], scatter", "[0, 0, 140], scatter")
      .replace("[2, 1, 0.4]", "[40, 200, 100]")
      .replace("{ at: [0, 1.4, 0] }", "{ at: [0, 0, 140] }");
    const plain = motions(THROWS, await baked(THROWS));
    const { axes, host, of } = motions(hosted, await baked(hosted));
    const rows = tableOf(of("lob_02"), { rate: 30, axes, host });
    tableOf(plain.of("lob_02"), { rate: 30, axes }).forEach((row, i) => {
      const [x, y, z] = place(row);
      expect(distance(vector(rows[i], "centerOfMass", "units"), [100 * z, 100 * x, 100 * y])).toBeLessThan(
        1e-8,
      );
      const [vx, vy, vz] = velocity(row);
      expect(
        distance(vector(rows[i], "velocity", "units_per_s"), [100 * vz, 100 * vx, 100 * vy]),
      ).toBeLessThan(1e-8);
      // the axes are a rotation of glTF's, no mirror: turning keeps its sense
      const [wx, wy, wz] = turning(row);
      expect(distance(turning(rows[i]), [wz, wx, wy])).toBeLessThan(1e-9);
    });
  });

  it("refuses more rows than anything reads, and no rate at all", async () => {
    const { axes, of } = motions(THROWS, await baked(THROWS));
    for (const rate of [1e12, 0, -1, Number.NaN, Number.POSITIVE_INFINITY])
      expect(() => takeTable(of("lob_01"), { rate, axes })).toThrow(
        /^rate: is .* a second, and lob_01 lasts 0.75 s/,
      );
  });
});
