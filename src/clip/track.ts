/** Values over time of one animated property: `values` holds 3 (translation) or 4 (rotation) numbers a key. */
export interface Channel {
  /** Seconds, strictly increasing, the first 0. */
  times: Float32Array;
  values: Float32Array;
}

/** The two channels that move one node over a prop, as glTF 2.0 stores and Appendix C plays them. */
export interface Track {
  /** Seconds; the last key of both channels, a float32 value. */
  duration: number;
  /** Of the node, world frame, m. */
  translation: Channel;
  /** Unit quaternions [x, y, z, w]; turns the model from as modelled. */
  rotation: Channel;
  /** Proved: no point of the prop is further than this from the true motion at any time, m. */
  error: number;
  interpolation: "LINEAR";
}

/** Bytes that the times and values of a track take in a file. */
export const trackBytes = (track: Track): number =>
  [track.translation, track.rotation].reduce(
    (sum, channel) => sum + channel.times.byteLength + channel.values.byteLength,
    0,
  );
