/** Columns for people: numbers right, words left, two spaces between. */
export function table(head: readonly string[], rows: readonly (readonly string[])[]): string {
  const widths = head.map((title, i) => Math.max(title.length, ...rows.map((row) => row[i].length)));
  const numeric = head.map(
    (_, i) => rows.length > 0 && rows.every((row) => /^[-–\d]/.test(row[i]) || row[i] === ""),
  );
  const line = (cells: readonly string[]) =>
    cells
      .map((cell, i) => (numeric[i] ? cell.padStart(widths[i]) : cell.padEnd(widths[i])))
      .join("  ")
      .trimEnd();
  return [line(head), line(widths.map((width) => "-".repeat(width))), ...rows.map(line)].join("\n");
}

/** "0.9" or "0.9–1.1": what values a column's takes span, to the given decimals. */
export function span(values: readonly number[], decimals: number): string {
  const least = Math.min(...values).toFixed(decimals);
  const most = Math.max(...values).toFixed(decimals);
  return least === most ? least : `${least}–${most}`;
}
