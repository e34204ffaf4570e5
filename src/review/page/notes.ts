/** What the bake had to say of a take. */

import type { PageThrow } from "../page-data.js";

/** Of some takes of a throw. */
interface Warned {
  takes: readonly number[];
  text: string;
}

export function notesOf(shown: PageThrow & { warnings?: readonly Warned[] }, take: number): string[] {
  return (shown.warnings ?? []).filter(({ takes }) => takes.includes(take)).map(({ text }) => text);
}
