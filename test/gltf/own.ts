/** A model that is a user's own through and through, as text and bytes. */

import { bytesOf, FACES, TETRAHEDRON } from "./models.js";

/** A model with all that is a user's own: odd literals, unknown extensions and members, a clip, bytes nothing refers to. */
export const OWN_TEXT = `{
  "asset" : {"version":"2.0", "generator":"by hand", "extras":{"big":12345678901234567890, "one":1.0, "hundred":1e2}},
  "extensionsUsed": ["EXT_unheard_of"],
  "extensions": {"EXT_unheard_of": {"answer": 4.20e+1, "view": 2, "text": "caf\\u00e9 ü"}},
  "unknownMember": [ 1.50, -0.0 , {"a":[]}],
  "scene": 0,
  "scenes": [ {"name":"night market", "nodes":[0], "extras":{"x":1.0}} ],
  "nodes": [
    {"name":"lantern", "mesh":0, "children":[1], "translation":[1.0, 2e-1, 0.0], "extras":{"id":9007199254740993}},
    {"name":"eye", "camera":0}
  ],
  "cameras": [{"type":"perspective","perspective":{"yfov":0.80,"znear":1e-2}}],
  "meshes": [{"primitives":[{"attributes":{"POSITION":0},"indices":1}]}],
  "accessors": [
    {"bufferView":0,"componentType":5126,"count":4,"type":"VEC3","min":[0.0,0.0,0.0],"max":[0.50,0.750,1.0]},
    {"bufferView":1,"componentType":5123,"count":12,"type":"SCALAR"},
    {"bufferView":3,"componentType":5126,"count":2,"type":"SCALAR","min":[0.0],"max":[1.0]},
    {"bufferView":3,"byteOffset":8,"componentType":5126,"count":2,"type":"VEC3"}
  ],
  "animations": [{"name":"sway","channels":[{"sampler":0,"target":{"node":0,"path":"translation"}}],
    "samplers":[{"input":2,"output":3}]}],
  "bufferViews": [
    {"buffer":0,"byteLength":48,"target":34962},
    {"buffer":0,"byteOffset":48,"byteLength":24,"target":34963},
    {"buffer":0,"byteOffset":72,"byteLength":5,"name":"unreferred"},
    {"buffer":0,"byteOffset":80,"byteLength":32}
  ],
  "buffers": [ {"byteLength":113, "name":"mine"} ]
}`;
export const OWN_BYTES = bytesOf(
  TETRAHEDRON,
  FACES,
  new Uint8Array([1, 2, 3, 4, 5, 6, 7, 8]),
  new Float32Array([0, 1, 0, 0, 0, 0, 0.5, 0]),
  new Uint8Array([0xaa]),
);
