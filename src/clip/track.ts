/** Numbers as stored; Int16Array: 32767 is 1. */
export type Values = Float32Array | Int16Array;

/**
 * Values over time of one animated property: `values` holds 3 (translation) or 4 (rotation) numbers a key; of CUBICSPLINE three
 * times as many: in-tangent, value, out-tangent (glTF 2.0, Appendix C).
 */
export interface Channel {
  interpolation: "LINEAR" | "CUBICSPLINE";
  /** Seconds, strictly increasing, the first 0. */
  times: Float32Array;
  values: Values;
}

/** The two channels that move a prop, as glTF 2.0 stores and Appendix C plays them. */
export interface Track {
  /** Seconds; the last key of both channels, a float32 value. */
  duration: number;
  /** World frame, m: of the animated node over the prop, or of the centre of mass where that has a node of its own; without keys in `turn-only`. */
  translation: Channel;
  /** Unit quaternions [x, y, z, w]; turns the model from as modelled. */
  rotation: Channel;
  /** Proved: no point of the prop is further than this from the true motion at any time, m. */
  error: number;
}

/** Bytes that the times and values of a track take in a file. */
export const trackBytes = (track: Track): number =>
  [track.translation, track.rotation].reduce(
    (sum, channel) => sum + channel.times.byteLength + channel.values.byteLength,
    0,
  );
