import type { Animation, AnimationChannel, Node } from "@gltf-transform/core";

/** Share by which the keys of a scale that stands still may differ from the node's own: what exporters that sample a pose leave. */
export const STILL_SCALE = 1e-4;

/** Why a node's part of a clip is no rigid motion that can be proved; undefined where it is one. */
export function leftAlone(
  clip: Animation,
  node: Node,
  channels: readonly AnimationChannel[],
): string | undefined {
  const paths = channels.map((channel) => channel.getTargetPath());
  for (const [i, path] of paths.entries()) {
    if (path === "scale" && standsStill(node, channels[i])) continue;
    if (path !== "translation" && path !== "rotation") return `it animates ${path} too`;
    if (paths.indexOf(path) !== i) return `it has two channels for ${path}`;
  }
  for (const channel of channels) {
    const sampler = channel.getSampler();
    const path = channel.getTargetPath();
    if (path === "scale") continue;
    if (sampler?.getInterpolation() !== "LINEAR")
      return `its ${path} is ${sampler?.getInterpolation()}, not LINEAR`;
    const fault = keysFault(channel);
    if (fault !== undefined) return `its ${path} ${fault}`;
  }
  const moved = new Set(clip.listChannels().map((channel) => channel.getTargetNode()));
  for (let parent = node.getParentNode(); parent; parent = parent.getParentNode())
    if (moved.has(parent)) return `it moves the node "${parent.getName()}" above too`;
  let reason: string | undefined;
  node.traverse((below) => {
    if (below !== node && moved.has(below)) reason ??= `it moves the node "${below.getName()}" below too`;
    if (
      below
        .getMesh()
        ?.listPrimitives()
        .some((primitive) => primitive.listTargets().length > 0)
    )
      reason ??= `"${below.getName()}" morphs`;
  });
  return reason;
}

/** Whether a scale's keys are all the node's own: between equal keys a line or step is still. */
function standsStill(node: Node, channel: AnimationChannel): boolean {
  const sampler = channel.getSampler();
  const output = sampler?.getOutput();
  if (!output || sampler?.getInterpolation() === "CUBICSPLINE") return false;
  const own = node.getScale();
  const element: number[] = [];
  for (let i = 0; i < output.getCount(); i++) {
    output.getElement(i, element);
    if (!own.every((s, axis) => Math.abs(element[axis] - s) <= STILL_SCALE * Math.abs(s))) return false;
  }
  return true;
}

function keysFault(channel: AnimationChannel): string | undefined {
  const sampler = channel.getSampler();
  const [input, output] = [sampler?.getInput(), sampler?.getOutput()];
  const times = input?.getArray();
  if (!output || !times || times.length < 2 || output.getCount() !== times.length)
    return "has less than two keys";
  for (let i = 1; i < times.length; i++) if (!(times[i] > times[i - 1])) return "has times that do not rise";
  const element: number[] = [];
  for (let i = 0; i < output.getCount(); i++) {
    output.getElement(i, element);
    if (!element.every(Number.isFinite)) return "has values that are no numbers";
    // As far off as the validator lets a quaternion be.
    if (
      channel.getTargetPath() === "rotation" &&
      Math.abs(Math.sqrt(element.reduce((s, c) => s + c * c, 0)) - 1) > 0.0077
    )
      return "has quaternions that are not unit";
  }
  return undefined;
}
