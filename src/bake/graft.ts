/** The nodes and clips that a file of takes adds to the prop's model. */

import type { Channel, Track } from "../clip/track.js";
import type { ClipChannel, Graft } from "../gltf/splice.js";
import type { Quat } from "../math/quat.js";
import type { Vec3 } from "../math/vec3.js";
import type { Prop } from "../prop/prop.js";

export interface NamedTrack {
  name: string;
  track: Track;
  extras: object;
}

/**
 * One animated node over the whole scene, named after the prop. It rests as modelled, or, where the file holds one clip, at that clip's first
 * key: players differ in what they show before it.
 */
export function oneNodeGraft(prop: Prop, clips: readonly NamedTrack[]): Graft {
  const only = clips.length === 1 ? clips[0].track : undefined;
  return {
    nodes: [
      {
        name: prop.name,
        ...(only && {
          translation: firstKey<Vec3>(only.translation),
          rotation: firstKey<Quat>(only.rotation),
        }),
        ...(prop.scale !== 1 && { scale: [prop.scale, prop.scale, prop.scale] as const }),
        holdsScene: true,
      },
    ],
    clips: clips.map(({ name, track, extras }) => ({
      name,
      extras,
      channels: [channel("translation", track), channel("rotation", track)],
    })),
  };
}

const channel = (path: "translation" | "rotation", track: Track): ClipChannel => ({
  target: { added: 0 },
  path,
  ...track[path],
});

/** The value of a channel's first key. */
export const firstKey = <T extends Vec3 | Quat>({ times, values }: Channel): T =>
  Array.from(values.subarray(0, values.length / times.length)) as unknown as T;
