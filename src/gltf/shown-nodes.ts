import type { GltfJson } from "./model.js";
import { type Frame, sceneFrames, subtree } from "./scene.js";

export const LOD = "MSFT_lod";
export const VISIBILITY = "KHR_node_visibility";

/**
 * The nodes of the default scene, or those of the node `top` and below, that are there at rest, and their frames: without those that are a lower level of detail of
 * another (MSFT_lod), and those that are hidden (KHR_node_visibility), which is warned of; neither with what is below them.
 */
export function shownNodes(json: GltfJson, warnings: Set<string>, top?: number): Map<number, Frame> {
  const frames = sceneFrames(json);
  if (top !== undefined) {
    const wanted = subtree(json, [top]);
    for (const node of frames.keys()) if (!wanted.has(node)) frames.delete(node);
  }
  const nodes = json.nodes ?? [];
  const hidden = [...frames.keys()].filter((node) => isHidden(json, node));
  for (const node of hidden)
    if ([...subtree(json, [node])].some((below) => nodes[below].mesh !== undefined))
      warnings.add(`the node "${nodes[node].name ?? node}" is hidden (${VISIBILITY}): left out`);
  const leftOut = new Set(hidden);
  for (const { extensions } of nodes)
    for (const id of (extensions?.[LOD] as { ids: number[] } | undefined)?.ids ?? []) leftOut.add(id);
  for (const node of subtree(json, leftOut)) frames.delete(node);
  return frames;
}

const isHidden = ({ nodes }: GltfJson, node: number): boolean =>
  (nodes![node].extensions?.[VISIBILITY] as { visible?: boolean } | undefined)?.visible === false;
