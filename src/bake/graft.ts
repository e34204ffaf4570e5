/** The nodes and clips that a file of takes adds to the prop's model. */

import type { Channel, Track } from "../clip/track.js";
import type { ClipChannel, Graft } from "../gltf/splice.js";
import type { Quat } from "../math/quat.js";
import { negate, type Vec3 } from "../math/vec3.js";
import type { Prop } from "../prop/prop.js";
import type { BakeSettings } from "../throwfile/types.js";

/** Keys on their way into a file: the name of the clip they make, and its extras. */
export interface NamedTrack {
  name: string;
  track: Track;
  extras: object;
}

type Target = ClipChannel["target"];

/**
 * One animated node over the whole scene, named after the prop. It rests as modelled, or, where the file holds one clip, at that clip's first
 * key: players differ in what they show before it.
 */
export function oneNodeGraft(prop: Prop, clips: readonly NamedTrack[]): Graft {
  const only = onlyTrack(clips);
  return {
    nodes: [
      {
        name: prop.name,
        ...(only && {
          translation: firstKey<Vec3>(only.translation),
          rotation: firstKey<Quat>(only.rotation),
        }),
        ...scaled(prop),
        holdsScene: true,
      },
    ],
    clips: newClips(clips, { translation: { added: 0 }, rotation: { added: 0 } }),
  };
}

/**
 * Over the whole scene a node named after the prop whose translation is that of the centre of mass, in it one that turns about it, and in that a
 * still one moved by minus the centre of mass. They rest as the single node does.
 */
export function twoNodeGraft(prop: Prop, clips: readonly NamedTrack[]): Graft {
  const only = onlyTrack(clips);
  const [outer, inner, still] = addedNames(prop, "two-node");
  return {
    nodes: [
      {
        name: outer,
        translation: only ? firstKey<Vec3>(only.translation) : prop.centerOfMass,
        children: [1],
      },
      {
        name: inner,
        ...(only && { rotation: firstKey<Quat>(only.rotation) }),
        children: [2],
      },
      {
        name: still,
        translation: negate(prop.centerOfMass),
        ...scaled(prop),
        holdsScene: true,
      },
    ],
    clips: newClips(clips, { translation: { added: 0 }, rotation: { added: 1 } }),
  };
}

/**
 * Over the whole scene a node named after the prop that turns about the centre of mass, and stays where that is as modelled unless the game moves it; in
 * it a still one moved by minus the centre of mass.
 */
export function turningGraft(prop: Prop, clips: readonly NamedTrack[]): Graft {
  const only = onlyTrack(clips);
  const [turning, still] = addedNames(prop, "turn-only");
  return {
    nodes: [
      {
        name: turning,
        translation: prop.centerOfMass,
        ...(only && { rotation: firstKey<Quat>(only.rotation) }),
        children: [1],
      },
      {
        name: still,
        translation: negate(prop.centerOfMass),
        ...scaled(prop),
        holdsScene: true,
      },
    ],
    clips: newClips(clips, { rotation: { added: 0 } }),
  };
}

/** Names of the nodes that a layout adds, the outermost first. */
export const addedNames = ({ name }: Prop, layout: BakeSettings["layout"]): string[] =>
  ({
    "one-node": [name],
    "two-node": [name, `${name}-turning`, `${name}-centred`],
    "turn-only": [name, `${name}-centred`],
  })[layout];

/** The track of a file's single clip. */
export const onlyTrack = (clips: readonly NamedTrack[]): Track | undefined =>
  clips.length === 1 ? clips[0].track : undefined;

/** Clips whose channels move these nodes. */
export const newClips = (
  clips: readonly NamedTrack[],
  targets: Partial<Record<ClipChannel["path"], Target>>,
): Graft["clips"] =>
  clips.map(({ name, track, extras }) => ({
    name,
    extras,
    channels: (["translation", "rotation"] as const).flatMap((path) => {
      const target = targets[path];
      return target ? [{ target, path, ...track[path] }] : [];
    }),
  }));

const scaled = ({ scale }: Prop) => (scale === 1 ? {} : { scale: [scale, scale, scale] as const });

/** The value of a channel's first key. */
export function firstKey<T extends Vec3 | Quat>({ interpolation, times, values }: Channel): T {
  const size = values.length / times.length;
  const key =
    interpolation === "CUBICSPLINE" ? values.subarray(size / 3, (2 * size) / 3) : values.subarray(0, size);
  const first = Array.from(key);
  return (values instanceof Int16Array ? first.map((c) => c / 32767) : first) as unknown as T;
}
