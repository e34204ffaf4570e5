/** Colours of the stage, in light and in dark: the sheets' own, and what only a moving picture needs. */

export interface Palette {
  ground: string;
  grid: string;
  /** Lines that count from, and what is written beside them. */
  scale: string;
  sibling: string;
  strobe: string;
  path: string;
  pointPath: string;
  second: string;
  truth: string;
  momentum: string;
  spin: string;
  long: string;
  middle: string;
  short: string;
  mark: string;
  limit: string;
}

const LIGHT: Palette = {
  ground: "#f7f4ec",
  grid: "#ddd5c5",
  scale: "#857d6e",
  sibling: "#e4ddce",
  strobe: "#b9b09d",
  path: "#26231e",
  pointPath: "#6f6857",
  second: "#6d4a91",
  truth: "#b3156f",
  momentum: "#26231e",
  spin: "#6d4a91",
  long: "#a03a1c",
  middle: "#1f5f78",
  short: "#56691f",
  mark: "#a03a1c",
  limit: "#5f594e",
};

const DARK: Palette = {
  ground: "#1d1c1a",
  grid: "#3b372f",
  scale: "#948d7e",
  sibling: "#3a3731",
  strobe: "#6a6457",
  path: "#ece7db",
  pointPath: "#a49c8b",
  second: "#bd9ae0",
  truth: "#ff7cc0",
  momentum: "#ece7db",
  spin: "#bd9ae0",
  long: "#f08a63",
  middle: "#79bdd6",
  short: "#b3c86c",
  mark: "#f08a63",
  limit: "#b0a999",
};

export const palette = (dark: boolean): Palette => (dark ? DARK : LIGHT);
