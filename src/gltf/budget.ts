import { type Model, ModelError } from "./model.js";

/** Of anything, however large the file. */
const GREATEST = 20_000_000;
/** Of a small file: what a machine weighs in a second or two. */
const LEAST = 1_500_000;
/** A file that says something new with each has a byte or more for it, even when well compressed. */
const PER_BYTE = 4;

/** Pieces of meshes that are read. */
export const GREATEST_COPIES = 30_000;

/**
 * How many vertices, and corners of triangles, a model may unfold to: a few bytes of instances, shared or empty accessors
 * could state billions.
 */
export function greatestElements({ text, buffers }: Model): number {
  const bytes = buffers.reduce((sum, { length }) => sum + length, text.length);
  return Math.min(GREATEST, LEAST + PER_BYTE * bytes);
}

export const tooMuch = (model: Model): ModelError =>
  new ModelError(
    model.name,
    "its scene shows too much",
    `of a file of this size at most ${Math.floor(greatestElements(model) / 3)} triangles in ${GREATEST_COPIES} pieces are read: use a simpler model`,
  );
