/** "take 2" or "takes 1–4, 7", of ascending numbers. */
export function takeList(numbers: readonly number[]): string {
  const runs: [number, number][] = [];
  for (const number of numbers) {
    const last = runs.at(-1);
    if (last && number === last[1] + 1) last[1] = number;
    else runs.push([number, number]);
  }
  const list = runs.map(([first, last]) => (first === last ? `${first}` : `${first}–${last}`)).join(", ");
  return `${numbers.length === 1 ? "take" : "takes"} ${list}`;
}
