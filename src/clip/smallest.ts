import { type Curve, cutMotion } from "./cut.js";
import type { SampledMotion } from "./sampled-motion.js";
import type { RotationStore } from "./store-rotation.js";
import { type Track, trackBytes } from "./track.js";

const CURVES: readonly Curve[] = ["linear", "cubic"];
/** Halvings of the range in which the least limit is looked for. */
const HALVINGS = 4;

/**
 * The track with the fewest bytes over all choices of curves for the two channels; then, so that its segments share the error
 * evenly, cut again within the least limit found that takes no more bytes.
 */
export function smallestTrack(
  motion: SampledMotion,
  limit: number,
  store: RotationStore,
  withTranslation: boolean,
): Track | undefined {
  let best: Track | undefined;
  let bestCut: Parameters<typeof cutMotion>[2] | undefined;
  for (const rotation of CURVES)
    for (const translation of withTranslation ? CURVES : (["none"] as const)) {
      const cut = { rotation, translation, store };
      const track = cutMotion(motion, limit, cut);
      if (!track || (best && trackBytes(track) >= trackBytes(best))) continue;
      best = track;
      bestCut = cut;
    }
  if (!best || !bestCut) return undefined;
  let low = 0;
  let high = limit;
  for (let i = 0; i < HALVINGS; i++) {
    const middle = (low + high) / 2;
    const track = cutMotion(motion, middle, bestCut);
    if (track && trackBytes(track) <= trackBytes(best)) {
      if (track.error < best.error) best = track;
      high = middle;
    } else low = middle;
  }
  return best;
}
