/** The grammar of `throws.NAME`. */

import { boxes } from "./boxes.js";
import { axis, facing } from "./facing.js";
import { choice, name, word } from "./form.js";
import { defaulting, keys, leaf, optional } from "./key.js";
import { bounds, drawnVector, number, spreadNumber, time } from "./numbers.js";
import { gravity, takes } from "./scalars.js";

const metres = { unit: "m" };
const degrees = { unit: "degrees" };
const speed = { min: 0, unit: "m/s" };

/** `frameRate` is what a time in frames is divided by. */
export const throwSchema = (frameRate: number) =>
  keys(
    {
      prop: leaf(name("a prop"), "which prop is thrown"),
      like: optional(
        name("another throw"),
        "another throw whose keys are taken, merged key by key; null takes an inherited key away",
      ),
      takes: defaulting(takes, 1, "how many takes, or a list of the numbers wanted, such as [3, 7, 19]"),
      gravity: optional(
        gravity,
        "m/s² along -Y for this throw; free: solved, so that one condition more can be given",
      ),
      release: keys(
        {
          at: optional(
            drawnVector(),
            "place of the release point at time 0, m; default: where the model stands",
          ),
          point: defaulting(
            choice(name("a point of the prop, or centerOfMass")),
            "centerOfMass",
            "centerOfMass or a named point",
          ),
          facing: optional(facing("release"), "orientation at release; default as modelled"),
          scatter: optional(
            spreadNumber({ min: 0, max: 180, ...degrees }),
            "degrees by which it is turned from that about an evenly drawn axis",
          ),
          velocity: optional(drawnVector(), "of the release point, m/s"),
          angularVelocity: optional(
            drawnVector(),
            "world frame, rad/s, instead of spin; not with arrive.facing",
          ),
        },
        "how it leaves the hand",
      ).prefault({}),
      arrive: keys(
        {
          at: optional(drawnVector(), "place of the arrival point at the end, m"),
          point: optional(
            choice(name("a point of the prop, or centerOfMass")),
            "centerOfMass or a named point; default: release.point",
          ),
          after: optional(time({ above: 0 }, frameRate), "flight time: seconds, or whole frames such as 27f"),
          facing: optional(
            facing("arrive"),
            "orientation at the end: the spin is solved so that it comes true",
          ),
          scatter: optional(
            spreadNumber({ min: 0, max: 180, ...degrees }),
            "degrees by which it is turned from that; not with rest",
          ),
          floor: optional(
            spreadNumber(metres),
            "instead of at: the flight ends when any part of the prop first touches this height, m",
          ),
        },
        "how it ends",
      ).prefault({}),
      arc: keys(
        {
          apex: optional(
            spreadNumber({ min: 0, ...metres }),
            "how far the centre of mass rises above its place at release, m",
          ),
          through: optional(
            drawnVector(),
            "[x, y, z]: the centre of mass passes at this height where it is abreast of the point",
          ),
          speed: optional(spreadNumber(speed), "of the launch of the centre of mass, m/s"),
          elevation: optional(
            spreadNumber({ min: -90, max: 90, ...degrees }),
            "of the launch, degrees above level",
          ),
          heading: optional(spreadNumber(degrees), "of the launch, degrees about +Y from +Z towards +X"),
          branch: defaulting(choice(word("low", "high")), "low", "where two arcs fit"),
        },
        "the arc of the centre of mass",
      ).prefault({}),
      spin: keys(
        {
          axis: optional(
            axis,
            "a direction of the prop, or of the world (left: topspin, right: backspin), or any",
          ),
          turns: optional(
            spreadNumber({ unit: "turns" }),
            "turns about the angular momentum, right-hand rule; negative for the other way",
          ),
          rate: optional(spreadNumber({ unit: "turns per second" }), "the same per second"),
          wobble: optional(
            spreadNumber({ min: 0, below: 90, ...degrees }),
            "degrees by which the angular momentum is tilted from that of a clean spin; default 0, but 3 about a middle axis",
          ),
          phase: optional(
            spreadNumber(degrees),
            "degrees: where round the axis the tilt lies; default drawn",
          ),
        },
        "how it turns",
      ).optional(),
      limits: keys(
        {
          minHeight: optional(number(metres), "no part of the prop goes below this, m"),
          maxHeight: optional(number(metres), "no part of the prop goes above this, m"),
          clear: defaulting(
            boxes,
            [],
            "boxes that no part of the prop enters: [{box: [[x, y, z], [x, y, z]], turn: degrees about +Y}]",
          ),
          speed: optional(number(speed), "greatest of the centre of mass, m/s"),
          rate: optional(
            number({ min: 0, unit: "turns per second" }),
            "greatest angular speed, turns per second",
          ),
          turns: optional(bounds({ min: 0, unit: "turns" }), "least and most turns, such as 1..2"),
          share: optional(
            number({ min: 0, max: 1 }),
            "least share of the turning that is about spin.axis, 0 to 1",
          ),
        },
        "bounds every take holds, or it is drawn again; a range here is a bound, never a draw",
      ).optional(),
      vary: defaulting(
        word("even", "chance"),
        "even",
        "even: takes differ from one another as much as they can; chance: drawn independently",
      ),
      hold: keys(
        {
          before: defaulting(
            time({ min: 0 }, frameRate),
            0,
            "the clip stands still at the release pose first, seconds or frames",
          ),
          after: defaulting(
            time({ min: 0 }, frameRate),
            0,
            "the clip stands still at the arrival pose after, seconds or frames",
          ),
        },
        "stillness around the flight",
      ).prefault({}),
    },
    "a throw",
  );
