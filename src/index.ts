/** The library: the whole line as one function, and each of its steps. Runs in browsers and on Node. */

export {
  allWays,
  type NearestWay,
  nearestWay,
  type Way,
  type WaysRequest,
  type WayWish,
} from "./aim/ways.js";
export { type Bake, type BakedTake, type BakedThrow, type BakeOptions, bake } from "./bake/bake.js";
export type { BakedChain, BakedChainTake } from "./bake/bake-chain.js";
export type { ChainPart } from "./bake/chain.js";
export { type NamedTrack, oneNodeGraft } from "./bake/graft.js";
export type { MotionState } from "./bake/motion.js";
export type { ModelSource } from "./bake/props.js";
export { type ReducedClip, type ReduceOptions, reduceRigidClips } from "./bake/reduce-rigid-clips.js";
export { cutTake, solveTake, type Take } from "./bake/take.js";
export {
  chainMotion,
  type FlownPart,
  type Motion,
  motionOf,
  type TakeMotion,
  takeMotion,
} from "./bake/take-motion.js";
export { type ListedWay, type TakeWays, throwWays } from "./bake/ways.js";
export type { WrittenSpin } from "./bake/written-spin.js";
export { type ClipStyle, clipTrack } from "./clip/clip-track.js";
export { defaultTolerance } from "./clip/default-tolerance.js";
export { type ClipPart, joinedTrack } from "./clip/join.js";
export { type Body, linearTrack } from "./clip/linear.js";
export { playTrack } from "./clip/play-track.js";
export { type Channel, type Track, trackBytes } from "./clip/track.js";
export { type DrawContext, drawThrow } from "./draw/draw-throw.js";
export type { DrawnThrow } from "./draw/drawn-throw.js";
export { type Arc, type ArcRequest, arcPosition, arcVelocity, solveArc } from "./flight/arc.js";
export { type Flight, fly } from "./flight/flight.js";
export type { Launch } from "./flight/launch.js";
export { axisShares, turnsAboutMomentum } from "./flight/turns.js";
export type { Decoders, DracoModule } from "./gltf/decoders.js";
export { type Model, ModelError, type ResolveResource } from "./gltf/model.js";
export { readModel } from "./gltf/read.js";
export {
  type ClipChannel,
  type Graft,
  type NamedFile,
  type NewClip,
  type NewNode,
  type Rest,
  spliceGlb,
  spliceGltf,
} from "./gltf/splice.js";
export { throwClips } from "./gltf/throw-clips.js";
export type { Mat3 } from "./math/mat3.js";
export type { Quat } from "./math/quat.js";
export { RequestError } from "./math/request-error.js";
export type { Vec3 } from "./math/vec3.js";
export { propDirection } from "./prop/directions.js";
export { type AxisBehaviour, type Kind, kindOf, WOBBLE_DEGREES } from "./prop/kind.js";
export { nearestModelAxis } from "./prop/model-axis.js";
export { type Prop, type PropOptions, weigh } from "./prop/prop.js";
export { type Shape, shapeModel } from "./prop/shape.js";
export type { ClipRecord, PartRecord, PropRecord, TakesRecord } from "./record/clip-record.js";
export { formatRecord } from "./record/format.js";
export { recordOf } from "./record/record-of.js";
export { type TakeTableOptions, takeTable } from "./record/take-table.js";
export { VERSION } from "./record/version.js";
export { ThrowFileError } from "./throwfile/errors.js";
export { parseThrowFile } from "./throwfile/parse.js";
export { throwFileSchema } from "./throwfile/schema.js";
export type { ChainEntry, PropEntry, ThrowEntry, ThrowFile } from "./throwfile/types.js";
