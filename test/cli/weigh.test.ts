import { readdirSync, readFileSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { describe, expect, test } from "vitest";
import { assets, run, Workplace } from "./folder.js";

const data = (name: string) => fileURLToPath(new URL(`../data/${name}`, import.meta.url));

describe("weigh", () => {
  test("says of an oar where it balances, how its axes lie and what each throw does", async () => {
    const { code, out } = await run("weigh", assets("props/oar.glb"), "--density", "680");
    expect(code).toBe(0);
    expect(out).toMatch(/centre of mass .* mm from the model's origin/);
    expect(out).toMatch(/kind of body +prolate symmetric top/);
    expect(out).toMatch(
      /long axis .*the model's y, .* kg m²\n +a throw about it stays steady; started 3° off, the axis stays as near and circles once in \d+ turns/,
    );
    // A wobble about the middle axis of so slender a body grows a hundredfold a turn: √((I2−I1)(I3−I2)/(I1 I3)) is about 0.8.
    expect(out).toMatch(
      /middle axis .*\n +a throw about it tumbles: whatever it is off grows 1\d\d-fold with each turn; started 3° off, it rolls round the long axis/,
    );
    expect(out).toMatch(
      /short axis .*\n +a throw about it stays steady only if nothing is off: .* the spin leans over to the long axis/,
    );
  });

  test("prints 0 for what is only the rounding of stored places", async () => {
    // A quoit's whipping sets its axes off the model's by some millionths, far below the digits printed.
    const { out } = await run("weigh", assets("props/quoit.glb"));
    expect(out).toMatch(/short axis +\[0, -1, 0\]/);
    expect(out).not.toMatch(/\de-\d|0\.00000\d+,/);
  });

  test("--sheet draws every prop of a throw file into one picture, whole or not at all", async () => {
    const place = new Workplace();
    const sheet = place.path("pictures", "props.svg");
    expect((await run("weigh", place.throwFile, "--sheet", sheet)).code).toBe(0);
    const svg = readFileSync(sheet, "utf8");
    expect(svg).toMatch(/class="heading">spanner<.*class="heading">pin</s);
    expect(readdirSync(place.path("pictures"))).toEqual(["props.svg"]);
  });

  test("--sheet never goes over what is weighed", async () => {
    const place = new Workplace();
    const model = place.path("spanner.glb");
    const before = readFileSync(model);
    for (const weighed of [model, place.throwFile]) {
      const { code, out, err } = await run("weigh", weighed, "--sheet", model);
      expect({ code, out }).toEqual({ code: 2, out: "" });
      expect(err).toContain("spanner.glb");
    }
    expect(readFileSync(model).equals(before)).toBe(true);
  });

  test("warns with the key that answers", async () => {
    const { code, out } = await run("weigh", data("props/open_box.glb"));
    expect(code).toBe(0);
    expect(out).toMatch(/warning +node "prop", material "sheet": not closed: .*state wall/);
  });

  test("names the file of a model that is refused", async () => {
    const file = data("props/bad/zero_volume_flat.glb");
    const { code, out, err } = await run("weigh", file);
    expect({ code, out }).toEqual({ code: 2, out: "" });
    expect(err).toContain(`${file}: is flat: `);
  });

  test("--json has it all, for every prop of a throw file", async () => {
    const place = new Workplace();
    const { code, out } = await run("weigh", place.throwFile, "--json");
    expect(code).toBe(0);
    const { props } = JSON.parse(out);
    expect(Object.keys(props)).toEqual(["spanner", "pin"]);
    // Bar 0.02 × 0.05 × 0.3 m of 700 kg/m³: m (b² + c²)/12.
    expect(props.pin).toMatchObject({
      mass: 0.21,
      fromOrigin: 0,
      kind: "asymmetric top",
      wobbleDegrees: 3,
      modelAxes: {
        long: { axis: "z", degrees: 0 },
        middle: { axis: "y", degrees: 0 },
        short: { axis: "-x", degrees: 0 },
      },
      warnings: [],
    });
    expect(props.pin.principal.moments[2]).toBeCloseTo((0.21 * (0.0025 + 0.09)) / 12, 12);
    expect(props.pin.axes.long.behaviour).toBe("steady");
    expect(props.pin.axes.middle).toMatchObject({ behaviour: "tumbles", turnsRound: "long" });
    expect(props.pin.axes.middle.turnsPerFlip).toBeGreaterThan(0);
    expect(props.pin.axes.middle.growthPerTurn).toBeGreaterThan(2);
  });
});
