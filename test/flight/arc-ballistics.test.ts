import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { type ArcRequest, arcPosition, solveArc } from "../../src/flight/arc.js";
import { RequestError } from "../../src/math/request-error.js";
import { distance, length, type Vec3 } from "../../src/math/vec3.js";

/**
 * Source of the numbers: test/data/ballistics.json, launch problems worked out apart from this program and checked by back-substitution to 45
 * digits (format and conventions in the file).
 */
interface Problem {
  id: string;
  from: Vec3;
  to: Vec3;
  gravity: Vec3;
  given: "time" | "apex" | "speed" | "angle_deg";
  value: number;
  arc?: "low" | "high";
  refuse: boolean;
  v0: Vec3;
  flight_time: number;
  vertex_time: number;
  vertex_inside_flight: boolean;
  max_height_above_from: number;
}
const file = JSON.parse(readFileSync(new URL("../data/ballistics.json", import.meta.url), "utf8"));
const problems: Problem[] = file.problems;
const KEY = { time: "after", apex: "apex", speed: "speed", angle_deg: "elevation" } as const;
const PATH = { time: "arrive.after", apex: "arc.apex", speed: "arc.speed", angle_deg: "arc.elevation" };

const request = (p: Problem): ArcRequest => ({
  from: p.from,
  to: p.to,
  gravity: p.gravity,
  [KEY[p.given]]: p.value,
  branch: p.arc,
});

describe("arcs agree with the independently solved launch problems", () => {
  it.each(problems.filter((p) => !p.refuse).map((p) => [p.id, p] as const))("%s", (_, p) => {
    const arc = solveArc(request(p));
    expect(distance(arc.velocity, p.v0)).toBeLessThan(1e-10 * length(p.v0));
    expect(Math.abs(arc.duration - p.flight_time)).toBeLessThan(1e-10 * p.flight_time);
    expect(Math.abs(arc.apex.rise - p.max_height_above_from)).toBeLessThan(1e-10);
    if (p.vertex_inside_flight) expect(Math.abs(arc.apex.time - p.vertex_time)).toBeLessThan(1e-10);
    // the mark is hit to rounding, a stricter bar than the conditions
    expect(distance(arcPosition(p.from, arc, arc.duration), p.to)).toBeLessThan(1e-13);
  });
});

describe("launch problems without an answer are refused at the condition that cannot hold", () => {
  it.each(problems.filter((p) => p.refuse).map((p) => [p.id, p] as const))("%s", (_, p) => {
    let error: unknown;
    try {
      solveArc(request(p));
    } catch (caught) {
      error = caught;
    }
    expect(error).toBeInstanceOf(RequestError);
    expect((error as RequestError).path.join(".")).toBe(PATH[p.given]);
  });
});
