/** Decoders of compressed geometry that the caller hands in, since a browser and Node load them in different ways. */

/** As much of a module of the draco3dgltf package as is used. */
export interface DracoModule {
  readonly Decoder: new () => DracoDecoder;
  readonly Mesh: new () => DracoMesh;
  readonly DT_INT8: number;
  readonly DT_UINT8: number;
  readonly DT_INT16: number;
  readonly DT_UINT16: number;
  readonly DT_UINT32: number;
  readonly DT_FLOAT32: number;
  /** The module's memory; another array after it has grown. */
  readonly HEAPU8: Uint8Array;
  _malloc(bytes: number): number;
  _free(address: number): void;
  /** Frees what was made with `new`. */
  destroy(object: object): void;
  /** 0 of an object that is none. */
  getPointer(object: object): number;
}

export interface DracoMesh {
  num_faces(): number;
  num_points(): number;
}

export interface DracoDecoder {
  DecodeArrayToMesh(
    bytes: Uint8Array,
    length: number,
    mesh: DracoMesh,
  ): { ok(): boolean; error_msg(): string };
  GetTrianglesUInt32Array(mesh: DracoMesh, bytes: number, address: number): boolean;
  GetAttributeByUniqueId(mesh: DracoMesh, id: number): DracoAttribute;
  GetAttributeDataArrayForAllPoints(
    mesh: DracoMesh,
    attribute: DracoAttribute,
    dataType: number,
    bytes: number,
    address: number,
  ): boolean;
}

export interface DracoAttribute {
  num_components(): number;
}

/** What `readModel` is handed to read compressed meshes with; meshopt needs nothing. */
export interface Decoders {
  /**
   * For KHR_draco_mesh_compression: a new instance of the decoder, asked for only when a model needs it:
   * `() => draco3dgltf.createDecoderModule()`.
   */
  draco?: () => Promise<DracoModule>;
}
