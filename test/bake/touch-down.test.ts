import { describe, expect, it } from "vitest";
import { rotate } from "../../src/math/quat.js";
import { ThrowFileError } from "../../src/throwfile/errors.js";
import { baked } from "./baked.js";

const G = 9.80665;
const throwing = (keys: string, top = "") => `
${top}
props:
  ball: { shape: { sphere: 0.1 }, points: { rim: [0, 0, 0.1] } }
  rod: { shape: { cylinder: { radius: 0.01, length: 1.2 } }, points: { end: [0, 0.6, 0] } }
  die: { shape: { box: [0.1, 0.2, 0.3] } }
throws:
  drop:
${keys.replace(/^/gm, "    ")}
`;
const only = async (keys: string, top = "") => (await baked(throwing(keys, top))).record.clips[0];

describe("a flight that a floor ends", () => {
  it("takes as long as the ball's lowest point needs to fall there", async () => {
    const clip = await only(
      "prop: ball\nrelease: { at: [0, 2, 0], velocity: [1, 3, 0] }\narrive: { floor: 0.5 }",
    );
    // 2 − 0.1 + 3 t − g t²/2 = 0.5 (quadratic formula)
    expect(clip.duration).toBeCloseTo((3 + Math.sqrt(9 + 2 * G * 1.4)) / G, 12);
    expect(clip.arrival.centerOfMass[1]).toBeCloseTo(0.6, 11);
    expect(clip.miss).toEqual({ position: expect.any(Number), angle: null });
    expect(clip.miss.position).toBeLessThan(2e-12);
    // v²/2g
    expect(clip.apex.rise).toBeCloseTo(9 / (2 * G), 12);
    expect(clip.apex.time).toBeCloseTo(3 / G, 12);
  });

  it("has its highest point within: at release of what is thrown down", async () => {
    const clip = await only(
      "prop: ball\nrelease: { at: [0, 2, 0], velocity: [1, -3, 0] }\narrive: { floor: 0 }",
    );
    expect(clip.apex).toEqual({ time: 0, rise: 0 });
  });

  it("ends with a corner of the box on the floor and no other below it, whatever spins and however", async () => {
    const { record } = await baked(
      throwing(
        "prop: die\ntakes: 12\nrelease: { at: [0, 1.2, 0], facing: any }\narc: { heading: 0, speed: 2..4, elevation: 0..60 }\narrive: { floor: 0.25 }\nspin: { axis: any, rate: 1..5, wobble: 0..20 }",
      ),
    );
    for (const { arrival } of record.clips) {
      // Eight corners of the box by hand.
      const heights = [-1, 1].flatMap((x) =>
        [-1, 1].flatMap((y) =>
          [-1, 1].map(
            (z) => arrival.centerOfMass[1] + rotate(arrival.rotation, [0.05 * x, 0.1 * y, 0.15 * z])[1],
          ),
        ),
      );
      expect(Math.min(...heights)).toBeCloseTo(0.25, 10);
    }
  });

  it("turns at the rate that was asked for, until then", async () => {
    const clip = await only(
      "prop: die\nrelease: { at: [0, 2, 0], velocity: [0, 1, 0] }\narrive: { floor: 0 }\nspin: { axis: x, rate: 3 }",
    );
    expect(clip.turns / clip.duration).toBeCloseTo(3, 10);
  });

  it("goes with a velocity and a place of a point off the centre of mass", async () => {
    const { release, draws } = await only(
      "prop: rod\nrelease: { at: [0, 2, 0], point: end, velocity: [1, 2, 3] }\narrive: { floor: 0 }\nspin: { axis: x, rate: 1 }",
    );
    // v_point = v + ω × r, r the end's arm (rigid body kinematics)
    const [wx, wy, wz] = release.angularVelocity;
    const arm = rotate(release.rotation, [0, 0.6, 0]);
    const turning = [wy * arm[2] - wz * arm[1], wz * arm[0] - wx * arm[2], wx * arm[1] - wy * arm[0]];
    [1, 2, 3].forEach((v, i) => {
      expect(release.velocity[i] + turning[i]).toBeCloseTo(v, 10);
    });
    expect(release.centerOfMass[1] + arm[1]).toBeCloseTo(2, 10);
    expect(draws).toEqual({});
  });

  it("goes with a pose along the flight, which itself hangs on the pose", async () => {
    const { release } = await only(
      "prop: rod\nrelease: { at: [0, 2, 0], point: end, velocity: [1, 2, 3], facing: [[end, flight]] }\narrive: { floor: 0 }\nspin: { axis: x, rate: 0.5 }",
    );
    const along = rotate(release.rotation, [0, 1, 0]);
    const speed = Math.hypot(...release.velocity);
    const cosine = along.reduce((sum, x, i) => sum + (x * release.velocity[i]) / speed, 0);
    expect(cosine).toBeCloseTo(1, 9);
  });

  it("counts in the host's unit and along glTF's up", async () => {
    const host = "host: { axes: [z, -y, x], unit: 0.01 }";
    const clip = await only(
      "prop: ball\nrelease: { at: [0, -200, 0], velocity: [100, -300, 0] }\narrive: { floor: 50 }",
      host,
    );
    expect(clip.duration).toBeCloseTo((3 + Math.sqrt(9 + 2 * G * 1.4)) / G, 12);
  });

  it("is what comes of a gravity that is solved for", async () => {
    const clip = await only(
      "prop: ball\ngravity: free\nrelease: { at: [0, 1.1, 0] }\narc: { heading: 0, speed: 5, elevation: 30, apex: 1 }\narrive: { floor: 0 }",
    );
    // apex = w²/2g with w = 5 sin 30° = 2.5; then 1 + w t − g t²/2 = 0
    const gravity = (2.5 * 2.5) / 2;
    expect(clip.duration).toBeCloseTo((2.5 + Math.sqrt(6.25 + 2 * gravity)) / gravity, 10);
  });
});

describe("a floor that is never touched is refused", () => {
  const refusal = async (keys: string) => {
    const error = await baked(throwing(keys)).catch((thrown) => thrown);
    expect(error).toBeInstanceOf(ThrowFileError);
    return (error as ThrowFileError).message;
  };
  it.each([
    [
      "above all that the prop reaches",
      "prop: ball\nrelease: { at: [0, 1, 0], velocity: [1, 2, 0] }\narrive: { floor: 1.5 }",
      /throws\.drop\.arrive\.floor: no part of the prop comes down to a floor at 1\.5: .*never rises wholly above; needs a floor below 0\.9,/,
    ],
    [
      "without gravity, on the way up",
      "prop: ball\ngravity: 0\nrelease: { at: [0, 1, 0], velocity: [1, 2, 0] }\narrive: { floor: 0 }",
      /arrive\.floor: .* without gravity; give a gravity, a launch that goes down, or arrive\.after/,
    ],
    [
      "without gravity, level and out of reach",
      "prop: rod\ngravity: 0\nrelease: { at: [0, 1, 0], velocity: [1, 0, 0] }\narrive: { floor: 0 }\nspin: { axis: x, rate: 1 }",
      /arrive\.floor: .* without gravity/,
    ],
    [
      "before the apex that was asked for",
      "prop: rod\nrelease: { at: [0, 0.62, 0] }\narc: { heading: 0, elevation: 80, apex: 1 }\narrive: { floor: 0.55 }\nspin: { axis: x, rate: 9 }",
      /throws\.drop\.arc\.apex: the flight ends after .* s, before it has risen 1 m/,
    ],
  ])("%s", async (_, keys, message) => {
    expect(await refusal(keys)).toMatch(message);
  });

  it("but a rod that turns down to it touches it without gravity too", async () => {
    const clip = await only(
      "prop: rod\ngravity: 0\nrelease: { at: [0, 0.5, 0], velocity: [1, 0, 0], facing: [[y, ahead]] }\narrive: { floor: 0 }\nspin: { axis: z, rate: 0.1 }",
    );
    // Its end is 0.6 from the middle (and 0.01 thick): at 0.5 below it after asin(0.5/0.6) less what the thickness takes.
    const [half, radius] = [0.6, 0.01];
    const size = Math.hypot(half, radius);
    const angle = Math.asin(0.5 / size) - Math.atan2(radius, half);
    expect(clip.duration).toBeCloseTo(angle / (0.2 * Math.PI), 10);
  });
});
