import type { Model } from "../gltf/model.js";
import { type MovedNode, movedNode, nodeFrame } from "../gltf/surfaces.js";
import { nearestName } from "../math/nearest-name.js";
import { IDENTITY, type Quat } from "../math/quat.js";
import { RequestError } from "../math/request-error.js";
import { scale as scaleVector, type Vec3 } from "../math/vec3.js";
import type { Density } from "./density.js";
import { doubts } from "./doubts.js";
import { combine, type MassProperties, pointMass, scaleDensity, scaleLengths } from "./mass.js";
import { USUAL_WALL } from "./mass-of-surfaces.js";
import { type Matter, measureModel, measureShape } from "./measure.js";
import { type AxisNames, axisNames, type Principal, principalAxes } from "./principal.js";
import type { Shape } from "./shape-kind.js";
import { statedInertia } from "./stated-inertia.js";
import { boxOf } from "./vertex.js";

/** A place of the prop, and axes there. */
export interface NamedPoint {
  /** m, scene frame of the model, after `scale` */
  readonly position: Vec3;
  /** Turns x, y, z onto the point's axes; identity where it is only a place. */
  readonly rotation: Quat;
}

/** A rigid body to be thrown. Everything in the model's scene frame, metres, after `scale`. */
export interface Prop extends MassProperties {
  readonly name: string;
  /** Exact moments and axes: what the motion follows. */
  readonly principal: Principal;
  /** What `long`, `middle`, `short` mean as directions of the prop: moments within 1 % count as equal. */
  readonly names: AxisNames;
  /** Distance of the furthest point from the centre of mass, m. */
  readonly reach: number;
  /** Bounding box, m. */
  readonly size: Vec3;
  /** Every point that can be the first to touch something: 3 numbers a point. */
  readonly extremes: Float64Array;
  /** Own properties only. */
  readonly points: Readonly<Record<string, NamedPoint>>;
  readonly scale: number;
  /** The node of the model that is the prop, with all below it; none: the whole scene. */
  readonly node?: MovedNode;
  readonly warnings: readonly string[];
}

/** How a prop is to be weighed. Places are metres in the model's scene frame, after `scale`. */
export interface PropOptions {
  /** Name of the node of the model that is weighed with all below it; default: the whole default scene. */
  readonly node?: string;
  /** Factor on the model's lengths; default 1. */
  readonly scale?: number;
  /** kg/m³; default 1000. A map goes from material name, else node name; 0 leaves a node out of the weighing. */
  readonly density?: Density;
  /**
   * `auto` (default): closed parts are solid, flat openings are capped, what stays open is a thin surface; `hull`: the convex
   * hull is solid; `surface`: all is a thin surface.
   */
  readonly solid?: "auto" | "hull" | "surface";
  /** Thickness of thin surfaces, m; default 0.002. Stated, what is open is a thin surface, and no opening is capped. */
  readonly wall?: number;
  /** kg, with the weights: scales the density. */
  readonly mass?: number;
  /** Point masses added, kg. */
  readonly weights?: readonly { readonly at: Vec3; readonly mass: number }[];
  /** Stated instead of worked out. */
  readonly centerOfMass?: Vec3;
  /** About the centre of mass, kg m²: [xx, yy, zz] or [xx, yy, zz, xy, xz, yz]; stated instead of worked out. */
  readonly inertia?: readonly number[];
  readonly points?: Readonly<Record<string, Vec3 | { readonly node: string }>>;
}

/** Furthest reach that is not warned of, m, and nearest: beyond them the model's unit is likely not the metre. */
const USUAL_REACH = [0.005, 5] as const;

/**
 * Weighs a model's default scene, or one of its nodes, or a shape, as a solid.
 *
 * @throws RequestError, path relative to the prop's entry, for a mesh that cannot be weighed and options that no body meets
 */
export async function weigh(name: string, source: Model | Shape, options: PropOptions = {}): Promise<Prop> {
  const scale = positive(options.scale ?? 1, "scale", "a factor");
  const isStated =
    options.mass !== undefined && options.centerOfMass !== undefined && options.inertia !== undefined;
  const node = options.node === undefined ? undefined : nodeOf(source, options.node);
  const matter: Matter = {
    density: options.density,
    solid: options.solid ?? "auto",
    wall: positive(options.wall ?? USUAL_WALL, "wall", "metres") / scale,
    isWallStated: options.wall !== undefined,
  };
  const measured = await ("json" in source
    ? measureModel(source, matter, isStated, node?.index)
    : measureShape(name, source, matter));
  const body = settleMass(measured.body && scaleLengths(measured.body, scale), options);
  const reach = measured.reachFrom(scaleVector(body.centerOfMass, 1 / scale)) * scale;
  const extremes = scale === 1 ? measured.extremes : measured.extremes.map((value) => value * scale);
  const principal = principalAxes(body.inertia);
  checkReckonable("json" in source ? "model" : "shape", body.mass, reach, principal.moments);
  return {
    name,
    ...body,
    principal,
    names: axisNames(body.inertia),
    reach,
    size: scaleVector(measured.size, scale),
    extremes,
    points: namedPoints(options.points ?? {}, source, scale),
    scale,
    ...(node && { node }),
    warnings: [...measured.warnings, ...doubts(options, body, boxOf(extremes)), ...reachWarnings(reach)],
  };
}

/** Beyond these, products of the numbers leave what doubles hold. */
const [LEAST, GREATEST] = [1e-60, 1e60];

function checkReckonable(key: string, mass: number, reach: number, moments: Vec3): void {
  if ([mass, reach, ...moments].every((value) => value >= LEAST && value <= GREATEST)) return;
  throw new RequestError(
    [key],
    `makes a body of ${mass} kg that reaches ${reach} m, with moments of ${moments.join(", ")} kg m², with which nothing can be reckoned`,
    `check its size and unit, scale, density, mass and inertia: each of these numbers from ${LEAST} to ${GREATEST}`,
  );
}

function nodeOf(source: Model | Shape, name: string): MovedNode {
  if ("json" in source) return movedNode(source, name);
  throw new RequestError(["node"], `is "${name}"`, "a shape has no nodes: leave it out");
}

/** The worked-out body (none: an open mesh of which all is stated) with weights and stated values. */
function settleMass(worked: MassProperties | undefined, options: PropOptions): MassProperties {
  const inertia = options.inertia && statedInertia(options.inertia);
  const mass = options.mass === undefined ? undefined : positive(options.mass, "mass", "kg");
  const weights = options.weights ?? [];
  if (mass !== undefined && options.centerOfMass && inertia) {
    if (weights.length > 0)
      throw new RequestError(
        ["weights"],
        "change nothing where mass, centerOfMass and inertia are all stated",
        "take the weights away, or one of the three",
      );
    return { mass, volume: worked?.volume ?? 0, centerOfMass: options.centerOfMass, inertia };
  }
  const added = weights.map((weight, i) =>
    pointMass(weight.at, positive(weight.mass, ["weights", i, "mass"], "kg")),
  );
  const addedMass = added.reduce((sum, weight) => sum + weight.mass, 0);
  if (mass !== undefined && !(mass > addedMass))
    throw new RequestError(
      ["mass"],
      `is ${mass} kg, but the weights alone are ${addedMass} kg`,
      "it is the whole mass, weights included: state more, or take weights away",
    );
  const solid = mass === undefined ? worked! : scaleDensity(worked!, (mass - addedMass) / worked!.mass);
  const body = combine([solid, ...added]);
  return {
    ...body,
    centerOfMass: options.centerOfMass ?? body.centerOfMass,
    inertia: inertia ?? body.inertia,
  };
}

function namedPoints(
  points: NonNullable<PropOptions["points"]>,
  source: Model | Shape,
  scale: number,
): Record<string, NamedPoint> {
  const found = Object.entries(points).map(([name, point]): [string, NamedPoint] => {
    if (!("node" in point)) return [name, { position: point, rotation: IDENTITY }];
    const frame = "json" in source ? nodeFrame(source, point.node) : undefined;
    if (!frame)
      throw new RequestError(
        ["points", name, "node"],
        `there is no node "${point.node}"`,
        "json" in source ? nodeHint(source, point.node) : "a shape has no nodes: give a place [x, y, z]",
      );
    return [name, { position: scaleVector(frame.position, scale), rotation: frame.rotation }];
  });
  return Object.fromEntries(found);
}

function nodeHint({ json }: Model, wanted: string): string {
  const names = (json.nodes ?? []).flatMap((node) => (node.name ? [node.name] : []));
  return names.length > 0 ? `nearest is "${nearestName(wanted, names)}"` : "the model has no named nodes";
}

function reachWarnings(reach: number): string[] {
  if (reach >= USUAL_REACH[0] && reach <= USUAL_REACH[1]) return [];
  const size = Number(reach.toPrecision(3));
  return [
    reach < USUAL_REACH[0]
      ? `reaches only ${size} m from its centre of mass: if its unit is not the metre, set scale`
      : `reaches ${size} m from its centre of mass: if its unit is not the metre, set scale (a model in centimetres: 0.01)`,
  ];
}

function positive(value: number, key: string | (string | number)[], unit: string): number {
  if (value > 0 && value < Number.POSITIVE_INFINITY) return value;
  throw new RequestError(typeof key === "string" ? [key] : key, `is ${value}`, `needs ${unit} above 0`);
}
