/** Pale copies of the prop, as many as wanted, drawn at once. */

import { Color, DoubleSide, DynamicDrawUsage, InstancedMesh, Matrix4, ShaderMaterial } from "three";
import type { Vec3 } from "../../../math/vec3.js";
import type { Body } from "./body.js";

/**
 * Light over the viewer's left shoulder, and a good part of each side's colour its own, so that shades stay pale. All of it is worked out at the
 * corners: software that draws two hundred copies pays for every pixel.
 */
const AT_CORNERS = `
  uniform vec3 color;
  varying vec3 shade;
  const vec3 light = normalize(vec3(-0.6, 0.9, 1.0));
  void main() {
    vec3 side = normalize(mat3(modelViewMatrix) * mat3(instanceMatrix) * normal);
    float lit = 0.5 + 0.5 * dot(side.z < 0.0 ? -side : side, light);
    shade = color * (0.78 + 0.26 * lit);
    gl_Position = projectionMatrix * modelViewMatrix * instanceMatrix * vec4(position, 1.0);
  }`;

const AT_PIXELS = `
  varying vec3 shade;
  void main() {
    gl_FragColor = vec4(shade, 1.0);
  }`;

export class Ghosts {
  readonly mesh: InstancedMesh<Body["geometry"], ShaderMaterial>;
  readonly #fromModel: Matrix4;

  /** @param body with flat normals */
  constructor({ geometry }: Body, centerOfMass: Vec3, most: number, color: string) {
    // the colour as the screen has it: nothing is blended
    const shown = new Color().setStyle(color).convertLinearToSRGB();
    const material = new ShaderMaterial({
      uniforms: { color: { value: shown } },
      vertexShader: AT_CORNERS,
      fragmentShader: AT_PIXELS,
      side: DoubleSide,
    });
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
    this.mesh.material.dispose();
    this.mesh.dispose();
  }
}
