/** A line of even width round a body, wherever it stands before nothing of itself. */

import { BackSide, Color, Mesh, ShaderMaterial, Vector2 } from "three";
import type { Body } from "./body.js";

/** px */
const WIDTH = 2.5;

/**
 * The far sides of the body, grown in the picture: what is drawn before them at the same place leaves only their rim.
 *
 * @param body with normals
 */
export function outlineMesh({ geometry }: Body, color: string): Mesh<Body["geometry"], ShaderMaterial> {
  const material = new ShaderMaterial({
    side: BackSide,
    uniforms: { color: { value: new Color(color) }, resolution: { value: new Vector2(1, 1) } },
    vertexShader: `
      uniform vec2 resolution;
      void main() {
        gl_Position = projectionMatrix * modelViewMatrix * vec4(position, 1.0);
        vec2 outwards = (projectionMatrix * vec4(normalMatrix * normal, 0.0)).xy * resolution;
        float size = length(outwards);
        if (size > 0.0) gl_Position.xy += ${(2 * WIDTH).toFixed(1)} * outwards / size / resolution * gl_Position.w;
      }`,
    fragmentShader: `
      uniform vec3 color;
      void main() {
        gl_FragColor = vec4(color, 1.0);
        #include <colorspace_fragment>
      }`,
  });
  const mesh = new Mesh(geometry, material);
  mesh.frustumCulled = false;
  return mesh;
}
