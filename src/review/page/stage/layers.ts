/** What can be shown, and from where. */

export type View = "side" | "top" | "along" | "free" | "follow";
export type Layer = "siblings" | "strobe" | "paths" | "arrows" | "surroundings" | "truth";

/** What is shown at first. */
export const FIRST_LAYERS: Record<Layer, boolean> = {
  siblings: true,
  strobe: false,
  paths: true,
  arrows: false,
  surroundings: true,
  truth: false,
};
