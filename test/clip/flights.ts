import { type Flight, fly } from "../../src/flight/flight.js";
import type { Quat } from "../../src/math/quat.js";
import type { Vec3 } from "../../src/math/vec3.js";

/** The twelve flights on which the methods of cutting keys were compared while planning: reach 0.15 m. */
export const PLANNED: { name: string; moments: Vec3; spin: Vec3; duration: number; orientation: Quat }[] = [
  {
    name: "A",
    moments: [0.02, 0.18, 0.19],
    spin: [0.9403, 0.4702, 15.6718],
    duration: 0.800048828125,
    orientation: [-0.68951, -0.69506, 0.06204, 0.19395],
  },
  {
    name: "B",
    moments: [0.02, 0.18, 0.19],
    spin: [0.7835, 15.6695, 0.7835],
    duration: 1.199951171875,
    orientation: [0.72409, -0.68437, -0.00726, 0.08538],
  },
  {
    name: "C",
    moments: [0.02, 0.18, 0.19],
    spin: [2.3382, 0, 13.2603],
    duration: 0.699951171875,
    orientation: [0.16, 0.47192, -0.76611, 0.40591],
  },
  {
    name: "D",
    moments: [13, 10, 5],
    spin: [0.335, 16.7485, 0.335],
    duration: 1.5,
    orientation: [0.70211, -0.64261, 0.30087, -0.05985],
  },
  {
    name: "E",
    moments: [13, 10, 5],
    spin: [11.1072, 8.8858, 6.6643],
    duration: 1,
    orientation: [-0.15683, 0.69618, -0.14222, 0.68594],
  },
  {
    name: "F",
    moments: [13, 10, 5],
    spin: [10.4572, 0.3137, 0.4183],
    duration: 0.60009765625,
    orientation: [0.93892, 0.31134, -0.14664, -0.00014],
  },
  {
    name: "G",
    moments: [1, 1, 2],
    spin: [1.6428, 0, 18.7778],
    duration: 2,
    orientation: [-0.47484, -0.17121, 0.39136, -0.76945],
  },
  {
    name: "H",
    moments: [1, 1, 2],
    spin: [3.5816, 0, 9.8404],
    duration: 3,
    orientation: [-0.54374, 0.46633, -0.24916, -0.65177],
  },
  {
    name: "I",
    moments: [1, 1, 0.3],
    spin: [3.2524, 0, 12.1382],
    duration: 2.5,
    orientation: [-0.07268, -0.40559, 0.14209, 0.90001],
  },
  {
    name: "J",
    moments: [1, 1, 0.3],
    spin: [12.3755, 0, 2.1821],
    duration: 1.5,
    orientation: [-0.78178, 0.45137, -0.31906, -0.28859],
  },
  {
    name: "K",
    moments: [1, 2, 3],
    spin: [0.0168, 0.0168, 16.7551],
    duration: 1.5,
    orientation: [0.8892, 0.09152, 0.32688, 0.30676],
  },
  {
    name: "L",
    moments: [1, 2, 3],
    spin: [0.3767, 12.5582, 0.2512],
    duration: 3,
    orientation: [0.19875, -0.54552, 0.69097, 0.43066],
  },
];

/** Those flights, thrown 3 m/s ahead so as to come down at the height they were let go at. */
export const plannedFlights = (): Flight[] =>
  PLANNED.map((planned) =>
    fly({
      ...planned,
      centerOfMass: [0, 1.5, 0],
      velocity: [3, (9.80665 * planned.duration) / 2, 0],
      gravity: [0, -9.80665, 0],
    }),
  );

/** A launch in standard gravity; whatever is not said is plain. */
export const thrown = (launch: Partial<Parameters<typeof fly>[0]>): Flight =>
  fly({
    centerOfMass: [0, 1.5, 0],
    velocity: [2, 4, 1],
    gravity: [0, -9.80665, 0],
    orientation: [0, 0, 0, 1],
    spin: [0, 0, 0],
    moments: [1, 2, 3],
    duration: 0.9,
    ...launch,
  });
