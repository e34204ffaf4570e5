/** One changed model, read, weighed and spliced in memory; what must not come of it is thrown. */

import { oneNodeGraft } from "../../src/bake/graft.js";
import { readClips } from "../../src/gltf/clips.js";
import { ModelError } from "../../src/gltf/model.js";
import { readModel } from "../../src/gltf/read.js";
import { spliceGlb, spliceGltf } from "../../src/gltf/splice.js";
import { RequestError } from "../../src/math/request-error.js";
import { DECODERS } from "../../src/node/draco.js";
import { weigh } from "../../src/prop/prop.js";
import { Chance } from "./chance.js";
import { BESIDE, mutateModel } from "./models.js";

export function changedModel(models: readonly Uint8Array[], number: number): Uint8Array {
  const chance = new Chance(2, number);
  return mutateModel(chance.pick(models), chance);
}

const times = new Float32Array([0, 1]);
const TRACK = {
  translation: { interpolation: "LINEAR", times, values: new Float32Array([0, 0, 0, 0, 1, 2]) },
  rotation: { interpolation: "LINEAR", times, values: new Float32Array([0, 0, 0, 1, 1, 0, 0, 0]) },
  duration: 1,
  error: 0,
} as const;

export async function modelCase(bytes: Uint8Array): Promise<string> {
  let word = "refused when read";
  try {
    const model = await readModel("hostile.glb", bytes, async () => BESIDE, DECODERS);
    word = "refused for its clips";
    await readClips(model);
    word = "refused when weighed";
    const prop = await weigh("thing", model, { points: {} });
    const { mass, centerOfMass, reach, principal } = prop;
    for (const value of [mass, reach, ...centerOfMass, ...principal.moments, ...principal.axes])
      if (!Number.isFinite(value)) throw new Error(`weighed ${value}`);
    word = "refused when spliced";
    const graft = oneNodeGraft(prop, [{ name: "clip", track: TRACK, extras: {} }]);
    if (model.container === "glb") {
      const written = await readModel("written.glb", spliceGlb(model, graft), async () => BESIDE);
      if (written.json.animations?.at(-1)?.name !== "clip") throw new Error("the clip is not there");
    } else spliceGltf(model, graft, "written");
    return "weighed and spliced";
  } catch (error) {
    checkTold(error);
    return word;
  }
}

/** Throws an error that is none of the model's, and one whose words are not as they should be. */
export function checkTold(error: unknown): void {
  if (!(error instanceof ModelError || error instanceof RequestError)) throw error;
  const { message } = error;
  if (/written\.glb/.test(message)) throw new Error(`what was written is refused: ${message}`);
  const told = error instanceof ModelError ? /^hostile\.glb: [^\n]+; [^\n]+$/ : /^[^\n]+: [^\n]+; [^\n]+$/;
  if (/undefined|\[object/.test(message) || !told.test(message)) throw new Error(`told badly: ${message}`);
}
