/** How wide a text may come out in any system font: placing keeps so much room free. */

/** Shares of the font size, those of the widest faces in common use, rounded up. */
const NARROW = /[ ijl.,:;|!'’·]/;
const SLIM = /[frtI\-()[\]/]/;
const WIDE = /[mwMW%@–—→±×≈]/;

export function textWidth(text: string, size: number, isBold = false): number {
  let sum = 0;
  for (const character of text)
    sum += NARROW.test(character)
      ? 0.38
      : SLIM.test(character)
        ? 0.46
        : WIDE.test(character)
          ? 1
          : /[A-Z]/.test(character)
            ? 0.77
            : 0.645;
  return sum * size * (isBold ? 1.12 : 1);
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
