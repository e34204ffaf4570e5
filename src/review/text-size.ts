/** How wide a text may come out in any system font: placing keeps so much room free. */

/**
 * Hundredths of the font size, by character: widths of DejaVu Sans, one of the widest faces that systems come with, as a browser measures them,
 * rounded up.
 */
const WIDTHS = widths({
  28: "'ijl",
  30: "IJ",
  32: " \u00a0,.’·",
  34: "/:;\\|",
  37: "-f",
  42: "()[]tr!²³",
  50: '"*_`°–',
  55: "szc?",
  60: "LFkvxy",
  62: "PTYaeo",
  64: "$0123456789ESbdghnpqu{}",
  70: "KABVXZCR",
  79: "UNH&DGOQ",
  84: "w#+<=>^~×±→≈",
});
const WIDEST = 1;
/** Bold faces are wider by no more. */
const BOLD = 1.14;

export function textWidth(text: string, size: number, isBold = false): number {
  let sum = 0;
  for (const character of text) sum += WIDTHS.get(character) ?? WIDEST;
  return sum * size * (isBold ? BOLD : 1);
}

/** Lines no wider than that, broken between words. */
export function wrapped(text: string, size: number, width: number, isBold = false): string[] {
  const lines: string[] = [];
  for (const word of text.split(" ")) {
    const line = lines.length > 0 ? `${lines[lines.length - 1]} ${word}` : word;
    if (lines.length > 0 && textWidth(line, size, isBold) <= width) lines[lines.length - 1] = line;
    else lines.push(word);
  }
  return lines;
}

function widths(table: Readonly<Record<number, string>>): Map<string, number> {
  return new Map(
    Object.entries(table).flatMap(([width, characters]) =>
      Array.from(characters, (character) => [character, Number(width) / 100] as const),
    ),
  );
}
