/** The one of `names` that is most like `name` (the first of equals), for "did you mean"; undefined where there is none. */
export function nearestName(name: string, names: readonly string[]): string | undefined {
  let nearest: string | undefined;
  let least = Number.POSITIVE_INFINITY;
  for (const candidate of names) {
    const distance = editDistance(name.toLowerCase(), candidate.toLowerCase());
    if (distance >= least) continue;
    least = distance;
    nearest = candidate;
  }
  return nearest;
}

/** Fewest insertions, deletions and changes of a character (Wagner & Fischer, J. ACM 21 (1974) 168). */
function editDistance(a: string, b: string): number {
  let row = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const next = [i];
    for (let j = 1; j <= b.length; j++)
      next.push(Math.min(row[j] + 1, next[j - 1] + 1, row[j - 1] + (a[i - 1] === b[j - 1] ? 0 : 1)));
    row = next;
  }
  return row[b.length];
}
