/** Twelve requests as users make them, each with the throw file that answers it; models are the demo's. */

const PROPS = `props:
  spanner:
    model: ../../assets/props/spanner.glb
    density: { steel: 7850, rubber: 1100 }
    points: { grip: { node: socket_grip } }
  spike:
    model: ../../assets/props/marlinspike.glb
    density: { steel: 7850, brass: 8500 }
    points: { grip: { node: socket_grip }, tip: { node: socket_point } }
  token:
    model: ../../assets/props/token.glb
    density: { brass: 8500, enamel: 2500 }
    points: { heads: { node: socket_heads } }
  oar:
    model: ../../assets/props/oar.glb
    density: { ash: 680, painted_ash: 680, leather: 950 }
    points: { grip: { node: socket_grip } }
`;

export const requests = {
  "a spike that sticks in the mast point first, straight along its flight at release": `${PROPS}
throws:
  stick:
    prop: spike
    takes: 4
    release: { at: [0, 1.5, 0], point: grip, facing: [[tip, flight]] }
    arrive: { at: [0, 1.4, 3], point: tip, after: 0.35..0.4 }
    spin: { axis: long, turns: 2 }
`,
  "a token that shows heads in odd takes and tails in even ones": `${PROPS}
throws:
  flip:
    prop: token
    takes: 6
    release: { at: [0, 1.1, 0], facing: [[heads, {each: [up, down]}]] }
    arrive: { at: [0, 1.1, 0.3], after: 0.6 }
    spin: { axis: right, turns: 7..9 }
`,
  "a prop modelled in centimetres": `props:
  pole: { shape: { cylinder: { radius: 3, length: 200 } }, scale: 0.01, density: 650, points: { end: [0, -1, 0] } }
throws:
  toss:
    prop: pole
    release: { at: [0, 1, 0], point: end }
    arrive: { at: [0, 1, 2], after: 0.8 }
    spin: { axis: right, turns: 1 }
`,
  "a prop that stands away from the origin in its model, thrown from where it stands": `${PROPS}
throws:
  hop:
    prop: token
    arrive: { at: [1, 0, 0], after: 0.5 }
    spin: { axis: heads, turns: 1 }
`,
  "a clip of exactly 24 frames at 24 frames a second": `frameRate: 24
${PROPS}
throws:
  beat:
    prop: spanner
    takes: 3
    release: { at: [0, 1.2, 0] }
    arrive: { at: [0 ± 0.1, 1, 3], after: 24f }
    spin: { axis: short, turns: 1.5 }
`,
  "the launch velocity of a hand that was recorded, held at the grip": `${PROPS}
throws:
  hand:
    prop: spanner
    release: { at: [0.2, 1.3, 0.1], point: grip, velocity: [0.3, 3.5, 2.8], angularVelocity: [-9, 0.4, 0.2] }
    arrive: { after: 0.8 }
`,
  "over the rail and no higher than it has to be: through a point above it": `${PROPS}
throws:
  over:
    prop: oar
    takes: 4
    release: { at: [0, 1, 0], point: grip, facing: [[long, up]] }
    arrive: { at: [0, 1.2, 4] }
    arc: { through: [0, 2.6, 2] }
    spin: { axis: left, turns: 0.5 }
`,
  "the same throw with backspin instead of topspin": `${PROPS}
throws:
  top:
    prop: token
    release: { at: [0, 1, 0] }
    arrive: { at: [0, 1, 3], after: 0.9 }
    spin: { axis: left, turns: 3 }
  back: { like: top, spin: { axis: right } }
`,
  "a stylised hang: as high as two metres, a second and a half, however weak gravity has to be": `${PROPS}
throws:
  hang:
    prop: token
    gravity: free
    release: { at: [0, 1, 0] }
    arrive: { at: [0, 1, 3], after: 1.5 }
    arc: { apex: 2 }
    spin: { axis: up, turns: 2 }
`,
  "numbers as an engine has them: Z up, left-handed, centimetres": `host: { axes: [z, x, y], unit: 0.01 }
${PROPS}
throws:
  engine:
    prop: spanner
    release: { at: [0, 0, 120] }
    arrive: { at: [300, 20, 100], after: 0.9 }
    spin: { axis: short, turns: 1 }
`,
  "fifty tokens scattered from one hand, no two alike": `${PROPS}
throws:
  scatter:
    prop: token
    takes: 50
    release: { at: [0, 1.4, 0], facing: any }
    arrive: { after: 0.8 }
    arc: { heading: -40..40, speed: 3..5, elevation: 20..60 }
    spin: { axis: any, rate: 2..5 }
`,
  "a lob and a bullet to the same hand at the same speed": `${PROPS}
throws:
  hands:
    prop: spanner
    takes: 2
    release: { at: [0, 1.3, 0], point: grip }
    arrive: { at: [0, 1.3, 4] }
    arc: { speed: 7, branch: { each: [low, high] } }
    spin: { axis: short, rate: 1.2 }
`,
} as const;
