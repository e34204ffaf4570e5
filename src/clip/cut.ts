import { cbrt } from "../math/elementary.js";
import { cubicRotationKeys } from "./cubic-rotation.js";
import { cubicTranslationKeys } from "./cubic-translation.js";
import { linearRotationKeys } from "./linear-rotation.js";
import { linearTranslationKeys } from "./linear-translation.js";
import { type NodePath, nodePath } from "./node-path.js";
import type { RotationKeys } from "./rotation-keys.js";
import type { SampledMotion } from "./sampled-motion.js";
import type { RotationStore } from "./store-rotation.js";
import { type Track, trackBytes } from "./track.js";
import type { TranslationKeys } from "./translation-keys.js";

export type Curve = "linear" | "cubic";

/** What the two channels are made of. */
export interface Cut {
  rotation: Curve;
  /** `none`: the rotation alone. */
  translation: Curve | "none";
  /** How linear rotation keys are stored. */
  store: RotationStore;
}

/**
 * Part of the tolerance that the rotation may use alone. On twelve flights at three tolerances, with the origin at up to the
 * reach from the centre of mass, 0.55 took 0.3 to 1.5 % more bytes than the best of twelve shares.
 */
const SHARE = 0.55;
/** Another share is tried where theory sets the best one further off than this: nearer by, it saved nothing. */
const SHARE_SLACK = 0.2;
/** A part stays for the rounding of the translation. */
const GREATEST_SHARE = 0.95;

/**
 * The track with the fewest bytes found that is never further than `limit` m, apart from the motion's own surcharge, from the
 * motion: the rotation first, with a share of the limit, then the translation with what the rotation leaves at each time.
 * Undefined where float32 does not let it.
 */
export function cutMotion(motion: SampledMotion, limit: number, cut: Cut): Track | undefined {
  const simple = cut.translation === "none" || isParabola(motion, cut);
  const share = cut.translation === "none" ? 1 : simple ? GREATEST_SHARE : SHARE;
  const first = cutAt(motion, limit, share, cut);
  if (!first || simple) return first;
  const better = bestShare(first);
  const second = Math.abs(better - SHARE) > SHARE_SLACK ? cutAt(motion, limit, better, cut) : undefined;
  return second && trackBytes(second) < trackBytes(first) ? second : first;
}

/** Whether one cubic segment is the whole translation: it then needs next to nothing of the limit. */
const isParabola = ({ body, flying }: SampledMotion, { translation }: Cut): boolean =>
  flying && translation === "cubic" && body.centerOfMass.every((c) => c === 0);

/** The track whose rotation uses `share` of `limit` m. */
function cutAt(motion: SampledMotion, limit: number, share: number, cut: Cut): Track | undefined {
  // Keys beside the curve save up to three in ten; where the tolerance is about as coarse as the prop they may lead nowhere.
  for (const offCurve of [true, false]) {
    const rotation = rotationKeys(motion, share * limit, cut, offCurve);
    const path = rotation && nodePath(motion, rotation);
    const translation = path && translationKeys(motion, path, limit, cut, offCurve);
    if (translation) return track(motion, rotation, translation);
  }
  return undefined;
}

function rotationKeys(
  motion: SampledMotion,
  limit: number,
  cut: Cut,
  offCurve: boolean,
): RotationKeys | undefined {
  return cut.rotation === "cubic"
    ? cubicRotationKeys(motion, limit)
    : linearRotationKeys(motion, limit, cut.store, offCurve);
}

function translationKeys(
  motion: SampledMotion,
  path: NodePath,
  limit: number,
  cut: Cut,
  offCurve: boolean,
): TranslationKeys | undefined {
  if (cut.translation === "cubic") return cubicTranslationKeys(motion, path, limit);
  if (cut.translation === "linear") return linearTranslationKeys(motion, path, limit, offCurve);
  let error = 0;
  for (let k = 0; k < path.count; k++) error = Math.max(error, path.wanted[4 * k + 3]);
  return error <= limit
    ? { indices: [], interpolation: "LINEAR", values: new Float32Array(0), error }
    : undefined;
}

/** The track of keys on the motion's grid. */
export function track(motion: SampledMotion, rotation: RotationKeys, translation: TranslationKeys): Track {
  const channel = ({ indices, interpolation, values }: RotationKeys | TranslationKeys) => ({
    interpolation,
    times: Float32Array.from(indices, motion.time),
    values,
  });
  return {
    duration: motion.time(motion.last),
    translation: channel(translation),
    rotation: channel(rotation),
    error: translation.error + motion.surcharge,
  };
}

/**
 * The share with the fewest bytes if the numbers of segments go with the inverse root of what each channel may use, as
 * chords' do: the minimum of a/√x + b/√(1 − x) lies where x/(1 − x) = (a/b)^⅔.
 */
function bestShare({ rotation, translation }: Track): number {
  const bytes = (channel: typeof rotation) =>
    ((channel.times.byteLength + channel.values.byteLength) * (channel.times.length - 1)) /
    channel.times.length;
  const root = cbrt((bytes(rotation) * Math.sqrt(SHARE)) / (bytes(translation) * Math.sqrt(1 - SHARE)));
  return Math.min(GREATEST_SHARE, (root * root) / (1 + root * root));
}
