// Expected places are marked in the text itself by », which is taken out before parsing; keys and words are those of the
// grammar of the throw file (the design of this program, no outside source).
import { describe, expect, test } from "vitest";
import { faultsOf, marked } from "./faults-of.js";

const PROPS =
  "props:\n  spanner: { model: props/spanner.glb, points: { grip: [0, 0, -0.11], tip: [0, 0, 0.1] } }\n";

/** One throw that is right but for what is added. */
const lob = (keys: string, flight = "arrive: { at: [3, 1, 0], after: 0.9 }") =>
  `${PROPS}throws:\n  lob:\n    prop: spanner\n    ${flight}\n    ${keys}\n`;
const arriving = (keys: string) => lob("takes: 2", `arrive: { at: [3, 1, 0], ${keys} }`);
const prop = (keys: string) => `props:\n  spanner: { ${keys} }\n`;
const shape = (keys: string) => prop(`shape: { ${keys} }`);
const top = (keys: string) => `${keys}\n${PROPS}`;
const flying = (keys: string) => `${PROPS}throws:\n  ${keys}\n`;
const chain = (keys: string) =>
  `${PROPS}  ball: { shape: { sphere: 0.1 } }
throws:
  a: { prop: spanner, arrive: { at: [1, 0, 0], after: 1 } }
  b: { like: a, takes: 2 }
  c: { like: a, prop: ball }
  d: { like: a }
chains:
  run: ${keys}
`;

type Case = [what: string, text: string, path: string, ...words: string[]];

const CASES: Record<string, Case[]> = {
  keys: [
    ["misspelt at the top", top("»sead: 3"), "sead", "unknown key", "seed"],
    ["misspelt in bake", top("bake: { »tolerence: 0.1 }"), "bake.tolerence", "unknown key", "tolerance"],
    ["bake's at the top", top("»tolerance: 0.1"), "tolerance", "belongs under bake"],
    ["misspelt in a prop", prop("model: a.glb, »dencity: 3"), "props.spanner.dencity", "density"],
    ["misspelt in a throw", lob("»taks: 3"), "throws.lob.taks", "takes"],
    ["misspelt in release", lob("release: { »att: [0, 1, 0] }"), "throws.lob.release.att", "at"],
    ["two letters swapped", lob("release: { »scattre: 3 }"), "throws.lob.release.scattre", "scatter"],
    ["under the wrong key", lob("»turns: 2"), "throws.lob.turns", "belongs under spin or limits"],
    [
      "one that is the throw's own",
      lob("release: { »takes: 2 }"),
      "throws.lob.release.takes",
      "the entry itself",
    ],
    ["in a chain", chain("{ throws: [a, d], »lop: true }"), "chains.run.lop", "loop"],
    [
      "in a weight",
      prop("model: a.glb, weights: [{ at: [0, 0, 0], mass: 1, »mas: 2 }]"),
      "props.spanner.weights.0.mas",
      "mass",
    ],
    [
      "in a rotation",
      lob("release: { facing: { rotation: [0, 0, 0, 1], »pont: grip } }"),
      "throws.lob.release.facing.pont",
      "point",
    ],
    ["in host", top("host: { »axis: [x, y, z] }"), "host.axis", "axes"],
    ["written twice", lob("takes: 3\n    »takes: 4"), "throws.lob.takes", "twice", "line 7"],
    [
      "a throw written twice",
      flying("a: { prop: spanner, arrive: { at: [1, 0, 0], after: 1 } }\n  »a: {}"),
      "throws.a",
      "twice",
    ],
    [
      "missing: prop",
      flying("»lob: { arrive: { at: [1, 0, 0], after: 1 } }"),
      "throws.lob.prop",
      "missing",
      "name of a prop",
    ],
    [
      "missing: throws of a chain",
      chain("{ loop: true }").replace("run:", "»run:"),
      "chains.run.throws",
      "missing",
    ],
    ["without a value", lob("»release:"), "throws.lob.release", "not a map", "nothing", "at, point"],
    ["a list for a map", lob("»arc: [1]"), "throws.lob.arc", "not a map", "[1]", "apex"],
    ["throws as a list", `${PROPS}»throws: [a]\n`, "throws", "not a map of names"],
    ["a throw that is no map", flying("»lob: 3"), "throws.lob", "not a map", "3"],
    ["no props", "»seed: 3\n", "", "no prop"],
  ],
  syntax: [
    ["a tab", `${PROPS}throws:\n»\tlob: { prop: spanner }\n`, "", "a tab", "spaces"],
    ["an open bracket", `${PROPS}throws: { a: [1, 2\n»`, "throws.a", "bracket", "close"],
    ["an open quote", `seed: "quay»`, "seed", "quote"],
    ["two colons", `seed: »a: b\n`, "seed.a", "colon"],
    ["a reserved sign", `seed: »@quay\n`, "seed", "reserved", "quotes"],
    ["a tag", `seed: »!quay 1\n`, "seed", "tag"],
    ["an alias to nothing", "»seed: *quay\n", "seed", "*quay", "&quay"],
    ["an alias to itself", "»seed: &q [*q]\n".replace("»seed: &q [", "seed: &q [»"), "seed.0", "*q"],
    ["a list as a key", "? »[a]\n: b\n", "", "a key that is no text"],
    ["two documents", `${PROPS}»---\n${PROPS}`, "", "second document"],
    ["an empty file", "»\n# nothing\n", "", "empty"],
    ["a list", "»- a\n", "", "not a map"],
    ["YAML 1.1", `»%YAML 1.1\n---\n${PROPS}`, "", "YAML 1.1", "1.2"],
  ],
  numbers: [
    ["a word", arriving("»after: soon"), "throws.lob.arrive.after", "not a number", '"soon"', "seconds"],
    ["in quotes", arriving('»after: "0.9"'), "throws.lob.arrive.after", 'text "0.9"', "without quotes"],
    ["zero time", arriving("»after: 0"), "throws.lob.arrive.after", "found 0", "above 0"],
    ["no frames", arriving("»after: 0f"), "throws.lob.arrive.after", "0f", "above 0"],
    ["broken frames", arriving("»after: 1.5f"), "throws.lob.arrive.after", "not whole frames", "27f"],
    ["frames to seconds", arriving("»after: 22f..1"), "throws.lob.arrive.after", "22f..26f"],
    [
      "a bell curve of frames",
      arriving("»after: 22f ± 2f"),
      "throws.lob.arrive.after",
      "bell curve",
      "seconds",
    ],
    ["frames for turns", lob("spin: { axis: x, »turns: 3f }"), "throws.lob.spin.turns", "no time"],
    [
      "a range backwards",
      arriving("»after: 2..1"),
      "throws.lob.arrive.after",
      "wrong way round",
      "2..1",
      "smaller",
    ],
    ["frames backwards", arriving("»after: 9f..8f"), "throws.lob.arrive.after", "wrong way round"],
    ["a range with an end out", arriving("»after: -1..1"), "throws.lob.arrive.after", "-1..1", "above 0"],
    [
      "a curve's tail out",
      arriving("»after: 1 ± 0.4"),
      "throws.lob.arrive.after",
      "-0.2",
      "three deviations",
    ],
    [
      "a deviation below 0",
      lob("spin: { axis: x, »turns: 2 +- -1 }"),
      "throws.lob.spin.turns",
      "negative deviation",
    ],
    ["infinity", lob("release: { at: [0, »-.inf, 0] }"), "throws.lob.release.at.1", "not a finite number"],
    ["not a number", lob("release: { at: [».nan, 0, 0] }"), "throws.lob.release.at.0", "not a finite number"],
    ["beyond all sense", lob("release: { at: [»1e300, 0, 0] }"), "throws.lob.release.at.0", "too great"],
    ["two of three", lob("release: { »at: [0, 1] }"), "throws.lob.release.at", "[0, 1]", "three numbers"],
    [
      "a number for a place",
      lob("release: { »at: 3 }"),
      "throws.lob.release.at",
      "not a list",
      "three numbers",
    ],
    ["a range for a place", lob("release: { »at: 1..2 }"), "throws.lob.release.at", "not a list"],
    ["pick of nothing", arriving("after: { »pick: [] }"), "throws.lob.arrive.after.pick", "at least one"],
    [
      "pick of a wrong one",
      arriving("after: { pick: [1, »-1] }"),
      "throws.lob.arrive.after.pick.1",
      "-1",
      "above 0",
    ],
    ["a spread in a pick", arriving("after: { each: [»1..2] }"), "throws.lob.arrive.after.each.0", "1..2"],
    ["pick and each", arriving("after: { pick: [1], »each: [2] }"), "throws.lob.arrive.after.each", "pick"],
    ["misspelt pick", arriving("»after: { pik: [1] }"), "throws.lob.arrive.after", "a map", "pick"],
    ["gravity below 0", top("»gravity: -9.8"), "gravity", "-9.8", "0 or more"],
    ["gravity spread for all", top("»gravity: 1..2"), "gravity", "1..2"],
    ["a throw's gravity", lob("»gravity: fre"), "throws.lob.gravity", '"fre"', "free"],
    ["free within a pick", lob("gravity: { pick: [»free, 1] }"), "throws.lob.gravity.pick.0", "free"],
    ["no frame rate", top("»frameRate: 0"), "frameRate", "above 0"],
    ["half a seed", top("»seed: 1.5"), "seed", "1.5", "whole number"],
    [
      "elevation",
      lob("arc: { heading: 0, speed: 1, »elevation: 91 }", "arrive: { after: 1 }"),
      "throws.lob.arc.elevation",
      "91",
      "-90 to 90",
    ],
    ["scatter", lob("release: { »scatter: 0..181 }"), "throws.lob.release.scatter", "0..181", "0 to 180"],
    [
      "apex below 0",
      lob("arc: { »apex: -1 }", "arrive: { at: [1, 0, 0] }"),
      "throws.lob.arc.apex",
      "-1",
      "0 or more",
    ],
    ["wobble", lob("spin: { axis: x, turns: 1, »wobble: 90 }"), "throws.lob.spin.wobble", "below 90"],
    ["no takes", lob("»takes: 0"), "throws.lob.takes", "0", "1 to 1000000"],
    ["half a take", lob("»takes: 2.5"), "throws.lob.takes", "not a whole number"],
    ["spread takes", lob("»takes: 2..5"), "throws.lob.takes", "2..5", "list"],
    ["a take twice", lob("takes: [3, 7, »3]"), "throws.lob.takes.2", "3 twice"],
    ["an empty list of takes", lob("»takes: []"), "throws.lob.takes", "[]"],
    [
      "a word for a switch",
      chain("{ throws: [a, d], »loop: yes }"),
      "chains.run.loop",
      '"yes"',
      "true or false",
    ],
  ],
  words: [
    ["vary", lob("»vary: evn"), "throws.lob.vary", "evn", "even"],
    [
      "branch in a pick",
      lob("arc: { branch: { pick: [low, »hi] } }"),
      "throws.lob.arc.branch.pick.1",
      '"hi"',
      "high",
    ],
    ["keys", top("bake: { »keys: bezier }"), "bake.keys", "bezier", "cubic"],
    ["solid", prop("model: a.glb, »solid: hul"), "props.spanner.solid", "hull"],
    ["pack with cubic", top("bake: { keys: cubic, »pack: int16 }"), "bake.pack", "cubic", "float"],
    ["host: an axis twice", top("host: { »axes: [x, -x, z] }"), "host.axes", "x stands twice"],
    ["host: no axis", top("host: { axes: [x, y, »w] }"), "host.axes.2", '"w"'],
    ["host: unit", top("host: { »unit: 0 }"), "host.unit", "above 0"],
  ],
  props: [
    [
      "neither model nor shape",
      "props:\n  »spanner: { mass: 1 }\n",
      "props.spanner",
      "nothing to throw",
      "model",
    ],
    ["both", prop("model: a.glb, »shape: { sphere: 1 }"), "props.spanner.shape", "model and shape"],
    ["another file format", prop("»model: a.obj"), "props.spanner.model", "a.obj", ".glb"],
    ["an unknown shape", shape("»ball: 1"), "props.spanner.shape.ball", "unknown shape", "nearest"],
    [
      "two shapes",
      prop("»shape: { sphere: 1, box: [1, 1, 1] }"),
      "props.spanner.shape",
      "several",
      "sphere, box",
    ],
    ["no radius", shape("»cylinder: { length: 1 }"), "props.spanner.shape.cylinder", "radius is missing"],
    ["a flat box", shape("box: [1, »0, 1]"), "props.spanner.shape.box.1", "above 0"],
    [
      "a short capsule",
      shape("capsule: { radius: 1, »length: 1.9 }"),
      "props.spanner.shape.capsule.length",
      "1.9",
      "2",
    ],
    [
      "a ring without a hole",
      shape("ring: { radius: 1, »thickness: 2 }"),
      "props.spanner.shape.ring.thickness",
      "below 2",
    ],
    [
      "a tube inside out",
      shape("tube: { outer: 1, »inner: 1, length: 1 }"),
      "props.spanner.shape.tube.inner",
      "below 1",
    ],
    ["no mass", prop("model: a.glb, »mass: 0"), "props.spanner.mass", "above 0", "kg"],
    ["a spread mass", prop("model: a.glb, »mass: 1..2"), "props.spanner.mass", "1..2"],
    ["no scale", prop("model: a.glb, »scale: -1"), "props.spanner.scale", "above 0"],
    ["density", prop("model: a.glb, density: { »steel: -1 }"), "props.spanner.density.steel", "0 or more"],
    ["four of an inertia", prop("model: a.glb, »inertia: [1, 1, 1, 0]"), "props.spanner.inertia", "xy"],
    [
      "an inertia no body has",
      prop("model: a.glb, »inertia: [1, 1, 3]"),
      "props.spanner.inertia",
      "[1, 1, 3]",
      "2",
    ],
    [
      "a point that is no place",
      prop("model: a.glb, points: { »grip: 3 }"),
      "props.spanner.points.grip",
      "node",
    ],
    ["a node of a shape", prop("shape: { sphere: 1 }, »node: a"), "props.spanner.node", "no nodes"],
    [
      "a point at a shape's node",
      prop("shape: { sphere: 1 }, points: { »grip: { node: a } }"),
      "props.spanner.points.grip",
      "no nodes",
    ],
  ],
  names: [
    ["with a space", "props:\n  »a b: { model: a.glb }\n", 'props."a b"', "not a name", "letters"],
    ["too long", `props:\n  »${"a".repeat(65)}: { model: a.glb }\n`, `props."${"a".repeat(57)}…"`, "64"],
    [
      "the sheet's of all takes",
      flying("»Takes: { prop: spanner, arrive: { at: [1, 0, 0], after: 1 } }"),
      "throws.Takes",
      "takes.svg",
    ],
    [
      "two throws that are one file where case does not count",
      flying("Lob: { prop: spanner, arrive: { at: [1, 0, 0], after: 1 } }\n  »lob: { like: Lob }"),
      "throws.lob",
      "case",
      "throws.Lob",
    ],
    [
      "a throw whose files some systems cannot make",
      flying("»nul: { prop: spanner, arrive: { at: [1, 0, 0], after: 1 } }"),
      "throws.nul",
      "device",
    ],
    [
      "a name that ends in a dot, which some systems drop",
      flying('»"lob.": { prop: spanner, arrive: { at: [1, 0, 0], after: 1 } }'),
      'throws."lob."',
      "not a name",
      "letters",
    ],
    ["a chain that is a device", chain("{ throws: [a, d] }").replace("run", "»AUX"), "chains.AUX", "device"],
    ["a device", "props:\n  »Com1: { model: a.glb }\n", "props.Com1", "device"],
    [
      "the same but for case",
      "props:\n  a: { model: a.glb }\n  »A: { model: a.glb }\n",
      "props.A",
      "case",
      "props.a",
    ],
    ["a chain like a throw", chain("{ throws: [a, d] }").replace("run", "»D"), "chains.D", "throws.d"],
    [
      "a point like a direction",
      prop("model: a.glb, points: { »Up: [0, 0, 1] }"),
      "props.spanner.points.Up",
      "direction",
    ],
    [
      "a point twice",
      prop("model: a.glb, points: { a: [0, 0, 1], »A: [0, 0, 1] }"),
      "props.spanner.points.A",
      "case",
    ],
    [
      "no such prop",
      lob("takes: 1").replace("prop: spanner", "»prop: spaner"),
      "throws.lob.prop",
      '"spaner"',
      "spanner",
    ],
    [
      "no such throw",
      lob("»like: lobb").replace(
        "throws:\n",
        "throws:\n  lobe: { prop: spanner, arrive: { at: [1, 0, 0], after: 1 } }\n",
      ),
      "throws.lob.like",
      "lobb",
      "lobe",
    ],
    ["like itself", lob("»like: lob"), "throws.lob.like", "circle"],
    ["no such point", lob("release: { »point: gripp }"), "throws.lob.release.point", "gripp", "grip"],
    [
      "no such point at the end",
      arriving("after: 1, point: { pick: [tip, »top] }"),
      "throws.lob.arrive.point.pick.1",
      "tip",
    ],
    ["a number as a name", lob("release: { »point: 3 }"), "throws.lob.release.point", "3", "quotes"],
  ],
  directions: [
    [
      "no such direction",
      lob("release: { facing: [[»gripp, up]] }"),
      "throws.lob.release.facing.0.0",
      "gripp",
      "grip",
    ],
    [
      "the world's first",
      lob("release: { facing: [»[up, grip]] }"),
      "throws.lob.release.facing.0",
      "wrong way round",
    ],
    [
      "a minus before the world's",
      lob("release: { facing: [[grip, »-up]] }"),
      "throws.lob.release.facing.0.1",
      "down",
    ],
    ["misspelt", lob("release: { facing: [[grip, »bak]] }"), "throws.lob.release.facing.0.1", "bak", "back"],
    ["a pair alone", lob("release: { »facing: [grip, up] }"), "throws.lob.release.facing", "pair"],
    [
      "three pairs",
      lob("release: { »facing: [[x, up], [y, ahead], [z, left]] }"),
      "throws.lob.release.facing",
      "one or two",
    ],
    [
      "the same twice",
      lob("release: { facing: [[grip, up], [»-grip, ahead]] }"),
      "throws.lob.release.facing.1.0",
      "prop",
    ],
    [
      "opposites",
      lob("release: { facing: [[grip, left], [x, »right]] }"),
      "throws.lob.release.facing.1.1",
      "world",
    ],
    [
      "up and its vector",
      lob("release: { facing: [[grip, up], [x, »[0, -2, 0]]] }"),
      "throws.lob.release.facing.1.1",
      "world",
    ],
    ["no length", lob("release: { facing: [[»[0, 0, 0], up]] }"), "throws.lob.release.facing.0.0", "not 0"],
    [
      "no rotation",
      lob("release: { facing: { »rotation: [0, 0, 0, 0] } }"),
      "throws.lob.release.facing.rotation",
      "not 0",
    ],
    [
      "a point alone",
      lob("release: { »facing: { point: grip } }"),
      "throws.lob.release.facing",
      "rotation is missing",
    ],
    [
      "a point without axes",
      lob("release: { facing: { »point: centerOfMass, rotation: [0, 0, 0, 1] } }"),
      "throws.lob.release.facing.point",
      "axes",
    ],
    ["rest at release", lob("release: { »facing: rest }"), "throws.lob.release.facing", "only at arrival"],
    ["an axis", lob("spin: { »axis: midle, turns: 1 }"), "throws.lob.spin.axis", "midle", "middle"],
    ["an axis with a minus", lob("spin: { »axis: -left, turns: 1 }"), "throws.lob.spin.axis", "right"],
    [
      "ahead of a turn-only clip",
      `bake: { layout: turn-only }\n${lob("release: { facing: [[grip, »ahead]] }", "arrive: { after: 1 }")}`,
      "throws.lob.release.facing.0.1",
      "ahead",
      "arc.heading",
    ],
  ],
  "what fixes the flight": [
    ["nothing", flying("»lob: { prop: spanner }"), "throws.lob", "nothing says where it flies", "arrive.at"],
    [
      "a mark alone",
      lob("takes: 1", "arrive: { at: [1, 0, 0] }").replace("lob:", "»lob:"),
      "throws.lob",
      "too little",
      "arrive.after",
    ],
    [
      "a mark and two",
      arriving("after: 1 }\n    arc: { »apex: 1"),
      "throws.lob.arc.apex",
      "too much",
      "drop arrive.after or arc.apex",
      "gravity: free",
    ],
    [
      "a mark and two that leave gravity open",
      arriving("} \n    arc: { apex: 1, »elevation: 60"),
      "throws.lob.arc.elevation",
      "drop arc.apex or arc.elevation",
    ],
    [
      "free and one",
      arriving("after: 1 }\n    gravity: free").replace("free }", "free").replace("lob:", "»lob:"),
      "throws.lob",
      "too little",
      "free",
    ],
    [
      "free, but by shape",
      lob("arc: { apex: 1, elevation: 60 }\n    »gravity: free", "arrive: { at: [1, 0, 0] }"),
      "throws.lob.gravity",
      "any gravity",
      "arc.speed",
    ],
    [
      "a mark and a launch",
      lob("release: { »velocity: [1, 2, 3] }"),
      "throws.lob.release.velocity",
      "arrive.at",
      "drop",
    ],
    ["a mark and a heading", lob("arc: { »heading: 3 }"), "throws.lob.arc.heading", "arrive.at", "drop"],
    ["a mark and a floor", arriving("after: 1, »floor: 0"), "throws.lob.arrive.floor", "arrive.at", "drop"],
    [
      "a launch without an end",
      flying("»lob: { prop: spanner, release: { velocity: [1, 2, 3] } }"),
      "throws.lob",
      "nothing ends",
      "arrive.after",
    ],
    [
      "two ends",
      flying("lob: { prop: spanner, release: { velocity: [1, 2, 3] }, arrive: { after: 1, »floor: 0 } }"),
      "throws.lob.arrive.floor",
      "arrive.after",
    ],
    [
      "no heading",
      flying("»lob: { prop: spanner, arc: { speed: 1, elevation: 3 }, arrive: { after: 1 } }"),
      "throws.lob",
      "arc.heading",
    ],
    [
      "half a launch",
      flying("»lob: { prop: spanner, arc: { heading: 1, elevation: 3 }, arrive: { after: 1 } }"),
      "throws.lob",
      "too little",
      "arc.speed, arc.apex or arc.through",
    ],
    [
      "more than a launch",
      flying(
        "lob: { prop: spanner, arc: { heading: 1, speed: 2, elevation: 3, »apex: 1 }, arrive: { after: 1 } }",
      ),
      "throws.lob.arc.apex",
      "drop one of",
      "free",
    ],
    [
      "a launch twice",
      flying(
        "lob: { prop: spanner, release: { velocity: [1, 2, 3] }, arc: { »speed: 2 }, arrive: { after: 1 } }",
      ),
      "throws.lob.arc.speed",
      "release.velocity",
      "drop arc.speed",
    ],
    [
      "a free launch by shape",
      flying(
        "lob: { prop: spanner, »gravity: free, arc: { heading: 1, through: [1, 1, 1], elevation: 3, apex: 1 }, arrive: { after: 1 } }",
      ),
      "throws.lob.gravity",
      "arc.speed",
    ],
  ],
  "spin, limits": [
    [
      "two spins",
      lob("release: { angularVelocity: [1, 2, 3] }\n    »spin: { axis: x, turns: 1 }"),
      "throws.lob.spin",
      "release.angularVelocity",
      "drop",
    ],
    [
      "turns and rate",
      lob("spin: { axis: x, turns: 1, »rate: 2 }"),
      "throws.lob.spin.rate",
      "spin.turns and spin.rate",
    ],
    ["no axis", lob("»spin: { turns: 1 }"), "throws.lob.spin", "no axis", "spin.axis"],
    ["no amount", lob("»spin: { axis: x }"), "throws.lob.spin", "spin.turns or spin.rate"],
    [
      "angular velocity and arrival",
      arriving("after: 1, »facing: any }\n    release: { angularVelocity: [1, 0, 0]")
        .replace("»facing", "facing")
        .replace("angularVelocity", "»angularVelocity"),
      "throws.lob.release.angularVelocity",
      "arrive.facing",
    ],
    [
      "wobble and arrival",
      arriving("after: 1, facing: any }\n    spin: { axis: x, »wobble: 3"),
      "throws.lob.spin.wobble",
      "arrive.facing",
    ],
    [
      "phase and arrival",
      arriving("after: 1, facing: any }\n    spin: { axis: x, »phase: 3"),
      "throws.lob.spin.phase",
      "arrive.facing",
    ],
    [
      "turns and floor",
      flying(
        "lob: { prop: spanner, release: { velocity: [1, 2, 3] }, arrive: { floor: 0 }, spin: { axis: x, »turns: 1 } }",
      ),
      "throws.lob.spin.turns",
      "spin.rate",
    ],
    ["scatter of nothing", arriving("after: 1, »scatter: 3"), "throws.lob.arrive.scatter", "arrive.facing"],
    ["rest without a floor", arriving("after: 1, »facing: rest"), "throws.lob.arrive.facing", "arrive.floor"],
    [
      "rest, scattered",
      flying(
        "lob: { prop: spanner, release: { velocity: [1, 2, 3] }, arrive: { floor: 0, facing: rest, »scatter: 3 } }",
      ),
      "throws.lob.arrive.scatter",
      "drop arrive.scatter",
    ],
    [
      "no room",
      lob("limits: { minHeight: 2, »maxHeight: 1 }"),
      "throws.lob.limits.maxHeight",
      "minHeight 2",
      "below",
    ],
    ["a limit as a draw", lob("limits: { »speed: 1..2 }"), "throws.lob.limits.speed", "1..2"],
    [
      "turns that are no bounds",
      lob("limits: { »turns: 2 }"),
      "throws.lob.limits.turns",
      "not bounds",
      "1..2",
    ],
    ["share of no axis", lob("limits: { »share: 0.9 }"), "throws.lob.limits.share", "spin.axis"],
    [
      "share above 1",
      lob("spin: { axis: x, turns: 1 }\n    limits: { »share: 1.1 }"),
      "throws.lob.limits.share",
      "0 to 1",
    ],
    [
      "a box inside out",
      lob("limits: { clear: [{ »box: [[0, 1, 0], [1, 1, 1]] }] }"),
      "throws.lob.limits.clear.0.box",
      "in y",
    ],
    ["hold below 0", lob("hold: { »before: -3f }"), "throws.lob.hold.before", "-3f", "0 or more"],
  ],
  chains: [
    ["no such throw", chain("{ throws: [a, »e] }"), "chains.run.throws.1", '"e"', "nearest"],
    ["a circle", chain("{ throws: [a, d, »a] }"), "chains.run.throws.2", "circle"],
    ["other takes", chain("{ throws: [a, »b] }"), "chains.run.throws.1", "takes: 2", "same takes"],
    ["another prop", chain("{ throws: [a, »c] }"), "chains.run.throws.1", '"ball"', '"spanner"'],
    ["no throws", chain("{ »throws: [] }"), "chains.run.throws", "list of names"],
  ],
};

for (const [group, cases] of Object.entries(CASES))
  describe(`a fault of ${group} is told at its place`, () => {
    test.each(cases)("%s", (_, source, path, ...words) => {
      const { text, line, column } = marked(source);
      const faults = faultsOf(text);
      const lines = faults.map((f) => `${f.line}:${f.column} ${dotted(f.path)}: ${f.fault}; ${f.remedy}`);
      expect(lines).toHaveLength(1);
      expect(lines[0]).toContain(`${line}:${column} ${path}: `);
      for (const word of words) expect(lines[0].slice(lines[0].indexOf(": "))).toContain(word);
    });
  });

const dotted = (path: readonly (string | number)[]) =>
  path
    .map((key) =>
      /^[\w-]{1,64}$/.test(String(key))
        ? key
        : JSON.stringify(String(key).slice(0, 57) + (String(key).length > 60 ? "…" : "")),
    )
    .join(".");

test("there are more than eighty wrong files", () => {
  expect(Object.values(CASES).flat().length).toBeGreaterThan(80);
});
