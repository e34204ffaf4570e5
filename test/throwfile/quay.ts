/** The grammar's own example, without the one key that is not there yet. */
export const QUAY = `seed: lantern-quay
props:
  spanner:
    model: props/spanner.glb
    density: { steel: 7850, rubber: 1100, default: 1000 }
    points: { grip: [0, 0, -0.11] }
throws:
  lob-to-bench:
    prop: spanner
    takes: 24
    release: { at: [0, 1.4, 0], point: grip, facing: [[grip, back], [short, up]], scatter: 0..5 }
    arrive:  { at: [3.2, 1.0, 0.4], after: 0.9..1.0 }
    spin:    { axis: middle, turns: 1.5 }
`;

/** Every key of the grammar at least once, all right: only what is not there yet is refused. */
export const EVERY_KEY = `seed: 7
gravity: 1.62
frameRate: 24
host: { axes: [z, -x, y], unit: 0.01 }
bake: { tolerance: 0.002, keys: smallest, layout: two-node, files: together, container: gltf, mesh: false, pack: int16 }
props:
  spanner:
    model: props/spanner.gltf
    node: Spanner Body
    scale: 0.01
    density: 7850
    mass: 0.9
    solid: hull
    wall: 0.002
    weights: [{ at: [0, 0, 0.1], mass: 0.05 }]
    centerOfMass: [0, 0, -1e-3]
    inertia: [0.002, 0.0021, 0.0003, 0, 0, 1e-5]
    points: { grip: [0, 0, -0.11], socket: { node: socket_r } }
  box: { shape: { box: [0.1, 0.2, 0.3] } }
  ball: { shape: { sphere: 0.1 } }
  egg: { shape: { ellipsoid: [0.1, 0.2, 0.3] } }
  can: { shape: { cylinder: { radius: 0.1, length: 0.3 } } }
  cone: { shape: { cone: { radius: 0.1, length: 0.3 } } }
  pill: { shape: { capsule: { radius: 0.1, length: 0.3 } } }
  quoit: { shape: { ring: { radius: 0.1, thickness: 0.02 } } }
  coin: { shape: { disc: { radius: 0.1, thickness: 0.01 } } }
  pipe: { shape: { tube: { outer: 0.1, inner: 0.09, length: 1 } } }
throws:
  lob:
    prop: spanner
    takes: [19, 3, 7]
    release:
      at: [-1..1, { pick: [1, 1.5] }, 2 ± 0.2]
      point: { each: [grip, centerOfMass] }
      facing: { pick: [any, [[grip, back]], [[-long, [0, 1, 0..0.1]], [y, flight]], { point: socket, rotation: [0, 0, 0, 2] }] }
      scatter: 0..5
    arrive: { at: { each: [[1, 2, 3], [1, 2, 3..4]] }, point: socket, after: { pick: [12f, 0.5] }, facing: release, scatter: 3 }
    spin: { axis: { pick: [left, -short, any] }, rate: -2..-1 }
    limits:
      minHeight: 0
      maxHeight: 3
      clear: [{ box: [[0, 0, 0], [1, 1, 1]], turn: 30 }]
      speed: 20
      rate: 5
      turns: 1..2
    vary: chance
    hold: { before: 14f, after: 6f..8f }
  drop:
    prop: box
    gravity: free
    release: { velocity: [1, 2, 3] }
    arrive: { floor: 0, facing: rest }
    arc: { apex: 1e-1..2e-1 }
  skim:
    prop: ball
    gravity: 1..2
    arrive: { after: 22f..26f }
    arc: { heading: 30, speed: 4, elevation: -5..5, branch: high }
    spin: { axis: [0, 1, 0], turns: 2 +- 0.2, wobble: 3, phase: 90 }
    limits: { share: 0.9 }
  thrown:
    prop: ball
    release: { angularVelocity: [1, 2, 3] }
    arrive: { at: [1, 1, 1] }
    arc: { through: [0.5, 2, 0.5] }
  thrown-on: { like: thrown, arrive: { at: [2, 1, 1] } }
chains:
  rally: { throws: [thrown, thrown-on], loop: true }
`;
