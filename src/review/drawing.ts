/** A part of a sheet: drawn from its own upper left corner. */
export interface Drawing {
  /** px */
  width: number;
  height: number;
  /** SVG elements. */
  body: string;
}
