import { expect, it } from "vitest";
import { type PropOptions, weigh } from "../../src/prop/prop.js";

// Densities: water 1000, ash wood 650, steel 7850, osmium 22,590 kg/m³ (handbook values, from memory).

const BAR = { box: [0.02, 0.03, 0.2] } as const;
const warnings = async (options: PropOptions) => (await weigh("bar", BAR as never, options)).warnings;

it.each<[string, PropOptions, RegExp]>([
  ["a density in g/cm³", { density: 0.65 }, /^density is 0\.65 kg\/m³, .* write 650$/],
  ["one of a material in g/cm³", { density: { bar: 7.85 } }, /^density\.bar is 7\.85 kg\/m³, .* write 7850$/],
  ["a density that nothing has", { density: 78_500 }, /^density is 78500 kg\/m³, more than any metal/],
  // 190 g is 1583 kg/m³ here
  ["a mass in grams", { mass: 190 }, /^mass: 190 kg in 0\.12 litres .* 190 g is 0\.19$/],
  ["a weight in grams", { weights: [{ at: [0, 0, 0], mass: 40 }] }, /^weights: .* in kilograms$/],
  [
    "a point in centimetres",
    { points: { grip: [0, 0, 8] } },
    /^points\.grip is 8 m from .* in metres, after scale$/,
  ],
  ["a weight's place in millimetres", { weights: [{ at: [0, 0, 90], mass: 0.01 }] }, /^weights\.0\.at is/],
  ["a centre of mass in millimetres", { centerOfMass: [0, 0, 20] }, /^centerOfMass is 20 m from/],
])("%s is doubted, with the key that answers", async (_, options, message) => {
  expect((await warnings(options))[0]).toMatch(message);
});

it.each<[string, PropOptions]>([
  ["foam", { density: 15 }],
  ["wood", { density: 650 }],
  ["platinum", { density: 21_450 }],
  ["a part that is left out", { density: { bar: 1000, default: 0 } }],
  ["densities that only share out a stated mass", { density: 0.65, mass: 0.1 }],
  ["a steel bar's mass", { mass: 0.94 }],
  ["a point on a string beyond the prop", { points: { end: [0, 0, 0.4] } }],
  ["a small weight", { weights: [{ at: [0, 0, 0.09], mass: 0.05 }] }],
])("%s is not", async (_, options) => {
  expect(await warnings(options)).toEqual([]);
});
