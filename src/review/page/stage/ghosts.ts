/** Pale copies of the prop, as many as wanted, drawn at once. */

import { DoubleSide, DynamicDrawUsage, InstancedMesh, Matrix4, MeshLambertMaterial } from "three";
import type { Vec3 } from "../../../math/vec3.js";
import type { Body } from "./body.js";

export class Ghosts {
  readonly mesh: InstancedMesh;
  readonly #fromModel: Matrix4;

  constructor({ geometry }: Body, centerOfMass: Vec3, most: number, color: string) {
    const material = new MeshLambertMaterial({ color, flatShading: true, side: DoubleSide });
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

  set color(color: string) {
    (this.mesh.material as MeshLambertMaterial).color.set(color);
  }

  dispose(): void {
    this.mesh.removeFromParent();
    (this.mesh.material as MeshLambertMaterial).dispose();
    this.mesh.dispose();
  }
}
