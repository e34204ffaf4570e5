import { describe, expect, it } from "vitest";
import type { FlyingBody, Side } from "../../src/flight/clearance.js";
import { firstTouch } from "../../src/flight/touch.js";
import { IDENTITY } from "../../src/math/quat.js";
import { scale, type Vec3 } from "../../src/math/vec3.js";
import { shapeLowest } from "../../src/prop/support.js";
import { pointsSupport } from "../../src/prop/support-points.js";
import {
  anyDirection,
  anyMoments,
  anyOrientation,
  anySupport,
  between,
  flyingBody,
  lowestAlong,
  random,
} from "./tumbling.js";

const G = 9.80665;
const floor = (offset: number): Side => ({ normal: [0, 1, 0], offset });
const sphere = (radius: number) => ({ support: { lowest: shapeLowest({ sphere: radius }) }, reach: radius });
const rod = (half: number) => ({
  support: pointsSupport(Float64Array.of(half, 0, 0, -half, 0, 0)),
  reach: half,
});

describe("a first touch against closed forms", () => {
  it("a tumbling sphere touches when its centre is one radius above the floor", () => {
    const body = flyingBody(
      { velocity: [1, 3, 0], moments: [1, 2, 2.5], spin: [3, 20, 5], duration: 2 },
      sphere(0.15),
    );
    // y = 3 t − g t²/2 = −1 + 0.15 (quadratic formula)
    expect(firstTouch(body, floor(-1))).toBeCloseTo((3 + Math.sqrt(9 + 2 * G * 0.85)) / G, 12);
  });

  it("a dropped box that turns about a level edge touches with the corner that is then lowest", () => {
    const [w, h, rate] = [0.3, 0.4, 5];
    const box = { support: { lowest: shapeLowest({ box: [w, h, 0.2] }) }, reach: 0.3 };
    const body = flyingBody({ velocity: [0, 0, 0], spin: [0, 0, rate], duration: 2 }, box);
    const touch = firstTouch(body, floor(-1))!;
    // Centre's height is that of the lowest corner: (w |sin a| + h |cos a|)/2 (elementary geometry of a turned rectangle), a = rate·t.
    const a = rate * touch;
    const gap = 1 - 0.5 * G * touch * touch - 0.5 * (w * Math.abs(Math.sin(a)) + h * Math.abs(Math.cos(a)));
    expect(Math.abs(gap)).toBeLessThan(2e-12);
  });

  it("a rod that turns without gravity touches at the angle whose sine is height over half length", () => {
    const body = flyingBody({ gravity: [0, 0, 0], spin: [0, 0, 2], duration: 3 }, rod(1));
    // From level, an end sinks as sin(2t): to 0.5 at 30° (π/6).
    expect(firstTouch(body, floor(-0.5))).toBeCloseTo(Math.PI / 12, 12);
  });

  it("a weight on a weightless arm, swung over the top, touches at the angle whose cosine is the floor's height", () => {
    // Nothing sinks with a greater acceleration than this, rate² times arm, at the top: steps that are too long go through the floor.
    const weight = { support: pointsSupport(Float64Array.of(0, 1, 0)), reach: 1 };
    for (const height of [0.999, 0.9, 0.5, 0.01]) {
      const body = flyingBody({ gravity: [0, 0, 0], spin: [0, 0, 3], duration: 2 }, weight);
      expect(firstTouch(body, floor(height))).toBeCloseTo(Math.acos(height) / 3, 11);
    }
  });

  it("a rod that only grazes the floor touches, and one a billionth higher does not", () => {
    const graze = (height: number) =>
      firstTouch(
        flyingBody(
          { centerOfMass: [0, height, 0], gravity: [0, 0, 0], spin: [0, 0, 2], duration: 1.5 },
          rod(1),
        ),
        floor(0),
      );
    // Lowest where the rod stands upright, at a quarter turn. A gap of 1e-12 m is a touch: 1 − sin within 1e-12 is an angle of √2e-12.
    expect(Math.abs(graze(1)! - Math.PI / 4)).toBeLessThan(Math.sqrt(2e-12) / 2);
    expect(graze(1 + 1e-9)).toBeUndefined();
  });
});

describe("a body that touches at release", () => {
  it("parts first: thrown straight up from the floor, it is back after 2v/g", () => {
    const body = flyingBody({ centerOfMass: [0, 0.1, 0], velocity: [0, 2, 0], duration: 1 }, sphere(0.1));
    // 2 v / g: throw straight up (any mechanics text)
    expect(firstTouch(body, floor(0))).toBeCloseTo((2 * 2) / G, 12);
  });

  it("and one thrown onto a deck from below it touches coming down", () => {
    const body = flyingBody({ velocity: [0, 7, 0], duration: 2 }, sphere(0.1));
    // 7 t − g t²/2 = 1.1, the later root
    expect(firstTouch(body, floor(1))).toBeCloseTo((7 + Math.sqrt(49 - 2 * G * 1.1)) / G, 12);
  });

  it("never touches where it never parts", () => {
    expect(
      firstTouch(flyingBody({ velocity: [3, 0, 0], spin: [0, 0, 9] }, sphere(0.1)), floor(-0.1)),
    ).toBeUndefined();
    // A rise of v²/2g = 0.9e-6 m is not a thousandth of a millimetre.
    const hop = flyingBody({ velocity: [0, Math.sqrt(2 * G * 0.9e-6), 0] }, sphere(0.1));
    expect(firstTouch(hop, floor(-0.1))).toBeUndefined();
    const higher = flyingBody({ velocity: [0, Math.sqrt(2 * G * 1.1e-6), 0] }, sphere(0.1));
    expect(firstTouch(higher, floor(-0.1))).toBeCloseTo(2 * Math.sqrt((2 * 1.1e-6) / G), 9);
  });
});

/** A tumble that ends a little after its centre of mass passes the floor, so that most touch and some do not. */
function anyTumble(next: () => number): { body: FlyingBody; side: Side } {
  const shape = anySupport(next);
  const drop = between(next, 0.3, 3);
  const climb = between(next, -2, 4);
  const fall = (climb + Math.sqrt(climb * climb + 2 * G * drop)) / G;
  const orientation = anyOrientation(next);
  const spin = scale(anyDirection(next), between(next, 0, 30));
  const body = flyingBody(
    {
      velocity: [between(next, -2, 2), climb, between(next, -2, 2)],
      orientation,
      spin,
      moments: anyMoments(next),
      duration: fall * between(next, 0.8, 1.05),
    },
    shape,
    anyOrientation(next),
  );
  return { body, side: floor(-drop) };
}

describe("a first touch against a scan", () => {
  // SOAK=1 looks at 1,000 tumbles a million times each.
  const soak = Boolean(process.env.SOAK);
  const [tumbles, looks] = soak ? [1000, 1_000_000] : [150, 4000];

  it(`of ${looks} moments in each of ${tumbles} random tumbles finds none missed and none early`, {
    timeout: 1e8,
  }, () => {
    const next = random(1);
    let touched = 0;
    for (let i = 0; i < tumbles; i++) {
      const { body, side } = anyTumble(next);
      const up: Vec3 = side.normal;
      const { duration } = body.flight;
      const gap = (t: number) => lowestAlong(body, up, t) - side.offset;
      if (gap(0) <= 1e-9) continue;
      const touch = firstTouch(body, side);
      // early: the prop has to be there at the time that is named
      if (touch !== undefined) expect(Math.abs(gap(touch)), `tumble ${i}`).toBeLessThan(2e-12);
      touched += touch === undefined ? 0 : 1;
      // missed: nothing may have been lower before
      const end = touch ?? duration;
      let least = Number.POSITIVE_INFINITY;
      for (let k = 0; k < looks; k++) least = Math.min(least, gap((end * k) / looks));
      expect(least, `tumble ${i}`).toBeGreaterThan(-1e-13);
    }
    expect(touched).toBeGreaterThan(tumbles / 3);
    expect(touched).toBeLessThan(tumbles);
  });
});

it("axes of the model that are not the principal ones turn with the body", () => {
  // The rod lies along the model's x, which is the principal z here (a quarter turn about y): turning about the principal x moves it.
  const axes = [0, Math.SQRT1_2, 0, Math.SQRT1_2] as const;
  const body = flyingBody(
    { gravity: [0, 0, 0], spin: [2, 0, 0], orientation: IDENTITY, duration: 3 },
    rod(1),
    axes,
  );
  expect(firstTouch(body, floor(-0.5))).toBeCloseTo(Math.PI / 12, 12);
});
