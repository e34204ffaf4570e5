/** Which files the clips of a bake go into, and what those hold. */

import { bareModel } from "../gltf/bare-model.js";
import { type Graft, type NamedFile, spliceAllGlb, spliceAllGltf } from "../gltf/splice.js";
import { rounded } from "../math/rounded.js";
import type { Prop } from "../prop/prop.js";
import type { BakeSettings, ThrowFile } from "../throwfile/types.js";
import { type NamedTrack, oneNodeGraft, turningGraft, twoNodeGraft } from "./graft.js";
import { nodeGraft } from "./node-graft.js";
import type { LoadedProp } from "./props.js";

/** A clip, and what decides which file it is in. */
export interface FiledClip extends NamedTrack {
  throwName: string;
  prop: LoadedProp;
}

/** What of a take, or a chain's take, goes into a file. */
export const filedClip = (
  { name: throwName }: { name: string },
  { name, track }: Pick<NamedTrack, "name" | "track">,
  extras: object,
  prop: LoadedProp,
): FiledClip => ({ name, track, extras: rounded(extras), throwName, prop });

/** Two digits, or as many as the number has. */
export const clipName = (entry: { name: string }, number: number): string =>
  `${entry.name}_${String(number).padStart(2, "0")}`;

/** Name of the file that a clip is in: of its throw, of itself, or of the throw file. */
export function fileName(file: ThrowFile, throwName: string, clipName: string): string {
  const { files, container } = file.bake;
  const stem = { "per-throw": throwName, "per-take": clipName, together: throwFileStem(file) }[files];
  return `${stem}.${container}`;
}

/**
 * The files of these clips, in their order; a .gltf comes after its .bin.
 *
 * @throws ModelError where a model cannot take the clips, or go into one file with another
 */
export function clipFiles(file: ThrowFile, clips: readonly FiledClip[]): NamedFile[] {
  const groups = new Map<string, FiledClip[]>();
  for (const clip of clips) {
    const name = fileName(file, clip.throwName, clip.name);
    groups.set(name, [...(groups.get(name) ?? []), clip]);
  }
  return Array.from(groups, ([name, group]) => written(file, name, group)).flat();
}

function written({ bake }: ThrowFile, name: string, clips: readonly FiledClip[]): NamedFile[] {
  const grafts = [...new Set(clips.map(({ prop }) => prop))].map((loaded) => {
    const { prop, model } = loaded;
    const own = clips.filter((clip) => clip.prop === loaded);
    return [bake.mesh ? model : bareModel(model, prop.node !== undefined), graftOf(bake, prop, own)] as const;
  });
  return bake.container === "gltf"
    ? spliceAllGltf(grafts, name.slice(0, name.lastIndexOf(".")))
    : [{ name, content: spliceAllGlb(grafts) }];
}

function graftOf({ layout }: BakeSettings, prop: Prop, clips: readonly NamedTrack[]): Graft {
  if (prop.node) return nodeGraft(prop.node, prop.scale, clips);
  const graft = { "one-node": oneNodeGraft, "two-node": twoNodeGraft, "turn-only": turningGraft }[layout];
  return graft(prop, clips);
}

/** The throw file's name without its folder and endings: quay.throws.yaml is "quay". */
const throwFileStem = ({ name }: ThrowFile): string =>
  name.replace(/^.*[\\/]/, "").replace(/(\.throws)?\.(ya?ml|json)$/i, "");
