/** Pale copies of the prop, as many as wanted, drawn at once. */

import { DoubleSide, DynamicDrawUsage, InstancedMesh, Matrix4, MeshLambertMaterial } from "three";
import type { Vec3 } from "../../../math/vec3.js";
import type { Body } from "./body.js";

/** Of the colour: what light and shade make of it. */
const OWN_SHADE = 0.4;

export class Ghosts {
  readonly mesh: InstancedMesh;
  readonly #fromModel: Matrix4;

  constructor({ geometry }: Body, centerOfMass: Vec3, most: number, color: string) {
    const material = new MeshLambertMaterial({ flatShading: true, side: DoubleSide });
    // half of it shines by itself, so that the shades stay pale
    material.color.set(color).multiplyScalar(OWN_SHADE);
    material.emissive.set(color).multiplyScalar(1 - OWN_SHADE);
    this.mesh = new InstancedMesh(geometry, material, Math.max(1, most));
    this.mesh.instanceMatrix.setUsage(DynamicDrawUsage);
    this.mesh.frustumCulled = false;
    this.mesh.count = 0;
    this.#fromModel = new Matrix4().makeTranslation(...(centerOfMass as [number, number, number]));
  }

  /** @param place writes where the model as modelled, in m, stands in a copy */
  put(count: number, place: (copy: number, out: Matrix4) => void): void {
    const matrix = new Matrix4();
    this.mesh.count = count;
    for (let i = 0; i < count; i++) {
      place(i, matrix);
      this.mesh.setMatrixAt(i, matrix.multiply(this.#fromModel));
    }
    this.mesh.instanceMatrix.needsUpdate = true;
  }

  dispose(): void {
    this.mesh.removeFromParent();
    (this.mesh.material as MeshLambertMaterial).dispose();
    this.mesh.dispose();
  }
}
