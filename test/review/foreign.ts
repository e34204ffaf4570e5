/** Documents that another program made: glTF-Transform, with clips of every kind. */

import { type Animation, Document, type Node, WebIO } from "@gltf-transform/core";

export interface ForeignKeys {
  path: "translation" | "rotation" | "scale" | "weights";
  times: number[];
  values: number[];
  interpolation?: "LINEAR" | "STEP" | "CUBICSPLINE";
  /** Stored as normalised 16-bit integers. */
  int16?: boolean;
  /** Stored as what differs from 0. */
  sparse?: boolean;
}

export class Foreign {
  readonly document = new Document();
  readonly #buffer = this.document.createBuffer();
  readonly #scene = this.document.createScene();

  constructor() {
    this.document.getRoot().setDefaultScene(this.#scene);
  }

  /** A node in the scene, or in another. */
  node(name: string, parent?: Node): Node {
    const node = this.document.createNode(name);
    if (parent) parent.addChild(node);
    else this.#scene.addChild(node);
    return node;
  }

  /** A box from a corner to the opposite one. */
  box(node: Node, [x, y, z]: readonly number[], [X, Y, Z]: readonly number[]): Node {
    const corners = [x, y, z, X, y, z, X, Y, z, x, Y, z, x, y, Z, X, y, Z, X, Y, Z, x, Y, Z];
    const faces = [
      ...[0, 2, 1, 0, 3, 2, 4, 5, 6, 4, 6, 7, 0, 1, 5, 0, 5, 4],
      ...[1, 2, 6, 1, 6, 5, 2, 3, 7, 2, 7, 6, 3, 0, 4, 3, 4, 7],
    ];
    const primitive = this.document
      .createPrimitive()
      .setAttribute("POSITION", this.#accessor(new Float32Array(corners), "VEC3"))
      .setIndices(this.#accessor(new Uint16Array(faces), "SCALAR"));
    return node.setMesh(this.document.createMesh().addPrimitive(primitive));
  }

  clip(name: string, ...moves: [Node, ...ForeignKeys[]][]): Animation {
    const clip = this.document.createAnimation(name);
    for (const [node, ...keys] of moves)
      for (const { path, times, values, interpolation = "LINEAR", int16, sparse } of keys) {
        const stored = int16
          ? new Int16Array(values.map((value) => Math.round(value * 32767)))
          : new Float32Array(values);
        const type = ({ rotation: "VEC4", weights: "SCALAR" } as const)[path as "rotation"] ?? "VEC3";
        const sampler = this.document
          .createAnimationSampler()
          .setInput(this.#accessor(new Float32Array(times), "SCALAR"))
          .setOutput(
            this.#accessor(stored, type)
              .setNormalized(int16 ?? false)
              .setSparse(sparse ?? false),
          )
          .setInterpolation(interpolation);
        const channel = this.document
          .createAnimationChannel()
          .setTargetNode(node)
          .setTargetPath(path)
          .setSampler(sampler);
        clip.addSampler(sampler).addChannel(channel);
      }
    return clip;
  }

  glb(): Promise<Uint8Array> {
    return new WebIO().writeBinary(this.document);
  }

  #accessor(array: Float32Array | Int16Array | Uint16Array, type: "SCALAR" | "VEC3" | "VEC4") {
    return this.document.createAccessor().setType(type).setArray(array).setBuffer(this.#buffer);
  }
}

/** A quarter turn about z, and half a turn. */
export const QUARTER = [0, 0, Math.SQRT1_2, Math.SQRT1_2];
export const HALF = [0, 0, 1, 0];
export const NONE = [0, 0, 0, 1];
